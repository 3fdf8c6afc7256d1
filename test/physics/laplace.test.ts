import { describe, expect, it } from 'vitest';
import { createSimulation, type Simulation } from '../../solver/index.ts';
import { PERIODIC, settle } from './channel.ts';

/**
 * A bubble of radius 20 at rest at the true ratios of air and water, 832:1 and 55:1 (REFERENCES section 5, 20 C). Surface tension as
 * in an 8 mm gap of 80 cells at a lattice velocity of 0.02 for 0.3 m/s: 0.0727 N/m / (998 kg/m3 * 0.1 mm * (15 m/s)^2) = 0.0032.
 * Set SWATHE_SLOW=1 for the run of 1e5 steps (40 s); otherwise 2e4 steps are done and their share of the drift is asked for.
 */
const [N, RADIUS, W, SIGMA] = [80, 20, 5, 0.0032];
const STEPS = process.env.SWATHE_SLOW === '1' ? 100_000 : 20_000;

async function bubble(viscosity: number): Promise<Simulation> {
  // off the lattice on purpose
  const phi = (x: number, y: number) => 0.5 + 0.5 * Math.tanh((2 * (Math.hypot(x - N / 2 + 0.3, y - N / 2 + 0.7) - RADIUS)) / W);
  return createSimulation({
    ...{ nx: N, ny: N, sides: PERIODIC, interfaceWidth: W, surfaceTension: SIGMA },
    ...{ liquid: { density: 1, viscosity }, gas: { density: 1 / 832, viscosity: viscosity / 55 } },
    initial: { phi, pressure: (x, y) => ((1 - phi(x, y)) * SIGMA) / RADIUS },
  });
}

/** p in the middle less p in the far corner, over sigma/R of the circle of the same area. */
function jump(s: Simulation): number {
  const radius = Math.sqrt(s.totals().gasArea / Math.PI);
  return (s.pressure.get(N / 2, N / 2) - s.pressure.get(0, 0)) / (SIGMA / radius);
}

describe('a bubble at rest', () => {
  it('holds the Laplace pressure sigma/R within 2 %, air in water', async () => {
    // Laplace, plane: dp = sigma/R, REFERENCES section 3. A thick liquid, so that the breathing of the start dies away:
    // gas 832 times lighter gives way to sound, with a period of some 2500 steps, over which the mean is taken.
    const s = await bubble(0.01);
    settle(s, 12_000);
    let mean = 0;
    for (let n = 0; n < 25; n++) {
      settle(s, 100);
      mean += jump(s) / 25;
    }
    // seen 1.0015
    expect(Math.abs(mean - 1)).toBeLessThan(0.02);
  });

  it(`neither drifts nor loses gas in ${STEPS} steps in f32, with the viscosity of water`, async () => {
    const s = await bubble(6.7e-4);
    const before = s.totals().gasArea;
    settle(s, STEPS);
    const drift = s.totals().gasArea / before - 1;
    const middle = { x: 0, y: 0 };
    let fastestLiquid = 0;
    for (let y = 0; y < N; y++) {
      for (let x = 0; x < N; x++) {
        middle.x += ((1 - s.phi.get(x, y)) * x) / before;
        middle.y += ((1 - s.phi.get(x, y)) * y) / before;
        if (s.phi.get(x, y) > 0.99) fastestLiquid = Math.max(fastestLiquid, Math.hypot(s.ux.get(x, y), s.uy.get(x, y)));
      }
    }
    // the gate is 1e-3 in 1e5 steps; seen 1.3e-4 in 2e4
    expect(Math.abs(drift)).toBeLessThan((1e-3 * STEPS) / 100_000);
    expect(Math.hypot(middle.x - (N / 2 - 0.3), middle.y - (N / 2 - 0.7))).toBeLessThan(0.1);
    // currents that a sharp interface would not have, 4e-4 were seen; 0.02 is the lattice velocity of 0.3 m/s
    expect(fastestLiquid).toBeLessThan(2e-3);
  });
});
