import { ex, ey, opposite } from './lattice.ts';
import { cellAt } from './place.ts';
import type { Setup } from './setup.ts';
import { type SolidGhost, solidGhost } from './wetting.ts';

/**
 * A pull from a solid cell: what leaves the fluid cell against `k` comes back along `k`, from a face at the share q of the way to the
 * solid cell. Its slot is filled with weight[0] times what left, and weight[1] times a second population:
 *
 *   q < 1/2    2 q, and 1 - 2 q of what left the cell behind, on its way to the fluid cell
 *   q >= 1/2   1/(2 q), and 1 - 1/(2 q) of what leaves the fluid cell along k
 *
 * Halfway, weights 1 and 0, where no face is told and where q < 1/2 but no fluid cell lies behind.
 * @see Bouzidi, Firdaouss & Lallemand 2001, Phys. Fluids 13, 3452 (linear form; from memory, rederived)
 */
interface Link {
  /** solid cell whose slot `k` is filled */
  x: number;
  y: number;
  k: number;
  /** fluid cell x + ex[k], y + ey[k] (wrapped where a side is periodic) */
  fluidX: number;
  fluidY: number;
  second: { x: number; y: number; k: number };
  weight: [number, number];
}

/** What the solids of a box amount to, worked out once. */
export interface Geometry {
  links: Link[];
  ghosts: SolidGhost[];
  /** 1 fluid, 0 solid; shape (ny, nx) */
  fluid: Uint8Array;
  /** runs of solid cells per row: [y, first x, end x) */
  runs: [number, number, number][];
  /**
   * Weights of the first and second cell in the wall value of the shear, per x: 1.5 and -0.5 (linear extrapolation to the
   * halfway wall), 1 and 0 where a solid stands on the second cell, 0 and 0 where it stands on the first; shape (nx)
   */
  wallWeights: { left: [Float64Array, Float64Array]; right: [Float64Array, Float64Array] };
}

/**
 * Share of the way from the fluid cell, one along `k` from the solid cell (x, y), to the solid cell at which the face lies: where the
 * distance vanishes, by bisection; 1/2 where none is told or it has the same sign at both ends.
 */
export function wayToFace(setup: Setup, x: number, y: number, k: number): number {
  const distance = setup.solidDistance;
  if (!distance || !(distance(x, y) <= 0) || !(distance(x + ex[k], y + ey[k]) > 0)) return 0.5;
  let [low, high] = [0, 1];
  for (let n = 0; n < 40; n++) {
    const q = (low + high) / 2;
    if (distance(x + (1 - q) * ex[k], y + (1 - q) * ey[k]) > 0) low = q;
    else high = q;
  }
  return high;
}

function interpolation(
  q: number,
  k: number,
  [x, y]: [number, number],
  behind: [number, number] | undefined,
): Pick<Link, 'second' | 'weight'> {
  if (q >= 0.5) return { second: { x, y, k }, weight: [1 / (2 * q), 1 - 1 / (2 * q)] };
  if (behind === undefined) return { second: { x, y, k }, weight: [1, 0] };
  return { second: { x: behind[0], y: behind[1], k: opposite[k] }, weight: [2 * q, 1 - 2 * q] };
}

/** Links, ghosts and wall weights of a box's solid cells. */
export function geometry(setup: Setup): Geometry {
  const { nx, ny } = setup;
  const fluid = new Uint8Array(nx * ny).fill(1);
  const links: Link[] = [];
  const ghosts: SolidGhost[] = [];
  const runs: [number, number, number][] = [];
  if (setup.solid) for (let i = 0; i < fluid.length; i++) fluid[i] = setup.solid[i] === 0 ? 1 : 0;
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) {
      if (fluid[y * nx + x] === 1) continue;
      const run = runs.at(-1);
      if (run && run[0] === y && run[2] === x) run[2] = x + 1;
      else runs.push([y, x, x + 1]);
      for (let k = 1; k < 9; k++) {
        const cell = cellAt(setup, x + ex[k], y + ey[k]);
        if (cell === undefined || fluid[cell[1] * nx + cell[0]] === 0) continue;
        const behind = cellAt(setup, cell[0] + ex[k], cell[1] + ey[k]);
        const open = behind !== undefined && fluid[behind[1] * nx + behind[0]] === 1;
        links.push({
          x,
          y,
          k,
          fluidX: cell[0],
          fluidY: cell[1],
          ...interpolation(wayToFace(setup, x, y, k), k, cell, open ? behind : undefined),
        });
      }
      const ghost = solidGhost(setup, fluid, x, y);
      if (ghost) ghosts.push(ghost);
    }
  }
  return { links, ghosts, fluid, runs, wallWeights: { left: wallWeights(fluid, nx, 0, 1), right: wallWeights(fluid, nx, ny - 1, ny - 2) } };
}

function wallWeights(fluid: Uint8Array, nx: number, first: number, second: number): [Float64Array, Float64Array] {
  const a = new Float64Array(nx);
  const b = new Float64Array(nx);
  for (let x = 0; x < nx; x++) {
    if (fluid[first * nx + x] === 0) continue;
    const open = second >= 0 && second * nx < fluid.length && fluid[second * nx + x] === 1;
    a[x] = open ? 1.5 : 1;
    b[x] = open ? -0.5 : 0;
  }
  return [a, b];
}
