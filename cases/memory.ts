/** What was made before from the same text: a plan reads the same few thousands of times. */
export type Memory<T> = Map<string, T>;

/** Entries a memory may hold before it starts over. */
const MOST_KNOWN = 10_000;

/** What `key` stands for, made once. */
export function remembered<T>(memory: Memory<T>, key: string, make: () => T): T {
  const found = memory.get(key);
  if (found !== undefined) return found;
  if (memory.size >= MOST_KNOWN) memory.clear();
  const made = make();
  memory.set(key, made);
  return made;
}
