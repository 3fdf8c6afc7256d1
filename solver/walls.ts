/**
 * What every wall of a box with gas amounts to, as lists worked out once: straight sides and the faces of solids alike.
 * A wall reflects the flow populations like a mirror, so that they carry no friction at all; the friction is a viscous force of
 * its own, made from ghost values of the velocity. What a wall sends back and what it is felt by therefore agree to round-off.
 */
import { wayToFace } from './geometry.ts';
import { ex, ey, mirrorX, mirrorY, opposite } from './lattice.ts';
import type { Setup, Side } from './setup.ts';

/** A population that arrives at a cell from a wall: where it is pulled from, and which populations of which cells stand in. */
interface Return {
  /** place it is pulled from, -1 .. nx, -1 .. ny, and its direction */
  x: number;
  y: number;
  k: number;
  /** stand-in of f: mirrored where the wall is straight, straight back in its corners */
  flow: { x: number; y: number; k: number };
  /** stand-in of g: straight back, mirrored on slip sides */
  interface: { x: number; y: number; k: number };
}

/** A place in a wall next to fluid, with ghost values of velocity and pressure as means over its `faces`. */
interface WallGhost {
  x: number;
  y: number;
  /** cell at the face, the cell behind it (undefined: none), weights of their velocities, what the velocity of the wall adds */
  faces: {
    x: number;
    y: number;
    behind: { x: number; y: number } | undefined;
    weight: [own: number, behind: number];
    ux: number;
    uy: number;
  }[];
}

export interface Walls {
  returns: Return[];
  ghosts: WallGhost[];
  /** 1 where momentum passes, 0 in solids and walls, with a ring of ghosts; shape (ny + 2, nx + 2) */
  open: Uint8Array;
}

type Kind = 'fluid' | 'wall' | 'slip';

/** Tangential speed of a side's wall. */
export const wallSpeed = (side: Side): number => (typeof side === 'object' ? side.speed : 0);

/** Lists of a box's walls; `fluid` is 1 in fluid cells, shape (ny, nx). */
export function walls(setup: Setup, fluid: Uint8Array): Walls {
  const { nx, ny, sides } = setup;
  const wrapX = (x: number): number => (sides.bottom === 'periodic' ? ((x % nx) + nx) % nx : x);
  const wrapY = (y: number): number => (sides.left === 'periodic' ? ((y % ny) + ny) % ny : y);
  const kind = (x0: number, y0: number): Kind => {
    const [x, y] = [wrapX(x0), wrapY(y0)];
    const beyond = [];
    if (x < 0) beyond.push(sides.bottom);
    if (x >= nx) beyond.push(sides.top);
    if (y < 0) beyond.push(sides.left);
    if (y >= ny) beyond.push(sides.right);
    if (beyond.length === 0) return fluid[y * nx + x] === 1 ? 'fluid' : 'wall';
    return beyond.every((side) => side === 'slip') ? 'slip' : 'wall';
  };
  const isFluid = (x: number, y: number): boolean => kind(x, y) === 'fluid';

  const returns: Return[] = [];
  const open = new Uint8Array((nx + 2) * (ny + 2));
  for (let y = -1; y <= ny; y++) {
    for (let x = -1; x <= nx; x++) {
      // beyond a slip side lies the image of what is before it
      const insideX = Math.min(Math.max(wrapX(x), 0), nx - 1);
      const insideY = Math.min(Math.max(wrapY(y), 0), ny - 1);
      open[(y + 1) * (nx + 2) + x + 1] = kind(x, y) === 'wall' || !isFluid(insideX, insideY) ? 0 : 1;
      if (x < 0 || x >= nx || y < 0 || y >= ny || !isFluid(x, y)) continue;
      for (let k = 1; k < 9; k++) {
        const [sx, sy] = [x - ex[k], y - ey[k]];
        const met = kind(sx, sy);
        if (met === 'fluid') continue;
        const back = { x, y, k: opposite[k] };
        const alongX = k >= 5 && isFluid(sx, y);
        const alongY = k >= 5 && isFluid(x, sy);
        let mirrored = back;
        if (alongX && !alongY) mirrored = { x: wrapX(sx), y, k: mirrorY[k] };
        if (alongY && !alongX) mirrored = { x, y: wrapY(sy), k: mirrorX[k] };
        returns.push({ x: sx, y: sy, k, flow: mirrored, interface: met === 'slip' ? mirrored : back });
      }
    }
  }
  return { returns, ghosts: ghosts(setup, kind, wrapX, wrapY), open };
}

/**
 * Weights of the first cell and of the one behind in the ghost value whose parabola through both takes the wall's velocity at the
 * share q of the way to the ghost; of the straight line where no cell lies behind.
 */
function slopeWeights(q: number, behind: boolean): [number, number] {
  return behind ? [(-2 * (1 - q)) / q, (1 - q) / (1 + q)] : [-(1 - q) / q, 0];
}

/**
 * Least q that the explicit friction bears: what a face takes in a step, 2 nu (1 + 2 (1 - q)/q), stays below what it takes halfway at
 * the highest viscosity a box may have (box.ts).
 */
function leastWay({ liquid, gas = liquid }: Setup): number {
  const nu = Math.max(liquid.viscosity / liquid.density, gas.viscosity / gas.density);
  return Math.min(0.5, 1 / (1 + (0.48 / nu - 1) / 2));
}

type Wrap = (at: number) => number;

function ghosts(setup: Setup, kind: (x: number, y: number) => Kind, wrapX: Wrap, wrapY: Wrap): WallGhost[] {
  const { nx, ny, sides } = setup;
  const found: WallGhost[] = [];
  const least = leastWay(setup);
  for (let y = -1; y <= ny; y++) {
    for (let x = -1; x <= nx; x++) {
      // images of a wall beyond a periodic side are copied, not made
      if (wrapX(x) !== x || wrapY(y) !== y || kind(x, y) !== 'wall') continue;
      const ux = y < 0 ? wallSpeed(sides.left) : y >= ny ? wallSpeed(sides.right) : 0;
      const uy = x < 0 ? wallSpeed(sides.bottom) : x >= nx ? wallSpeed(sides.top) : 0;
      const faces: WallGhost['faces'] = [];
      for (let k = 1; k < 9; k++) {
        if (k === 5 && faces.length > 0) break;
        if (kind(x + ex[k], y + ey[k]) !== 'fluid') continue;
        const [bx, by] = [x + 2 * ex[k], y + 2 * ey[k]];
        const behind = kind(bx, by) === 'fluid' ? { x: wrapX(bx), y: wrapY(by) } : undefined;
        const inSolid = x >= 0 && x < nx && y >= 0 && y < ny;
        const weight = slopeWeights(inSolid ? Math.max(wayToFace(setup, x, y, k), least) : 0.5, behind !== undefined);
        const ofWall = 1 - weight[0] - weight[1];
        faces.push({ x: wrapX(x + ex[k]), y: wrapY(y + ey[k]), behind, weight, ux: ofWall * ux, uy: ofWall * uy });
      }
      if (faces.length > 0) found.push({ x, y, faces });
    }
  }
  return found;
}
