/**
 * Ghosts of the populations after collision, filled before a step so that every cell pulls in the same way; in the layout of
 * reference.ts. Solids return what met them; each side of the box returns what its kind says.
 */
import { type Box, wallSpeed } from './box.ts';
import { Q } from './constants.ts';
import { ex, ey, mirrorX, mirrorY, opposite, w } from './lattice.ts';
import type { Side } from './setup.ts';

/** Index of cell (x, y) in a field of shape (ny + 2, nx + 2). */
export const indexOf = (box: Box, x: number, y: number): number => (y + 1) * (box.nx + 2) + x + 1;

/**
 * @param set nine fields of one population
 * @param phi density of what a moving wall pushes; undefined for the interface population, which no wall pushes
 */
export function fillGhosts(box: Box, set: Float64Array[], phi: Float64Array | undefined): void {
  const { nx, ny, setup, geometry } = box;
  const { left, right, bottom, top } = setup.sides;
  const at = (x: number, y: number): number => indexOf(box, x, y);
  for (const { x, y, k, fluidX, fluidY } of geometry.links) set[k][at(x, y)] = set[opposite[k]][at(fluidX, fluidY)];
  if (bottom === 'periodic') {
    for (const field of set) {
      for (let y = 0; y < ny; y++) {
        field[at(-1, y)] = field[at(nx - 1, y)];
        field[at(nx, y)] = field[at(0, y)];
      }
    }
  } else {
    reflect(box, set, phi, bottom, 'x', 0, 1);
    reflect(box, set, phi, top, 'x', nx - 1, -1);
  }
  if (left === 'periodic') {
    const [from, to] = bottom === 'periodic' ? [-1, nx + 1] : [0, nx];
    for (const field of set) {
      for (let x = from; x < to; x++) {
        field[at(x, -1)] = field[at(x, ny - 1)];
        field[at(x, ny)] = field[at(x, 0)];
      }
    }
  } else {
    reflect(box, set, phi, left, 'y', 0, 1);
    reflect(box, set, phi, right, 'y', ny - 1, -1);
  }
}

/**
 * Fills the ghosts beyond one side from its first row of cells. `axis` is the one across the side, `edge` the row's
 * coordinate on it, `inward` the sign of the directions that come back. A wall sends each population back where it came
 * from, adding 2 w rho e.u/CS2 when it moves; a slip side mirrors it. In a corner of two sides that are not periodic the
 * diagonal goes straight back, with what both walls add.
 */
function reflect(
  box: Box,
  set: Float64Array[],
  phi: Float64Array | undefined,
  side: Side,
  axis: 'x' | 'y',
  edge: number,
  inward: 1 | -1,
): void {
  const { nx, ny } = box;
  const [eN, eT, length] = axis === 'y' ? [ey, ex, nx] : [ex, ey, ny];
  const { sides } = box.setup;
  const ends = axis === 'y' ? [sides.bottom, sides.top] : [sides.left, sides.right];
  const periodicT = ends[0] === 'periodic';
  const mirrored = axis === 'y' ? mirrorY : mirrorX;
  const speed = phi ? wallSpeed(side) : 0;
  const place = (t: number, n: number): number => (axis === 'y' ? indexOf(box, t, n) : indexOf(box, n, t));
  for (let k = 1; k < Q; k++) {
    if (eN[k] !== inward) continue;
    for (let t = 0; t < length; t++) {
      const ghost = place(t - eT[k], edge - inward);
      const corner = !periodicT && (t - eT[k] < 0 || t - eT[k] >= length);
      if (side === 'slip' && !corner) {
        set[k][ghost] = set[mirrored[k]][place((t - eT[k] + length) % length, edge)];
      } else {
        const rho = phi ? box.rhoGas + phi[place(t, edge)] * (box.rhoLiquid - box.rhoGas) : 0;
        const end = corner && phi ? eN[k] * wallSpeed(eT[k] > 0 ? ends[0] : ends[1]) : 0;
        set[k][ghost] = set[opposite[k]][place(t, edge)] + 6 * w[k] * rho * (eT[k] * speed + end);
      }
    }
  }
}
