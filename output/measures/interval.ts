import { meanOf } from './estimate.ts';

const BATCHES = 10;
/** Of Student's t with nine degrees of freedom, two-sided 95 %. */
const T_95 = 2.262;
/** Fewer entries than this say nothing. */
const FEWEST = 2 * BATCHES;

/** Half width of a 95 % interval of the mean of an autocorrelated series by the means of ten BATCHES; null: cannot be told. */
export function halfWidth(series: Float64Array): number | null {
  const n = series.length;
  if (n < FEWEST) return null;
  const mean = meanOf(series);
  const length = Math.floor(n / BATCHES);
  const means = Array.from({ length: BATCHES }, (_, i) => meanOf(series.subarray(n - (i + 1) * length, n - i * length)));
  const spread = means.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (BATCHES - 1);
  return spread > 0 ? T_95 * Math.sqrt(spread / BATCHES) : null;
}
