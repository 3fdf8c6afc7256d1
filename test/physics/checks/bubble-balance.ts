/**
 * A bubble of 3.5 mm that rises through a periodic box without walls: its buoyancy is what the loss of the loop takes and what the
 * mixture gains in momentum, and nothing else [V]. Water and air at 20 degrees; `across` cells are 8 mm, 0.3 m/s the lattice velocity 0.02.
 */
import { createSimulation, type Simulation } from '../../../solver/index.ts';
import { advance, airBeside, PERIODIC, profile } from '../channel.ts';
import { type Check, row } from '../row.ts';

const W = 5;
const GAS = 1 / 832;

/** Momentum along x. */
function momentum({ setup, phi, ux }: Simulation): number {
  let sum = 0;
  for (let y = 0; y < setup.ny; y++) {
    for (let x = 0; x < setup.nx; x++) sum += ux.get(x, y) * (1 - (1 - phi.get(x, y)) * (1 - GAS));
  }
  return sum;
}

/** Share of the buoyancy of its gas area that loss and gain account for, over the second half of 0.45 s. */
export async function accounted(across: number, mobility = 0.1): Promise<number> {
  const [nx, ny, R] = [2.5 * across, across, (1.75 / 8) * across];
  const dx_m = 0.008 / across;
  const dt_s = (dx_m * 0.02) / 0.3;
  const g = (9.80665 * dt_s ** 2) / dx_m;
  const sigma = (0.0727 * dt_s ** 2) / (998.2 * dx_m ** 3);
  const viscosity = (1e-6 * dt_s) / dx_m ** 2;
  const coefficient = 1 / nx;
  const phi = (x: number, y: number) => profile(Math.hypot(x - nx / 2, y - 0.62 * ny) - R, W);
  const s = await createSimulation({
    ...{ nx, ny, sides: PERIODIC, interfaceWidth: W, surfaceTension: sigma, mobility, precision: 'f64' },
    ...{ liquid: { density: 1, viscosity }, gas: airBeside(viscosity), gravity: { x: -g, y: 0 } },
    drive: { kind: 'loss', coefficient },
    initial: { phi, pressure: (x, y) => ((1 - phi(x, y)) * sigma) / R },
  });
  const steps = 250 * across;
  advance(s, steps);
  const before = momentum(s);
  advance(s, steps, 10);
  const gained = (momentum(s) - before) / steps;
  const { upflow, gasArea } = s.takeSamples();
  const mean = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0) / values.length;
  const lost = coefficient * mean(upflow.map((U) => U * Math.abs(U))) * nx * ny;
  return (lost + gained) / (mean(gasArea) * (1 - GAS) * g);
}

export const check: Check = {
  name: 'bubble-balance',
  async run() {
    const part = { check: this.name, source: 'momentum balance [V]', reference: 1, order: false };
    const ours: { cells: number; value: number }[] = [];
    for (const cells of [24, 40, 80]) ours.push({ cells, value: await accounted(cells) });
    const small = [{ cells: 40, value: await accounted(40, 0.02) }];
    return [
      row({ ...part, quantity: 'bubble of 3.5 mm rising freely: (loss + gain of momentum) / buoyancy', ours, at: 40, gate: 1 }),
      row({ ...part, quantity: 'the same with mobility 0.02', ours: small }),
    ];
  },
};
