/**
 * Ghosts of the populations after collision, filled before a step so that every cell pulls in the same way; in the layout of
 * reference.ts. Solids return what met them; each side of the box returns what its kind says.
 */
import type { Box } from './box.ts';
import { Q } from './constants.ts';
import { type FlowFields, wideIndex } from './forces.ts';
import { ex, ey, mirrorX, mirrorY, opposite, w } from './lattice.ts';
import type { Side } from './setup.ts';
import { wallSpeed } from './walls.ts';
import { solidPhi, wettedGhost } from './wetting.ts';

/** Index of cell (x, y) in a field of shape (ny + 2, nx + 2). */
export const indexOf = (box: Box, x: number, y: number): number => (y + 1) * (box.nx + 2) + x + 1;

/**
 * Ghosts of a box without gas.
 * @param set nine fields of the flow population
 */
export function fillGhosts(box: Box, set: Float64Array[]): void {
  const { nx, ny, setup, geometry } = box;
  const { left, right, bottom, top } = setup.sides;
  const at = (x: number, y: number): number => indexOf(box, x, y);
  for (const { x, y, k, fluidX, fluidY, second, weight } of geometry.links) {
    set[k][at(x, y)] = weight[0] * set[opposite[k]][at(fluidX, fluidY)] + weight[1] * set[second.k][at(second.x, second.y)];
  }
  wrap(box, set);
  if (bottom !== 'periodic') {
    reflect(box, set, bottom, 'x', 0, 1);
    reflect(box, set, top, 'x', nx - 1, -1);
  }
  if (left !== 'periodic') {
    reflect(box, set, left, 'y', 0, 1);
    reflect(box, set, right, 'y', ny - 1, -1);
  }
}

/** Copies what leaves through periodic sides to the ghosts of the far side. */
function wrap(box: Box, set: Float64Array[]): void {
  const { nx, ny, setup } = box;
  const at = (x: number, y: number): number => indexOf(box, x, y);
  for (const field of set) {
    if (setup.sides.bottom === 'periodic') {
      for (let y = 0; y < ny; y++) {
        field[at(-1, y)] = field[at(nx - 1, y)];
        field[at(nx, y)] = field[at(0, y)];
      }
    }
    if (setup.sides.left !== 'periodic') continue;
    const [from, to] = setup.sides.bottom === 'periodic' ? [-1, nx + 1] : [0, nx];
    for (let x = from; x < to; x++) {
      field[at(x, -1)] = field[at(x, ny - 1)];
      field[at(x, ny)] = field[at(x, 0)];
    }
  }
}

/** Ghosts of one population of a box with gas: periodic sides wrap, every wall returns what walls.ts lists. */
export function fillReturns(box: Box, set: Float64Array[], which: 'flow' | 'interface'): void {
  wrap(box, set);
  const returned = box.walls.returns.map((entry) => set[entry[which].k][indexOf(box, entry[which].x, entry[which].y)]);
  box.walls.returns.forEach(({ x, y, k }, n) => {
    set[k][indexOf(box, x, y)] = returned[n];
  });
}

/**
 * Ghosts of the arriving velocity and of P. In walls: of the first and second cell with the weights of walls.ts, halfway
 * -2 m1 + m2/3 + 8/3 U, so that the velocity is U on the wall and its slope there that of a parabola; P goes on straight. Slip sides hold images, periodic sides copies.
 */
export function fillWallGhosts(box: Box, { mx, my, P }: FlowFields): void {
  const { nx, ny, setup, walls } = box;
  const at = (x: number, y: number): number => indexOf(box, x, y);
  for (const { x, y, faces } of walls.ghosts) {
    let [u, v, p] = [0, 0, 0];
    for (const face of faces) {
      const i = at(face.x, face.y);
      const j = face.behind ? at(face.behind.x, face.behind.y) : i;
      u += face.ux + face.weight[0] * mx[i] + face.weight[1] * mx[j];
      v += face.uy + face.weight[0] * my[i] + face.weight[1] * my[j];
      p += 2 * P[wideIndex(box, i)] - P[wideIndex(box, j)];
    }
    const to = at(x, y);
    mx[to] = u / faces.length;
    my[to] = v / faces.length;
    P[wideIndex(box, to)] = p / faces.length;
  }
  const copy = (to: number, from: number, signX: number, signY: number): void => {
    mx[to] = signX * mx[from];
    my[to] = signY * my[from];
    P[wideIndex(box, to)] = P[wideIndex(box, from)];
  };
  const { left, right, bottom, top } = setup.sides;
  for (let x = -1; x <= nx; x++) {
    if (left === 'periodic') copy(at(x, -1), at(x, ny - 1), 1, 1);
    if (left === 'slip') copy(at(x, -1), at(x, 0), 1, -1);
    if (right === 'periodic') copy(at(x, ny), at(x, 0), 1, 1);
    if (right === 'slip') copy(at(x, ny), at(x, ny - 1), 1, -1);
  }
  for (let y = -1; y <= ny; y++) {
    if (bottom === 'periodic') copy(at(-1, y), at(nx - 1, y), 1, 1);
    if (bottom === 'slip') copy(at(-1, y), at(0, y), -1, 1);
    if (top === 'periodic') copy(at(nx, y), at(0, y), 1, 1);
    if (top === 'slip') copy(at(nx, y), at(nx - 1, y), -1, 1);
  }
}

