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

/** Exit code of a run whose sweep is gone: that of a hang-up. */
const LEFT_ALONE = EXITS.SIGHUP;

/**
 * The first Ctrl-C (or end, or hang-up) asks for an orderly stop, a second one ends the process at once. A run that a sweep started stops
 * in the same way when the sweep is gone, whatever ended it: nobody else would.
 */
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
  const leftAlone = (): void => {
    if (exit !== undefined) return;
    exit = LEFT_ALONE;
    onFirst();
    controller.abort();
  };
  process.on('disconnect', leftAlone);
  // the channel to the sweep shall not keep a finished run alive
  process.channel?.unref();
  return {
    signal: controller.signal,
    exit: () => exit,
    release: () => {
      for (const { name, listener } of listeners) process.off(name, listener);
      process.off('disconnect', leftAlone);
    },
  };
}
