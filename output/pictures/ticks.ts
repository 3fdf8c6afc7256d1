/** The round numbers 1, 2 and 5 times a power of ten. */
const ROUND = [1, 2, 5, 10];

/** The largest round number that is <= `limit` (> 0). */
export function roundBelow(limit: number): number {
  const power = 10 ** Math.floor(Math.log10(limit));
  let best = power;
  for (const factor of ROUND) if (factor * power <= limit * (1 + 1e-9)) best = factor * power;
  return clean(best);
}

/** The smallest round number that is >= `limit` (> 0). */
export function roundAbove(limit: number): number {
  const power = 10 ** Math.floor(Math.log10(limit));
  for (const factor of ROUND) if (factor * power >= limit * (1 - 1e-9)) return clean(factor * power);
  return clean(10 * power);
}

/** Round values between `from` and `to`, some `about` of them, ends included where they are round. */
export function ticks(from: number, to: number, about: number): number[] {
  if (!(to > from)) return [from];
  const step = roundAbove((to - from) / about);
  const values: number[] = [];
  for (let i = Math.ceil(from / step - 1e-9); i * step <= to + 1e-9 * step; i++) values.push(clean(i * step));
  return values;
}

/** Without the rest that binary fractions leave. */
function clean(value: number): number {
  return Number(value.toPrecision(10));
}

/** As many digits as the values of one axis need to differ. */
export function tickText(value: number): string {
  return String(clean(value));
}
