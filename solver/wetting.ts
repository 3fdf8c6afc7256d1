/**
 * Ghosts of phi in solids: the interface's own profile, gone on with from the fluid along the face's normal n (into the fluid). In
 * L = ln(phi/(1 - phi)), which is (4/W) times the distance from the interface, a plane interface that meets the face at theta has
 * dL/dn = -(4/W) cos(theta). With s the distance from the face, along n, the ghost at s = -d is found from L at two images in the fluid, s1
 * and s2, each where the normal meets a row (or column) of cells, between two cells of it:
 *
 *   L(-d) = (1 + k) L(s1) - k L(s2) + (4/W) cos(theta) [s1 + d - k (s2 - s1)],  k = (s1^2 - d^2)/(s2^2 - s1^2)
 *
 * the parabola with that slope at the face. Halfway before a straight wall s1 = d, k = 0. One image alone (k = 0) where the second lies in
 * a solid or beyond a side.
 */
import { ex, ey, w } from './lattice.ts';
import { cellAt } from './place.ts';
import type { Setup } from './setup.ts';

/** A solid cell next to fluid: L there is that of its neighbours, weighted, and `path` times (4/W) cos(theta) more. */
export interface SolidGhost {
  x: number;
  y: number;
  /** fluid cells; the weights add up to 1 */
  neighbours: { x: number; y: number; weight: number }[];
  /** cells */
  path: number;
}

type Neighbours = SolidGhost['neighbours'];

/** Below this, phi (1 - phi) holds nothing that wets. */
const PURE = 1e-6;
/** Most that L of neighbours may differ, in cells of the undisturbed profile; they lie sqrt(5) apart at most */
const STEEPEST = 3;

/** Half the step over which the normal is taken from the distance, cells. */
const HALF_STEP = 0.25;

/** The ghost of solid cell (x, y), or undefined where no fluid is next to it; `fluid` is 1 in fluid cells, shape (ny, nx). */
export function solidGhost(setup: Setup, fluid: Uint8Array, x: number, y: number): SolidGhost | undefined {
  const open = (cx: number, cy: number): { x: number; y: number } | undefined => {
    const cell = cellAt(setup, cx, cy);
    return cell !== undefined && fluid[cell[1] * setup.nx + cell[0]] === 1 ? { x: cell[0], y: cell[1] } : undefined;
  };
  const around: Neighbours = [];
  for (let k = 1; k < 9; k++) {
    const cell = open(x + ex[k], y + ey[k]);
    if (cell) around.push({ ...cell, weight: w[k] });
  }
  if (around.length === 0) return undefined;
  const straight = around.filter(({ weight }) => weight === w[1]);
  const mean = straight.length === 1 ? straight : around;
  const sum = mean.reduce((total, { weight }) => total + weight, 0);
  return alongNormal(setup, x, y, open) ?? { x, y, neighbours: mean.map((cell) => ({ ...cell, weight: cell.weight / sum })), path: 1 };
}

type Open = (x: number, y: number) => { x: number; y: number } | undefined;

function alongNormal(setup: Setup, x: number, y: number, open: Open): SolidGhost | undefined {
  const distance = setup.solidDistance;
  const d = distance ? -distance(x, y) : 0;
  if (!distance || !(d > 0 && d < 2)) return undefined;
  const slopeX = distance(x + HALF_STEP, y) - distance(x - HALF_STEP, y);
  const slopeY = distance(x, y + HALF_STEP) - distance(x, y - HALF_STEP);
  const steepness = Math.hypot(slopeX, slopeY);
  // on the middle line of a solid no face is the nearest
  if (!(steepness > HALF_STEP)) return undefined;
  const normal: [number, number] = [slopeX / steepness, slopeY / steepness];
  const [one, two] = [1, 2].map((rows) => imageOf(x, y, normal, rows, open));
  const first = one ?? two;
  if (!first) return undefined;
  const second = one ? two : imageOf(x, y, normal, 3, open);
  const [s1, s2] = [first.path - d, second ? second.path - d : 0];
  const k = second ? (s1 ** 2 - d ** 2) / (s2 ** 2 - s1 ** 2) : 0;
  if (!second || Math.abs(k) > 1) return { x, y, ...first };
  const neighbours = [
    ...first.neighbours.map((cell) => ({ ...cell, weight: (1 + k) * cell.weight })),
    ...second.neighbours.map((cell) => ({ ...cell, weight: -k * cell.weight })),
  ].filter(({ weight }) => weight !== 0);
  return { x, y, neighbours, path: first.path - k * (second.path - first.path) };
}

/** Where the normal from (x, y) meets the rows-th row (or column, if that is more across the normal), between two cells of it. */
function imageOf(x: number, y: number, [nx, ny]: [number, number], rows: number, open: Open): Omit<SolidGhost, 'x' | 'y'> | undefined {
  const alongY = Math.abs(ny) >= Math.abs(nx);
  const path = rows / Math.max(Math.abs(nx), Math.abs(ny));
  // to the last digits, so that a normal along the grid or its diagonals meets cells and not what is beside them
  const aside = Math.round((alongY ? nx : ny) * path * 1e9) / 1e9;
  const ahead = rows * Math.sign(alongY ? ny : nx);
  const low = Math.floor(aside);
  const share = aside - low;
  const neighbours: Neighbours = [];
  for (const [step, weight] of [
    [low, 1 - share],
    [low + 1, share],
  ]) {
    if (weight === 0) continue;
    const cell = alongY ? open(x + step, y + ahead) : open(x + ahead, y + step);
    if (!cell) return undefined;
    neighbours.push({ ...cell, weight });
  }
  return { neighbours, path };
}

/** Ghost of a cell that holds `phi` when ln(phi/(1 - phi)) grows by ln(c) towards it; phi beyond 0 to 1 stays as it is. */
export const wettedGhost = (c: number, phi: number): number => (phi < 0 || phi > 1 ? phi : (phi * c) / (1 - phi + phi * c));

/**
 * phi in a solid cell from `phi` of its neighbours. L is taken relative to that neighbour that is deepest in the interface, and no
 * further from it than STEEPEST, so that pure cells do not weigh without end.
 * @param c exp(4 cos(theta)/W)
 */
export function solidPhi({ neighbours, path }: SolidGhost, c: number, W: number, phi: (x: number, y: number) => number): number {
  const values = neighbours.map(({ x, y }) => phi(x, y));
  const base = values.reduce((best, value) => (value * (1 - value) > best * (1 - best) ? value : best));
  const mean = values.reduce((sum, value, n) => sum + neighbours[n].weight * value, 0);
  if (!(base * (1 - base) > PURE)) return mean;
  const most = STEEPEST * (4 / W);
  const odds = (value: number): number => (value <= 0 ? 0 : value >= 1 ? Number.POSITIVE_INFINITY : value / (1 - value));
  const L = values.map((value) => Math.min(Math.max(Math.log(odds(value) / odds(base)), -most), most));
  const shift = L.reduce((sum, value, n) => sum + neighbours[n].weight * value, 0);
  return wettedGhost(c ** path * Math.exp(shift), base);
}
