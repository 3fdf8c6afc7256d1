/**
 * Points that fill a box evenly however many keys span it: a Latin hypercube (McKay, Beckman & Conover 1979, Technometrics 21, 239; from
 * memory). Each key's range is cut into as many slices as there are points, and each slice is used once. Of several draws the one whose
 * nearest two points lie farthest apart is taken. Our own, because no maintained package of the registry makes one.
 */
import { next, seeded } from '../random.ts';

/** Draws to choose from; for many points the search for the nearest two is what takes time. */
const DRAWS = 20;
const FEWER_ABOVE = 500;

/** Shares of each key's range; shape (count, keys), values in (0, 1). The same for the same seed on every machine. */
export function spread(count: number, keys: number, seed: number): number[][] {
  const generator = seeded(seed);
  let best: { points: number[][]; apart: number } | undefined;
  for (let draw = 0; draw < (count > FEWER_ABOVE ? 1 : DRAWS); draw++) {
    const columns = Array.from({ length: keys }, () => slices(count, () => next(generator)));
    const points = Array.from({ length: count }, (_, i) => columns.map((column) => column[i]));
    const apart = count > FEWER_ABOVE ? 0 : nearest(points);
    if (best === undefined || apart > best.apart) best = { points, apart };
  }
  return best?.points ?? [];
}

/** One value from each of `count` slices of (0, 1), shuffled (Fisher-Yates). */
function slices(count: number, random: () => number): number[] {
  const values = Array.from({ length: count }, (_, i) => (i + random()) / count);
  for (let i = count - 1; i > 0; i--) {
    const j = Math.floor(random() * (i + 1));
    [values[i], values[j]] = [values[j], values[i]];
  }
  return values;
}

/** Square of the distance of the nearest two points. */
function nearest(points: readonly number[][]): number {
  let least = Number.POSITIVE_INFINITY;
  points.forEach((a, i) => {
    for (let j = 0; j < i; j++)
      least = Math.min(
        least,
        a.reduce((sum, x, k) => sum + (x - points[j][k]) ** 2, 0),
      );
  });
  return least;
}
