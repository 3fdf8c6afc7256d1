/**
 * Channel full of a liquid that thins under shear, in a box of one liquid or in one made for gas, under a force G per volume. Half width h,
 * stress G y at y from the middle:
 *
 *   power law      tau_w = K [(2n + 1)/n U/h]^n, U the mean velocity [V]
 *   yield stress   a plug of half width y0 = tauYield/G, s = y0/h; U = G h^2/(3 eta) (1 - 3/2 s + 1/2 s^3) [V] (Bingham's plane flow), which
 *                  gives the tau_w = G h that belongs to U
 */
import { createSimulation, type Setup } from '../../../solver/index.ts';
import { airBeside, CHANNEL, meanOf, settle } from '../channel.ts';
import { type Check, row } from '../row.ts';

/** At the wall: tau 0.53, and a rate at which the middle moves with 0.006 to 0.01. */
const ETA_WALL = 0.01;
const RATE_WALL = 1e-3;

interface Flow {
  cells: number;
  index: number;
  /** yield stress over wall shear */
  plug: number;
  /** a box made for gas, without any */
  gas: boolean;
  precision?: 'f32' | 'f64';
  /** largest viscosity there is, over the density */
  most?: number;
}

/** Wall shear over G h; mean velocity over that under this force; wall shear over that at this mean velocity. */
export async function channel({ cells, index, plug, gas, precision = 'f64', most }: Flow) {
  const h = cells / 2;
  const stress = ETA_WALL * RATE_WALL;
  const yieldStress = plug * stress;
  const consistency = (stress - yieldStress) / RATE_WALL ** index;
  const rheology = { consistency, index, yieldStress, least: 1e-4, ...(most === undefined ? {} : { most }) };
  const setup: Setup = {
    ...{ nx: 4, ny: cells, sides: CHANNEL, precision, force: { x: stress / h, y: 0 } },
    liquid: { density: 1, viscosity: ETA_WALL, rheology },
    ...(gas ? { gas: airBeside(1e-3), surfaceTension: 0.003 } : {}),
  };
  const samples = settle(await createSimulation(setup), Math.round((6 * h * h) / ETA_WALL), 64);
  const shear = (meanOf(samples.shear.left) + meanOf(samples.shear.right)) / 2;
  const mean = samples.upflow[samples.upflow.length - 1];
  const meanAt = (wall: number): number => {
    const s = yieldStress / wall;
    if (plug === 0) return (index / (2 * index + 1)) * h * (wall / consistency) ** (1 / index);
    return ((wall * h) / (3 * consistency)) * (1 - 1.5 * s + 0.5 * s ** 3);
  };
  return {
    balance: shear / stress,
    mean: mean / meanAt(stress),
    shear: shear / root((wall) => meanAt(wall) - mean, stress / 2, 2 * stress),
  };
}

/** Where a rising function passes 0. */
function root(f: (x: number) => number, low: number, high: number): number {
  for (let n = 0; n < 50; n++) {
    const middle = (low + high) / 2;
    if (f(middle) < 0) low = middle;
    else high = middle;
  }
  return low;
}

export const LIQUIDS = [
  { name: 'n 0.8', index: 0.8, plug: 0 },
  { name: 'n 0.5', index: 0.5, plug: 0 },
  { name: 'n 0.461, sludge of 10 g/L', index: 0.461, plug: 0 },
  { name: 'yield stress 0.3 tau_w', index: 1, plug: 0.3 },
];

export const check: Check = {
  name: 'rheology',
  async run() {
    const rows = [];
    for (const gas of [false, true]) {
      for (const { name, ...liquid } of LIQUIDS) {
        const flows = [
          { cells: 16, ...(await channel({ cells: 16, gas, ...liquid })) },
          { cells: 32, ...(await channel({ cells: 32, gas, ...liquid })) },
        ];
        const [shear, mean] = (['shear', 'mean'] as const).map((key) => flows.map((flow) => ({ cells: flow.cells, value: flow[key] })));
        const part = { check: this.name, source: 'exact solution [V]', reference: 1, gate: 1, order: false };
        const where = `${name}, ${gas ? 'box for gas' : 'one liquid'}`;
        rows.push(
          row({ ...part, quantity: `${where}: wall shear / that of the mean velocity`, ours: shear }),
          row({ ...part, quantity: `${where}: mean velocity / exact`, ours: mean }),
        );
      }
    }
    return rows;
  },
};
