/**
 * Liquid under air at rest in a closed tilted box: nothing moves. The interface starts level, so gravity and pressure balance; its
 * ends bend a little to meet the walls at a right angle, and come to rest as well. f64, thick liquid.
 */
import { createSimulation } from '../../../solver/index.ts';
import { advance, airBeside, CLOSED, fastest, profile } from '../channel.ts';
import { type Check, row } from '../row.ts';

const [W, SIGMA, VISCOSITY] = [5, 0.0032, 0.01];

/** Greatest speed in N x N cells after so many steps; gravity turned by the tilt, strong enough for rho g N^2/sigma = 4. */
export async function leftover(N: number, tilt_deg: number, steps: number): Promise<number> {
  const tilt = (tilt_deg * Math.PI) / 180;
  const g = (4 * SIGMA) / (N * N);
  const depth = (x: number, y: number) => -((x + 0.5 - N / 2) * Math.cos(tilt) + (y + 0.5 - N / 2) * Math.sin(tilt));
  const s = await createSimulation({
    ...{ nx: N, ny: N, sides: CLOSED, interfaceWidth: W, surfaceTension: SIGMA, precision: 'f64' },
    ...{ liquid: { density: 1, viscosity: VISCOSITY }, gas: airBeside(VISCOSITY) },
    gravity: { x: -g * Math.cos(tilt), y: -g * Math.sin(tilt) },
    initial: {
      phi: (x, y) => profile(depth(x, y), W),
      // p leaves out the liquid's hydrostatic pressure, so it grows upward in air
      pressure: (x, y) => Math.max(-depth(x, y), 0) * g * (1 - 1 / 832),
    },
  });
  advance(s, steps);
  return fastest(s);
}

export const check: Check = {
  name: 'at-rest',
  async run() {
    const rows = [];
    for (const tilt_deg of [0, 20]) {
      const ours = [{ cells: 48, value: await leftover(48, tilt_deg, 100_000) }];
      const part = { check: this.name, quantity: `tilt ${tilt_deg} deg: greatest speed after 1e5 steps`, source: 'rest [V]' };
      rows.push(row({ ...part, reference: 0, ours, scale: { absolute: '' }, gate: 1e-6 }));
    }
    return rows;
  },
};
