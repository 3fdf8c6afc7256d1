/**
 * Grid convergence of one number computed on three grids.
 *
 *     e21 = phi2 - phi1, e32 = phi3 - phi2, r21 = h2 / h1, r32 = h3 / h2          (1 the finest grid, 3 the coarsest)
 *     p = |ln|e32 / e21| + q(p)| / ln r21, q(p) = ln[(r21^p - s) / (r32^p - s)], s = sign(e32 / e21)
 *     phi_ext = (r21^p phi1 - phi2) / (r21^p - 1)
 *     e_a = |(phi1 - phi2) / phi1|, GCI = 1.25 e_a / (r21^p - 1)
 *
 * Without the outer bars the equation for p says |e32 / e21| = r21^p (r32^p - s) / (r21^p - s). The right side rises with p, so there is
 * one root, found by halving; the printed repeated insertion finds the same one where it settles. Where that root is not above zero the
 * differences do not shrink as the grids get finer. The bars would make an order out of that too; here it has none.
 * @see Celik, Ghia, Roache, Freitas, Coleman & Raad 2008, J. Fluids Eng. 130, 078001
 */

/** Factor of safety of the index for three grids. */
const SAFETY = 1.25;

/** Differences below this share of the values are none: wall samples carry seven digits, and nobody reads five of a bubble flow. */
const SAME = 1e-4;

/**
 * How the three values follow one another:
 * `same` all alike; `shrinking` the differences get smaller and keep their sign; `swinging` smaller, with changing sign;
 * `growing` and `wild` likewise, but they do not get smaller; `chance` the finer two alike, the coarsest not: no order to be had.
 */
type Course = 'same' | 'shrinking' | 'swinging' | 'growing' | 'wild' | 'chance';

/** null: not to be had, see `course`. */
export interface Convergence {
  course: Course;
  /** observed order p */
  order: number | null;
  /** phi_ext, unit of the values */
  extrapolated: number | null;
  /** e_a, relative; null where the finest value is zero */
  change: number | null;
  /** GCI, relative */
  index: number | null;
}

/** Three of something, from the finest grid to the coarsest. */
export type Triple = readonly [fine: number, middle: number, coarse: number];

/**
 * Order, extrapolated value and index of `values` on cells of size `cells`, both from the finest grid to the coarsest.
 * @param cells any unit, rising
 */
export function gridConvergence(values: Triple, cells: Triple): Convergence {
  const [fine, middle, coarse] = values;
  const e21 = middle - fine;
  const e32 = coarse - middle;
  const least = SAME * Math.max(Math.abs(fine), Math.abs(middle), Math.abs(coarse));
  const change = fine === 0 ? null : Math.abs(e21 / fine);
  const none = { order: null, extrapolated: null, change, index: null };
  if (Math.abs(e21) <= least) {
    const same = Math.abs(e32) <= least && Math.abs(coarse - fine) <= least;
    return same ? { course: 'same', order: null, extrapolated: fine, change: change ?? 0, index: 0 } : { course: 'chance', ...none };
  }
  const s = Math.sign(e32) === -Math.sign(e21) ? -1 : 1;
  const ratio21 = cells[1] / cells[0];
  const order = observedOrder(Math.abs(e32 / e21), s, ratio21, cells[2] / cells[1]);
  if (order === null) return { course: s > 0 ? 'growing' : 'wild', ...none };
  return {
    course: s > 0 ? 'shrinking' : 'swinging',
    order,
    extrapolated: fine - e21 / (ratio21 ** order - 1),
    change,
    index: change === null ? null : gridIndex(change, order, ratio21),
  };
}

/** GCI = 1.25 e_a / (r21^p - 1). */
export function gridIndex(change: number, order: number, ratio21: number): number {
  return (SAFETY * change) / (ratio21 ** order - 1);
}

/** The p above zero with `ratio` = |e32 / e21| = r21^p (r32^p - s) / (r21^p - s), null where there is none. */
function observedOrder(ratio: number, s: 1 | -1, ratio21: number, ratio32: number): number | null {
  const wanted = Math.log(ratio);
  // in the limit of p = 0 the right side is ln r32 / ln r21 for s = 1, and 1 for s = -1
  if (wanted <= (s > 0 ? Math.log(Math.log(ratio32) / Math.log(ratio21)) : 0)) return null;
  // ln(1 - s r^-p), exact for small p
  const rest = (p: number, r: number): number => (s > 0 ? Math.log(-Math.expm1(-p * Math.log(r))) : Math.log1p(r ** -p));
  const found = (p: number): number => p * Math.log(ratio32) + rest(p, ratio32) - rest(p, ratio21);
  let high = 1;
  while (found(high) < wanted) high *= 2;
  let low = 0;
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (found(middle) < wanted) low = middle;
    else high = middle;
  }
  return high;
}
