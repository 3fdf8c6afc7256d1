import { describe, expect, it } from 'vitest';
import { createReference, createSimulation, type Setup } from '../../solver/index.ts';

/** Liquid under a pressure that rises across the box, as beside a vortex; gravity along -x. */
const SETUP: Setup = {
  ...{ nx: 64, ny: 48, liquid: { density: 1, viscosity: 0.01 }, gas: { density: 1 / 829, viscosity: 1e-4 }, precision: 'f64' },
  sides: { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' },
  ...{ surfaceTension: 0.002, gravity: { x: -8e-6, y: 0 } },
  initial: { pressure: (_, y) => 1e-4 * (y - 23.5), velocity: () => ({ x: 0.01, y: -0.005 }) },
};

describe('gas put into liquid', () => {
  it.each([
    ['reference', async () => createReference(SETUP)],
    ['kernel', () => createSimulation(SETUP)],
  ] as const)('bears no pressure gradient but its weight, holds the Laplace pressure, and keeps the velocity (%s)', async (_, make) => {
    const s = await make();
    const added = s.placeGas({ x: 30, y: 23.5, radius: 14 });
    // the tails of the profile hold a little more than the circle
    expect(added / (Math.PI * 14 ** 2)).toBeCloseTo(1, 1);
    expect(s.totals().gasArea).toBeCloseTo(added, 9);
    const across = (s.pressure.get(30, 26) - s.pressure.get(30, 21)) / 5;
    const along = (s.pressure.get(33, 23) - s.pressure.get(27, 23)) / 6;
    // gas of 1/829 keeps that share of what it found; weight: (rho - rhoLiquid) g
    expect(Math.abs(across)).toBeLessThan(2e-6);
    expect(along).toBeCloseTo(8e-6 * (1 - 1 / 829), 7);
    const middle = (s.pressure.get(30, 23) + s.pressure.get(30, 24)) / 2;
    expect(middle / (0.002 / 14)).toBeCloseTo(1, 1);
    expect([s.ux.get(30, 23), s.uy.get(30, 23)]).toEqual([0.01, -0.005]);
  });
});