/** Second ghosts of P, which only the coupling across a periodic or slip side reads. */
export function fillWide(box: Box, P: Float64Array): void {
  const { nx, ny, setup } = box;
  const at = (x: number, y: number): number => (y + 2) * (nx + 4) + x + 2;
  const acrossY = setup.sides.left === 'periodic';
  const acrossX = setup.sides.bottom === 'periodic';
  for (let x = 0; x < nx; x++) {
    P[at(x, -2)] = P[at(x, acrossY ? ny - 2 : 1)];
    P[at(x, ny + 1)] = P[at(x, acrossY ? 1 : ny - 2)];
  }
  for (let y = 0; y < ny; y++) {
    P[at(-2, y)] = P[at(acrossX ? nx - 2 : 1, y)];
    P[at(nx + 1, y)] = P[at(acrossX ? 1 : nx - 2, y)];
  }
}

/**
 * Fills the ghosts beyond one side from its first row of cells. `axis` is the one across the side, `edge` the row's
 * coordinate on it, `inward` the sign of the directions that come back. A wall sends each population back where it came
 * from, adding 2 w rho e.u/CS2 when it moves; a slip side mirrors it. In a corner of two sides that are not periodic the
 * diagonal goes straight back, with what both walls add.
 */
function reflect(box: Box, set: Float64Array[], side: Side, axis: 'x' | 'y', edge: number, inward: 1 | -1): void {
  const { nx, ny } = box;
  const [eN, eT, length] = axis === 'y' ? [ey, ex, nx] : [ex, ey, ny];
  const { sides } = box.setup;
  const ends = axis === 'y' ? [sides.bottom, sides.top] : [sides.left, sides.right];
  const periodicT = ends[0] === 'periodic';
  const mirrored = axis === 'y' ? mirrorY : mirrorX;
  const speed = wallSpeed(side);
  const place = (t: number, n: number): number => (axis === 'y' ? indexOf(box, t, n) : indexOf(box, n, t));
  for (let k = 1; k < Q; k++) {
    if (eN[k] !== inward) continue;
    for (let t = 0; t < length; t++) {
      const ghost = place(t - eT[k], edge - inward);
      const corner = !periodicT && (t - eT[k] < 0 || t - eT[k] >= length);
      if (side === 'slip' && !corner) {
        set[k][ghost] = set[mirrored[k]][place((t - eT[k] + length) % length, edge)];
      } else {
        const end = corner ? eN[k] * wallSpeed(eT[k] > 0 ? ends[0] : ends[1]) : 0;
        set[k][ghost] = set[opposite[k]][place(t, edge)] + 6 * w[k] * box.rhoLiquid * (eT[k] * speed + end);
      }
    }
  }
}

/** Ghosts of phi: walls and solids carry the wetting, slip sides images, periodic sides copies. */
export function fillPhiGhosts(box: Box, phi: Float64Array): void {
  const { nx, ny, setup, geometry, wetting } = box;
  const at = (x: number, y: number): number => indexOf(box, x, y);
  for (const ghost of geometry.ghosts) {
    phi[at(ghost.x, ghost.y)] = solidPhi(ghost, wetting, box.W, (x, y) => phi[at(x, y)]);
  }
  const beyond = (side: Side, inside: number, across: number): number =>
    side === 'periodic' ? phi[across] : side === 'slip' ? phi[inside] : wettedGhost(wetting, phi[inside]);
  const { left, right, bottom, top } = setup.sides;
  for (let x = 0; x < nx; x++) {
    phi[at(x, -1)] = beyond(left, at(x, 0), at(x, ny - 1));
    phi[at(x, ny)] = beyond(right, at(x, ny - 1), at(x, 0));
  }
  for (let y = -1; y <= ny; y++) {
    phi[at(-1, y)] = beyond(bottom, at(0, y), at(nx - 1, y));
    phi[at(nx, y)] = beyond(top, at(nx - 1, y), at(0, y));
  }
}
