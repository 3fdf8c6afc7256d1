/** Numbers cut into arrays whose indices the cluster takes: 0 to `size` - 1. */
export function chunks(numbers: readonly number[], size: number): { offset: number; indices: number[] }[] {
  const found = new Map<number, number[]>();
  for (const number of numbers) {
    const offset = Math.floor(number / size) * size;
    found.set(offset, [...(found.get(offset) ?? []), number - offset]);
  }
  return [...found].map(([offset, indices]) => ({ offset, indices }));
}

/** 1-3,7 from rising numbers. */
export function ranges(numbers: readonly number[]): string {
  const parts: { from: number; to: number }[] = [];
  for (const number of numbers) {
    const last = parts.at(-1);
    if (last !== undefined && number === last.to + 1) last.to = number;
    else parts.push({ from: number, to: number });
  }
  return parts.map(({ from, to }) => (from === to ? String(from) : `${from}-${to}`)).join(',');
}
