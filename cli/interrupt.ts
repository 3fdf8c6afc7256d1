/** What a shell expects of a process ended by each signal: 128 + its number. */
const EXITS = { SIGINT: 130, SIGTERM: 143, SIGHUP: 129 } as const;

/** A launcher such as npx may pass the same Ctrl-C on once more: within this time it counts as one, ms. */
const SAME_MS = 200;

/** A request from outside to stop. */
export interface Interrupt {
  signal: AbortSignal;
  /** exit code of the signal that came, undefined while none has */
  exit(): number | undefined;
  /** gives the signals back to the system */
  release(): void;
}

/** The first Ctrl-C (or end, or hang-up) asks for an orderly stop, a second one ends the process at once. */
export function catchInterrupts(onFirst: () => void): Interrupt {
  const controller = new AbortController();
  let exit: number | undefined;
  let first_ms = 0;
  const listeners = Object.entries(EXITS).map(([name, code]) => {
    const listener = (): void => {
      if (exit !== undefined) {
        if (performance.now() - first_ms > SAME_MS) process.exit(exit);
        return;
      }
      exit = code;
      first_ms = performance.now();
      onFirst();
      controller.abort();
    };
    process.on(name, listener);
    return { name, listener };
  });
  return {
    signal: controller.signal,
    exit: () => exit,
    release: () => {
      for (const { name, listener } of listeners) process.off(name, listener);
    },
  };
}
