/**
 * Capillary wave between two deep fluids of equal kinematic viscosity, a0 k = 0.06, w0^2 = sigma k^3/(rho1 + rho2): amplitude over
 * a0 at w0 t. Prosperetti 1981, Phys. Fluids 24, 1217 [V].
 * Viscosity kept, time with the square of the cells a wave: the same wave on finer grids, only its interface gets thinner.
 */
import { createSimulation, type Simulation } from '../../../solver/index.ts';
import { advance, CHANNEL, crossings, profile } from '../channel.ts';
import { type Check, row } from '../row.ts';

export interface WaveSet {
  name: string;
  /** density of the upper fluid over that of the lower one */
  ratio: number;
  /** w0 t and a/a0 */
  listed: [number, number][];
}

export const SETS: readonly WaveSet[] = [
  {
    name: 'A',
    ratio: 1,
    listed: [
      [1, 0.59934],
      [2, -0.19295],
      [3, -0.7224],
      [5, -0.11326],
      [8, 0.25868],
      [10, -0.40175],
      [15, 0.099],
    ],
  },
  {
    name: 'B',
    ratio: 0.1,
    listed: [
      [1, 0.57765],
      [3, -0.75578],
      [5, 0.01563],
      [10, -0.4281],
      [15, -0.06364],
    ],
  },
];

/**
 * A thick interface slows the wave by some 0.2 W k of its frequency squared, a thin one feels the grid: 4 cells err least. A mobility
 * that keeps its shape while it swings.
 */
const [W, NU, MOBILITY] = [4, 0.02, 0.2];

/** phi as a straight line across the interface, 1/2 where it is: a tanh profile read between cells without an error. */
const straight = (phi: number): number => 0.5 + Math.log(Math.max(phi, 1e-12) / Math.max(1 - phi, 1e-12));

/** Height of phi = 1/2 at the crest (x between the two middle cells) above the mean level. */
function crest(s: Simulation, level: number): number {
  const { nx, ny } = s.setup;
  const column = (x: number): number => crossings((y) => straight(s.phi.get(x, y)), ny)[0];
  return (column(nx / 2 - 1) + column(nx / 2)) / 2 - level;
}

/** a/a0 at the listed times, with `cells` a wave. */
export async function wave(cells: number, set: WaveSet): Promise<number[]> {
  const k = (2 * Math.PI) / cells;
  const w0 = (NU * k * k) / 0.05;
  const ny = 2 * cells;
  const level = ny / 2 - 0.5;
  const height = (x: number) => level - (0.06 / k) * Math.cos(k * (x + 0.5));
  const s = await createSimulation({
    ...{ nx: cells, ny, sides: CHANNEL, interfaceWidth: W, mobility: MOBILITY, precision: 'f64' },
    ...{ liquid: { density: 1, viscosity: NU }, gas: { density: set.ratio, viscosity: NU * set.ratio } },
    surfaceTension: (w0 * w0 * (1 + set.ratio)) / k ** 3,
    initial: { phi: (x, y) => profile(height(x) - y, W) },
  });
  const a0 = crest(s, level);
  const seen = [];
  for (const [time] of set.listed) {
    advance(s, Math.round(time / w0) - s.step);
    seen.push(crest(s, level) / a0);
  }
  return seen;
}

/** Largest distance from the listed amplitudes, over a0. */
export const farthest = (seen: number[], set: WaveSet): number => Math.max(...seen.map((value, n) => Math.abs(value - set.listed[n][1])));

export const check: Check = {
  name: 'capillary-wave',
  async run() {
    const rows = [];
    for (const set of SETS) {
      const ours = [];
      for (const cells of [32, 64, 128]) {
        ours.push({ cells, value: farthest(await wave(cells, set), set) });
      }
      const part = { check: this.name, source: 'Prosperetti 1981 [V]', quantity: `set ${set.name}: largest error of the amplitude / a0` };
      rows.push(row({ ...part, reference: 0, scale: { absolute: 'a0' }, ours, gate: 0.02, falling: true }));
    }
    return rows;
  },
};
