/** What one number says of the order of non-negative f32 numbers: their bit patterns, read as whole numbers, have their order. */
const bits = new Uint32Array(1);
const float = new Float32Array(bits.buffer);
/** Bit pattern of infinity. */
const INFINITE = 0x7f800000;

/**
 * The value below which a share `p` of all values lies: linear between order statistics, position p (n - 1).
 * @param sorted each ascending, not negative, without NaN; together one collection
 * @returns null where there is no value
 * @see Hyndman & Fan (1996), Am. Stat. 50, 361, definition 7 (from memory)
 */
export function quantile(sorted: readonly Float32Array[], p: number): number | null {
  const n = sorted.reduce((sum, { length }) => sum + length, 0);
  if (n === 0) return null;
  const position = p * (n - 1);
  const rank = Math.floor(position);
  const below = ranked(sorted, rank);
  const above = position === rank ? below : ranked(sorted, rank + 1);
  return below + (position - rank) * (above - below);
}

/** The value with `rank` others before it: the least bit pattern that more values than `rank` do not exceed. */
function ranked(sorted: readonly Float32Array[], rank: number): number {
  if (sorted.length === 1) return sorted[0][rank];
  let low = 0;
  let high = INFINITE;
  while (low < high) {
    const middle = (low + high) >>> 1;
    bits[0] = middle;
    const upTo = sorted.reduce((sum, values) => sum + countUpTo(values, float[0]), 0);
    if (upTo > rank) high = middle;
    else low = middle + 1;
  }
  bits[0] = low;
  return float[0];
}

/** How many of the ascending values are <= `limit`. */
export function countUpTo(sorted: Float32Array | readonly number[], limit: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (sorted[middle] <= limit) low = middle + 1;
    else high = middle;
  }
  return low;
}
