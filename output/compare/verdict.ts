import { type Difference, studentAt } from './pooled.ts';

/** What an interval of a difference says of the first geometry against the second. */
export interface Verdict {
  /** `alike`: the very same value in every run; `missing`: no interval to be had */
  state: 'better' | 'worse' | "can't tell" | 'alike' | 'missing';
  /** more to record in each run until the interval leaves zero out, should the difference stay what it is; null unless it holds zero */
  more_s: number | null;
  /** runs of each geometry that would do instead, null beyond {@link MOST_RUNS} or where the spread of runs is not known */
  moreRuns: number | null;
}

const MOST_RUNS = 200;

/**
 * A plain verdict. Widths shrink with the root of the time recorded, so that zero at a distance d from the value, with the end of the
 * interval r beyond, is left out after (r / d)^2 times as long. The difference itself moves meanwhile: a rough figure.
 * @param recorded_s by one run
 * @param larger the larger value is the better one
 */
export function verdictOn(found: Difference, recorded_s: number, larger: boolean): Verdict {
  const { value, low, high } = found;
  const none = { more_s: null, moreRuns: null };
  if (low === null || high === null) return { state: 'missing', ...none };
  if (low === 0 && high === 0) return { state: 'alike', ...none };
  if (low > 0 || high < 0) return { state: value > 0 === larger ? 'better' : 'worse', ...none };
  const ratio = (value > 0 ? value - low : high - value) / Math.abs(value);
  if (!Number.isFinite(ratio)) return { state: "can't tell", ...none };
  return { state: "can't tell", more_s: recorded_s * (ratio ** 2 - 1), moreRuns: runsFor(ratio, found) };
}

/** Runs of each that make the interval narrower by `ratio`. */
function runsFor(ratio: number, { basis, paired, runs }: Difference): number | null {
  const now = Math.min(...runs);
  const freedom = (k: number): number => (paired ? k - 1 : 2 * (k - 1));
  const width = (k: number): number => (basis === 'recording' ? 1 : studentAt(freedom(k))) / Math.sqrt(k);
  for (let k = now + 1; k <= MOST_RUNS; k++) if (width(k) * ratio < width(now)) return k;
  return null;
}
