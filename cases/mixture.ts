/** Sizes of the bubbles that are let in: kinds with a mean diameter and a spread, mixed by gas or by number. */
import type { BubbleKind } from './case.ts';

/** Bubbles are drawn within this many standard deviations of the mean diameter. */
export const WIDEST_DRAW = 2;

/** Parts of the interval over which a mean of the distribution is taken (Simpson's rule); the error is below 1e-9. */
const PARTS = 64;

/**
 * Mean area of the bubbles of one kind: pi d^2/4 mean((1 + spread z)^2), z normal, cut at {@link WIDEST_DRAW} deviations and where the bubble
 * would be larger than `most_m`, as they are drawn.
 */
export function meanArea_m2({ diameter_m, spread }: Pick<BubbleKind, 'diameter_m' | 'spread'>, most_m: number): number {
  const square = (Math.PI * diameter_m ** 2) / 4;
  if (spread === 0) return square;
  const highest = Math.min(WIDEST_DRAW, (most_m / diameter_m - 1) / spread);
  const length = highest + WIDEST_DRAW;
  let [sum, weights] = [0, 0];
  for (let i = 0; i <= PARTS; i++) {
    const z = -WIDEST_DRAW + (length * i) / PARTS;
    const weight = (i === 0 || i === PARTS ? 1 : i % 2 === 1 ? 4 : 2) * Math.exp(-(z ** 2) / 2);
    weights += weight;
    sum += weight * (1 + spread * z) ** 2;
  }
  return (square * sum) / weights;
}

/** The same kinds with shares of the number of bubbles in place of shares of the gas; both add up to 1. */
export function sharesByNumber(kinds: readonly BubbleKind[], most_m: number): BubbleKind[] {
  const numbers = kinds.map((kind) => kind.share / meanArea_m2(kind, most_m));
  const all = numbers.reduce((sum, number) => sum + number, 0);
  return kinds.map((kind, i) => ({ ...kind, share: (numbers[i] as number) / all }));
}
