import type { Box } from './box.ts';
import { fromMoments, velocityMoments } from './collide.ts';
import { CS2 } from './constants.ts';

/** Equilibrium populations of a cell: f, and g less w. */
export function equilibriumState(box: Box, phi: number, ux: number, uy: number, p: number): { f: Float64Array; g: Float64Array } {
  const rho = box.rhoLiquid;
  const u2 = ux * ux + uy * uy;
  const f = new Float64Array(9);
  const g = new Float64Array(9);
  if (box.twoPhase) {
    velocityMoments(f, (3 * p) / rho, p / rho, ux, uy, 0, 0);
  } else {
    const [jx, jy] = [rho * ux, rho * uy];
    fromMoments(f, 0, jx, jy, p + jx * ux, p + jy * uy, jx * uy, CS2 * jy, CS2 * jx, CS2 * (p + rho * u2));
  }
  const z = phi - 1;
  const [kx, ky] = [phi * ux, phi * uy];
  fromMoments(g, z, kx, ky, CS2 * z + kx * ux, CS2 * z + ky * uy, kx * uy, CS2 * ky, CS2 * kx, CS2 * (CS2 * z + phi * u2));
  return { f, g };
}

/** What `placeCircle` reads and writes of a cell. */
export interface CellAccess {
  phi(x: number, y: number): number;
  ux(x: number, y: number): number;
  uy(x: number, y: number): number;
  pressure(x: number, y: number): number;
  set(x: number, y: number, phi: number, ux: number, uy: number, p: number): void;
}

/**
 * Lowers phi to 1/2 + 1/2 tanh(2 d / W), d the distance from the circle, where that is lower. Velocity stays. Gas bears no more
 * pressure gradient than its weight: in proportion to the gas that is new, the pressure becomes that of a bubble at rest, the
 * mean of what it finds, the Laplace pressure sigma / radius and its hydrostatic share. The pressure gradient that turns a vortex of
 * liquid would throw gas 800 times as hard.
 * @returns gas area added
 */
export function placeCircle(box: Box, circle: { x: number; y: number; radius: number }, cells: CellAccess): number {
  if (!(circle.radius > 0)) throw new RangeError(`placeGas: radius is ${circle.radius}; it must be positive`);
  const { nx, ny, setup, geometry } = box;
  const reach = circle.radius + 3 * box.W;
  const wrap = (d: number, n: number, periodic: boolean): number => (periodic ? d - n * Math.round(d / n) : d);
  const lighter = box.rhoLiquid - box.rhoGas;
  const fresh: { x: number; y: number; profile: number; gas: number; weight: number }[] = [];
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) {
      if (geometry.fluid[y * nx + x] === 0) continue;
      const dx = wrap(x - circle.x, nx, setup.sides.bottom === 'periodic');
      const dy = wrap(y - circle.y, ny, setup.sides.left === 'periodic');
      const d = Math.hypot(dx, dy);
      if (d > reach) continue;
      const profile = 0.5 + 0.5 * Math.tanh((2 * (d - circle.radius)) / box.W);
      const gas = cells.phi(x, y) - profile;
      if (gas > 0) fresh.push({ x, y, profile, gas, weight: -lighter * (box.gravityX * dx + box.gravityY * dy) });
    }
  }
  const added = fresh.reduce((sum, { gas }) => sum + gas, 0);
  const mean = fresh.reduce((sum, { x, y, gas }) => sum + gas * cells.pressure(x, y), 0) / Math.max(added, 1e-30);
  for (const { x, y, profile, gas, weight } of fresh) {
    const p = cells.pressure(x, y);
    cells.set(x, y, profile, cells.ux(x, y), cells.uy(x, y), p + gas * (mean + box.sigma / circle.radius + weight - p));
  }
  return added;
}
