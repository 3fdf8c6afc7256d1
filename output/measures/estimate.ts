/**
 * A measure as what its interval needs: a value that is a monotone function of the mean of a series in time. The ends of that mean's interval
 * (interval.ts) lead to the ends of the value's, so one treatment serves every measure.
 */
export interface Estimate {
  /** null: not to be had from this recording */
  value: number | null;
  /** one entry per sample (window, entry of the history), evenly spaced; empty where there is no value */
  series: Float64Array;
  /** values that the mean of the series can have */
  range: Range;
  /** the value for another mean of the series */
  at(mean: number): number;
  /** known from the case alone: its interval is the value itself */
  exact?: true;
}

/** Values a measure can have. */
export interface Range {
  least: number;
  most: number;
}

export const SHARE: Range = { least: 0, most: 1 };
export const SIZE: Range = { least: 0, most: Number.POSITIVE_INFINITY };
export const ANY: Range = { least: Number.NEGATIVE_INFINITY, most: Number.POSITIVE_INFINITY };

export const NO_ESTIMATE: Estimate = { value: null, series: new Float64Array(0), range: ANY, at: () => Number.NaN };

/** An estimate by the plain mean of a series; none where it is empty. */
export function byMean(series: Float64Array, range: Range): Estimate {
  return series.length === 0 ? NO_ESTIMATE : { value: meanOf(series), series, range, at: (mean) => mean };
}

/** What needs no recording. */
export function exactly(value: number): Estimate {
  return { ...NO_ESTIMATE, value, exact: true };
}

export function meanOf(series: ArrayLike<number>): number {
  let sum = 0;
  for (let i = 0; i < series.length; i++) sum += series[i];
  return sum / series.length;
}
