/**
 * Plane Poiseuille flow between halfway walls N cells apart under a force G: wall shear G N/2, velocity G/(2 eta) s (N - s) at the
 * distance s from the wall. Textbook solution.
 */
import { createSimulation, type Samples } from '../../../solver/index.ts';
import { CHANNEL, meanOf, settle } from '../channel.ts';
import { type Check, row } from '../row.ts';

export interface Poiseuille {
  samples: Samples;
  G: number;
  /** u - u_exact, cell by cell */
  excess: number[];
  /** wall shear over G N/2; left, right */
  shear: number[];
}

export async function poiseuille(N: number, tau: number, uMax: number, precision: 'f32' | 'f64', last = 1): Promise<Poiseuille> {
  const eta = (tau - 0.5) / 3;
  const G = (8 * eta * uMax) / (N * N);
  const exact = (y: number): number => (G / (2 * eta)) * (y + 0.5) * (N - 0.5 - y);
  const velocity = (_: number, y: number) => ({ x: exact(y), y: 0 });
  const simulation = await createSimulation({
    ...{ nx: 4, ny: N, sides: CHANNEL, precision },
    ...{ liquid: { density: 1, viscosity: eta }, force: { x: G, y: 0 }, initial: { velocity } },
  });
  // the slowest part of the start decays with exp(-pi^2 eta t / N^2): 25 of its times, e^-25
  const samples = settle(simulation, last + Math.ceil((25 * N * N) / (Math.PI ** 2 * eta)), last);
  const excess = Array.from({ length: N }, (_, y) => simulation.ux.get(1, y) - exact(y));
  return { samples, G, excess, shear: [samples.shear.left, samples.shear.right].map((rows) => meanOf(rows) / ((G * N) / 2)) };
}

/** Root mean square of u - u_exact over u_max = 0.02. */
export const velocityError = ({ excess }: Poiseuille): number =>
  Math.sqrt(excess.reduce((sum, e) => sum + e * e, 0) / excess.length) / 0.02;

/**
 * u - u_exact = u_max (16 L/3 - 1)/N^2 [V]. The odd moments relax with rate 1 and the shear with 1/tau, so
 * L = (tau - 1/2)(1 - 1/2).
 */
export const slipLaw = (tau: number, N: number): number => (0.02 * ((16 * (tau - 0.5)) / 6 - 1)) / N ** 2;

const farthest = (values: number[], from: number): number =>
  values.reduce((far, value) => (Math.abs(value - from) > Math.abs(far - from) ? value : far), from);

export const check: Check = {
  name: 'poiseuille',
  async run() {
    const part = { check: this.name, source: 'textbook solution [V]' };
    const grids = [8, 16, 32];
    const flows = [];
    for (const N of grids) flows.push(await poiseuille(N, 0.6, 0.02, 'f64'));
    const shear = flows.map((flow, n) => ({ cells: grids[n], value: farthest(flow.shear, 1) }));
    const velocity = flows.map((flow, n) => ({ cells: grids[n], value: velocityError(flow) }));
    const rows = [
      row({ ...part, quantity: 'wall shear / (G N/2)', reference: 1, ours: shear, gate: 0.1 }),
      row({ ...part, quantity: 'rms error of u / u_max', reference: 0, scale: 1, ours: velocity, orderGate: 2 }),
    ];
    for (const tau of [0.6, 0.75, 1.2]) {
      const { excess } = await poiseuille(32, tau, 0.02, 'f64');
      const value = farthest(
        excess.map((e) => e / slipLaw(tau, 32)),
        1,
      );
      const quantity = `slip at the wall / slip law, tau ${tau}`;
      rows.push(
        row({ ...part, source: 'slip law of the halfway wall [V]', quantity, reference: 1, ours: [{ cells: 32, value }], gate: 1 }),
      );
    }
    const { samples, G } = await poiseuille(32, 0.7, 0.05, 'f32', 2000);
    const balance = (meanOf(samples.shear.left) + meanOf(samples.shear.right)) / (G * 32);
    rows.push(row({ ...part, quantity: 'wall forces / drive, f32', reference: 1, ours: [{ cells: 32, value: balance }], gate: 0.01 }));
    return rows;
  },
};
