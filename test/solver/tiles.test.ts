import { expect, it } from 'vitest';
import { createSimulation, type Setup, type Simulation } from '../../solver/index.ts';
import { FIELDS, MILD_PAIR, roundBubble } from './boxes.ts';

/** Water and air in lattice units, as in a channel of 8 mm with 80 cells across. */
const PAIR = {
  liquid: { density: 1, viscosity: 6.7e-4 },
  gas: { density: 1.2e-3, viscosity: 1.2e-5 },
  surfaceTension: 3.2e-3,
} as const;

/** Largest difference of each field. */
function differences(a: Simulation, b: Simulation): Record<string, number> {
  const { nx, ny } = a.setup;
  const worst: Record<string, number> = {};
  for (const name of FIELDS) {
    worst[name] = 0;
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) worst[name] = Math.max(worst[name], Math.abs(a[name].get(x, y) - b[name].get(x, y)));
    }
  }
  return worst;
}

async function both(setup: Setup, steps: number): Promise<{ found: Record<string, number>; tiled: Simulation; whole: Simulation }> {
  const [tiled, whole] = [await createSimulation(setup), await createSimulation({ ...setup, tiles: false })];
  for (const s of [tiled, whole]) expect(s.advance(steps)).toEqual({ kind: 'ok', step: steps });
  return { found: differences(tiled, whole), tiled, whole };
}

/** Differences that are allowed, with what was seen at most beside. phi differs in the liquid, where it is no part of the flow. */
const ALLOWED: Record<string, number> = {
  phi: 1e-2, // 3.3e-3
  ux: 5e-4, // 9.7e-5, at speeds of 0.05 to 0.38
  uy: 5e-4, // 5.6e-5
  pressure: 5e-6, // 6.5e-7
};
/** of the gas: 7e-6 were seen */
const GAS = 5e-5;

async function check(setup: Setup, steps: number): Promise<void> {
  const { found, tiled, whole } = await both(setup, steps);
  for (const name of FIELDS) {
    expect(found[name], name).toBeLessThan(ALLOWED[name]);
    // the same bits would mean that no tile was ever left alone
    expect(found[name]).toBeGreaterThan(0);
  }
  expect(Math.abs(tiled.totals().gasArea / whole.totals().gasArea - 1)).toBeLessThan(GAS);
}

it('follows a bubble at the limit of speed across many tiles as if every tile were active', async () => {
  const setup: Setup = {
    ...{ nx: 320, ny: 96, ...MILD_PAIR, surfaceTension: 0.003, precision: 'f64' },
    gasSpeedLimit: Number.POSITIVE_INFINITY,
    sides: { left: 'periodic', right: 'periodic', bottom: 'periodic', top: 'periodic' },
    // 0.38 of the 0.4 at which a run ends
    initial: { phi: roundBubble(60, 40, 14), velocity: () => ({ x: 0.34, y: 0.17 }) },
  };
  await check(setup, 400);
});

it('gives the flow of a driven channel with a bubble of air as if every tile were active, and makes no gas', async () => {
  const [nx, ny] = [400, 64];
  const setup: Setup = {
    ...{ nx, ny, ...PAIR, soundDamping: 0.01, precision: 'f64' },
    sides: { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' },
    gravity: { x: -4.4e-6, y: -1e-6 },
    drive: { kind: 'loss', coefficient: 1e-4 },
    initial: { phi: roundBubble(100, 30, 14), velocity: (_, y) => ({ x: (0.2 * (y + 0.5) * (ny - 0.5 - y)) / ny ** 2, y: 0 }) },
  };
  await check(setup, 1000);
});
