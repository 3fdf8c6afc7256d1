/**
 * Taylor-Green vortices in a box of N cells: u = -u0 cos(kx) sin(ky), v = u0 sin(kx) cos(ky), p = -rho u0^2/4 (cos 2kx + cos 2ky),
 * velocity decays with exp(-2 nu k^2 t). Textbook solution.
 * Viscosity kept, u0 with 1/N, time with N^2: the same flow on finer grids, compressibility falling with the square as well.
 */
import { createSimulation } from '../../../solver/index.ts';
import { PERIODIC, settle } from '../channel.ts';
import { type Check, row } from '../row.ts';

/** @returns error of the velocity field over the amplitude at that time, and the measured decay exponent over the exact one */
export async function taylorGreen(N: number, nu: number): Promise<{ error: number; decay: number }> {
  const k = (2 * Math.PI) / N;
  const u0 = 0.64 / N;
  const steps = Math.round(100 * (N / 16) ** 2);
  const velocity = (x: number, y: number) => ({ x: -u0 * Math.cos(k * x) * Math.sin(k * y), y: u0 * Math.sin(k * x) * Math.cos(k * y) });
  const pressure = (x: number, y: number) => (-u0 * u0 * (Math.cos(2 * k * x) + Math.cos(2 * k * y))) / 4;
  const liquid = { density: 1, viscosity: nu };
  const s = await createSimulation({ nx: N, ny: N, sides: PERIODIC, liquid, precision: 'f64', initial: { velocity, pressure } });
  settle(s, steps);
  const left = Math.exp(-2 * nu * k * k * steps);
  let squares = 0;
  let energy = 0;
  for (let y = 0; y < N; y++) {
    for (let x = 0; x < N; x++) {
      const exact = velocity(x, y);
      squares += (s.ux.get(x, y) - left * exact.x) ** 2 + (s.uy.get(x, y) - left * exact.y) ** 2;
      energy += s.ux.get(x, y) ** 2 + s.uy.get(x, y) ** 2;
    }
  }
  const amplitude = Math.sqrt((2 * energy) / (N * N));
  return { error: Math.sqrt(squares / (N * N)) / (u0 * left), decay: Math.log(amplitude / u0) / Math.log(left) };
}

export const check: Check = {
  name: 'taylor-green',
  async run() {
    const rows = [];
    for (const nu of [0.02, 0.1]) {
      const flows = [];
      for (const cells of [32, 64, 128]) flows.push({ cells, ...(await taylorGreen(cells, nu)) });
      const part = { check: this.name, source: 'textbook solution [V]' };
      const error = flows.map((flow) => ({ cells: flow.cells, value: flow.error }));
      const decay = flows.map((flow) => ({ cells: flow.cells, value: flow.decay }));
      rows.push(
        row({ ...part, quantity: `rms error of u / amplitude, nu ${nu}`, reference: 0, scale: 1, ours: error, orderGate: 2 }),
        row({ ...part, quantity: `decay exponent / exact, nu ${nu}`, reference: 1, ours: decay, orderGate: 2 }),
      );
    }
    return rows;
  },
};
