/** Which populations touch which solid body, worked out once: what bodyforce.ts adds up. */
import type { Geometry } from './geometry.ts';
import { ex, ey, opposite } from './lattice.ts';
import type { Setup } from './setup.ts';
import type { Walls } from './walls.ts';

/** A population that a body returns. */
export interface Touch {
  /** place it is pulled from, -1 .. nx, -1 .. ny, and its direction */
  x: number;
  y: number;
  k: number;
  /** cell it reaches */
  fluidX: number;
  fluidY: number;
  /** direction in which it left the fluid */
  left: number;
  /** bodies that take the force along x, along y; 0: none */
  bodyX: number;
  bodyY: number;
}

export interface Bodies {
  count: number;
  touches: Touch[];
}

/** The touches of every body; without `setup.bodies` all solids are one. */
export function bodies(setup: Setup, { fluid, links }: Geometry, { returns }: Walls): Bodies {
  const { nx, ny, sides } = setup;
  const bodyOf = (i: number): number => (fluid[i] === 1 ? 0 : (setup.bodies?.[i] ?? 1));
  const body = (x0: number, y0: number): number => {
    const x = sides.bottom === 'periodic' ? (x0 + nx) % nx : x0;
    const y = sides.left === 'periodic' ? (y0 + ny) % ny : y0;
    return x < 0 || x >= nx || y < 0 || y >= ny ? 0 : bodyOf(y * nx + x);
  };
  const count = fluid.reduce((most, _, i) => Math.max(most, bodyOf(i)), 0);
  const touches: Touch[] =
    setup.gas === undefined
      ? links.map(({ x, y, k, fluidX, fluidY }) => {
          const own = body(x, y);
          return { x, y, k, fluidX, fluidY, left: opposite[k], bodyX: own, bodyY: own };
        })
      : returns.map(({ x: sx, y: sy, k, flow }) => {
          const [x, y] = [sx + ex[k], sy + ey[k]];
          // in a corner each face takes what is normal to it
          const [bodyX, bodyY] = [body(sx, y) || body(sx, sy), body(x, sy) || body(sx, sy)];
          return { x: sx, y: sy, k, fluidX: x, fluidY: y, left: flow.k, bodyX, bodyY };
        });
  return { count, touches: touches.filter(({ bodyX, bodyY }) => bodyX > 0 || bodyY > 0) };
}
