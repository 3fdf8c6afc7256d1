/** Air that is on and off in turn: on for `on_s` first, then off for `off_s`, and so on; always on without a pulse. */
import type { Case } from './case.ts';

type Pulsed = Pick<Case['gas'], 'pulse'>;

/** Share of the time with air. */
export function onShare({ pulse }: Pulsed): number {
  return pulse === undefined ? 1 : pulse.on_s / (pulse.on_s + pulse.off_s);
}

/** The time at which the air has been on for `on_s` altogether. */
export function timeWithAir_s({ pulse }: Pulsed, on_s: number): number {
  return pulse === undefined ? on_s : on_s + Math.floor(on_s / pulse.on_s) * pulse.off_s;
}

/** `time_s` itself while the air is on, else the moment at which it comes back. */
export function nextAir_s({ pulse }: Pulsed, time_s: number): number {
  if (pulse === undefined) return time_s;
  const period_s = pulse.on_s + pulse.off_s;
  const periods = Math.floor(time_s / period_s);
  return time_s - periods * period_s <= pulse.on_s ? time_s : (periods + 1) * period_s;
}
