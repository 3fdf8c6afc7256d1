import type { History, Recording } from '../../cases/index.ts';
import { ANY, byMean, type Estimate, SHARE } from './estimate.ts';

/** How gas and liquid went round, from the history; null where it holds nothing after the settling time. */
export interface LoopMeasures {
  /** mean after settling: share of the free area that is gas */
  holdup: number | null;
  /** mean after settling: superficial velocity of the liquid and gas together, upward */
  upflow_m_s: number | null;
  /** mean of the second half of the time after settling less that of the first half: near zero once the loop has settled */
  upflowDrift_m_s: number | null;
  /** at the end, per metre of sheet width */
  released_m2: number | null;
  skimmed_m2: number | null;
  present_m2: number | null;
  /** (present now - present at the start - released + skimmed) / the gas that was ever there: what the gas balance misses */
  balanceError: number | null;
}

/** Means of the loop's history after settling, and its gas balance since the start. Entries of the history count alike. */
export function loopMeasures(recording: Recording): LoopMeasures {
  const { history } = recording;
  const first = firstSettled(recording);
  const middle = Math.floor((first + history.time_s.length) / 2);
  const early = mean(history.upflow_m_s.slice(first, middle));
  const late = mean(history.upflow_m_s.slice(middle));
  return {
    holdup: holdup(recording).value,
    upflow_m_s: upflow(recording).value,
    upflowDrift_m_s: early === null || late === null ? null : late - early,
    released_m2: history.released_m2.at(-1) ?? null,
    skimmed_m2: history.skimmed_m2.at(-1) ?? null,
    present_m2: history.present_m2.at(-1) ?? null,
    balanceError: balanceError(history),
  };
}

/** Mean after settling of the share of the channel's free area that is gas, bands and fins' surroundings included. */
export function holdup(recording: Recording): Estimate {
  return byMean(Float64Array.from(recording.history.holdup.slice(firstSettled(recording))), SHARE);
}

/** Mean after settling of the superficial velocity of the loop, m/s, upward; of liquid and gas together. */
export function upflow(recording: Recording): Estimate {
  return byMean(Float64Array.from(recording.history.upflow_m_s.slice(firstSettled(recording))), ANY);
}

/** Entries of the history before the settling time is over. */
function firstSettled({ history, case: { record } }: Recording): number {
  const found = history.time_s.findIndex((time_s) => time_s >= record.settle_s);
  return found < 0 ? history.time_s.length : found;
}

function balanceError({ released_m2, skimmed_m2, present_m2 }: History): number | null {
  const last = present_m2.length - 1;
  if (last < 0) return null;
  // the first entry may stand after the first release or skim
  const before = present_m2[0] - released_m2[0] + skimmed_m2[0];
  const ever = before + released_m2[last];
  return ever > 0 ? (present_m2[last] - before - released_m2[last] + skimmed_m2[last]) / ever : null;
}

function mean(values: readonly number[]): number | null {
  return values.length === 0 ? null : values.reduce((sum, value) => sum + value, 0) / values.length;
}
