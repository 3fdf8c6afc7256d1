/** Largest t looked for: that of one degree of freedom is 12.7. */
const FARTHEST = 20;

/**
 * The t that a share of 95 % of Student's distribution lies within, -t to t.
 * @param freedom degrees of freedom, a whole number of one at least
 * @see Abramowitz & Stegun 1964, 26.7.3 and 26.7.4 [M]: the share within as a finite sum; here halved in on
 */
export function student95(freedom: number): number {
  let low = 0;
  let high = FARTHEST;
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (shareWithin(middle, freedom) < 0.95) low = middle;
    else high = middle;
  }
  return high;
}

function shareWithin(t: number, freedom: number): number {
  const theta = Math.atan(t / Math.sqrt(freedom));
  const cosine = Math.cos(theta);
  const odd = freedom % 2 === 1;
  if (freedom === 1) return (2 * theta) / Math.PI;
  let term = odd ? cosine : 1;
  let sum = term;
  for (let k = odd ? 2 : 1; k <= freedom - 3; k += 2) {
    term *= (k / (k + 1)) * cosine ** 2;
    sum += term;
  }
  return odd ? (2 / Math.PI) * (theta + Math.sin(theta) * sum) : Math.sin(theta) * sum;
}
