import type { Recording } from '../../cases/index.ts';
import { type Answer, answerOf } from './answers.ts';
import { placesOf } from './felt.ts';

/** How sure an answer is that the recording was to go on for. */
export interface Sureness {
  name: string;
  /** asked: half of the 95 % interval over the value */
  within: number;
  /** the same as it came out; null: cannot be told */
  reached: number | null;
}

/** What `record.until` asked and what came of it; empty without it. */
export function sureness({ record }: Recording['case'], answerTo: (name: string) => Answer): Sureness[] {
  return (record.until?.sure ?? []).map(({ name, within }) => {
    const { value, low, high } = answerTo(name);
    return { name, within, reached: value === null || low === null || high === null ? null : (high - low) / 2 / Math.abs(value) };
  });
}

/** All answers that a recording was to go on for, as they stand by now: what `simulate` asks at its looks. */
export function surenessOf(recording: Recording): Sureness[] {
  const places = placesOf(recording);
  return sureness(recording.case, (name) => answerOf(recording, places, name));
}

/** Each is as sure as asked. */
export function allSure(found: readonly Sureness[]): boolean {
  return found.every(({ within, reached }) => reached !== null && reached <= within);
}
