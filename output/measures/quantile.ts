/**
 * The value below which a share `p` of the sorted values lies: linear between order statistics, position p (n - 1).
 * @param sorted ascending, without NaN
 * @returns null where there is no value
 * @see Hyndman & Fan (1996), Am. Stat. 50, 361, definition 7 (from memory)
 */
export function quantile(sorted: Float32Array, p: number): number | null {
  const n = sorted.length;
  if (n === 0) return null;
  const position = p * (n - 1);
  const below = Math.floor(position);
  const above = Math.min(below + 1, n - 1);
  return sorted[below] + (position - below) * (sorted[above] - sorted[below]);
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
