/**
 * A bubble of radius R at rest in water, 832:1 and 55:1. Laplace, plane: dp = sigma/R [V]. Surface tension
 * as in an 8 mm gap of 80 cells at a lattice velocity of 0.02 for 0.3 m/s: 0.0727 N/m / (998 kg/m3 * 0.1 mm * (15 m/s)^2) = 0.0032.
 */
import { createSimulation, type Setup, type Simulation } from '../../../solver/index.ts';
import { advance, airBeside, CLOSED, fastest, PERIODIC, profile } from '../channel.ts';
import { type Check, row } from '../row.ts';

const [W, SIGMA] = [5, 0.0032];

/** In a box of 4 R cells a side; off the lattice on purpose. */
export function bubble(R: number, viscosity: number, sides: Setup['sides'] = PERIODIC): Promise<Simulation> {
  const N = 4 * R;
  const phi = (x: number, y: number) => profile(Math.hypot(x - N / 2 + 0.3, y - N / 2 + 0.7) - R, W);
  return createSimulation({
    ...{ nx: N, ny: N, sides, interfaceWidth: W, surfaceTension: SIGMA },
    ...{ liquid: { density: 1, viscosity }, gas: airBeside(viscosity) },
    initial: { phi, pressure: (x, y) => ((1 - phi(x, y)) * SIGMA) / R },
  });
}

/**
 * p in the middle less p in the far corner, over sigma/R of the circle phi = 1/2. The profile puts pi^2 W^2/48 more into the gas area over
 * pi than that circle holds: the variance of a tanh profile [V].
 */
function jump(s: Simulation): number {
  const { nx, ny } = s.setup;
  const radius = Math.sqrt(s.totals().gasArea / Math.PI - (Math.PI * W) ** 2 / 48);
  return (s.pressure.get(nx / 2, ny / 2) - s.pressure.get(0, 0)) / (SIGMA / radius);
}

/**
 * Jump and fastest speed once the bubble rests. A thick liquid, so that the breathing of the start dies away: gas 832 times lighter
 * gives way to sound, with a period of some 2500 steps at R = 20, over which the mean of the jump is taken.
 */
export async function resting(R: number, settling: number): Promise<{ jump: number; capillary: number }> {
  const viscosity = 0.01;
  const s = await bubble(R, viscosity);
  const unit = Math.round((R * R) / 400);
  advance(s, settling * Math.max(unit, 1));
  let mean = 0;
  let fast = 0;
  for (let n = 0; n < 25; n++) {
    advance(s, Math.ceil((100 * R) / 20));
    mean += jump(s) / 25;
    fast = Math.max(fast, fastest(s));
  }
  return { jump: mean, capillary: (viscosity * fast) / SIGMA };
}

/** Gas area after so many steps with the viscosity of water, in f32 in a closed box, over that at the start. */
async function areaKept(steps: number): Promise<number> {
  const s = await bubble(20, 6.7e-4, CLOSED);
  const before = s.totals().gasArea;
  advance(s, steps);
  return s.totals().gasArea / before;
}

export const check: Check = {
  name: 'laplace',
  async run() {
    const seen: { cells: number; jump: number; capillary: number }[] = [];
    for (const cells of [10, 20, 40]) seen.push({ cells, ...(await resting(cells, 20_000)) });
    const part = { check: this.name, counts: 'R ', at: 20 };
    const jumps = seen.map((s) => ({ ...s, value: s.jump }));
    const speeds = seen.map((s) => ({ ...s, value: s.capillary }));
    return [
      row({ ...part, quantity: '832:1: pressure jump / (sigma/R)', source: 'Laplace [V]', reference: 1, ours: jumps, gate: 1 }),
      row({
        ...{ ...part, quantity: 'capillary number of parasitic currents, any cell', source: 'rest [V]', reference: 0 },
        ...{ ours: speeds, scale: { absolute: '' }, gate: 1e-4, order: false },
      }),
    ];
  },
};

export const drift: Check = {
  name: 'gas-area',
  async run(long) {
    const steps = long ? 1_000_000 : 100_000;
    const ours = [{ cells: 80, value: await areaKept(steps) }];
    const quantity = `gas area after ${steps} steps / before, f32`;
    return [row({ check: this.name, quantity, source: 'conservation [V]', reference: 1, ours, gate: 0.1 })];
  },
};
