/**
 * Slow flow through a square array of cylinders: drag per length over (eta U), U the mean velocity over the whole cell of the array,
 * against the solid fraction c. Sangani & Acrivos 1982, Int. J. Multiphase Flow 8, 193 [M].
 * The force on the liquid stands for a pressure gradient, so the drag is that times the whole cell.
 */
import { createSimulation } from '../../../solver/index.ts';
import { advance, PERIODIC } from '../channel.ts';
import { type Check, row } from '../row.ts';

export const DRAG: Record<number, number> = { 0.05: 15.56, 0.1: 24.83, 0.2: 51.53 };

/** 3/16 = (tau - 1/2)/2 puts a halfway wall in its place whatever its distance. */
const ETA = 0.125;

/** Drag over (eta U) with N cells a side. */
export async function drag(N: number, c: number): Promise<number> {
  const radius = N * Math.sqrt(c / Math.PI);
  const middle = N / 2 - 0.5;
  const solidDistance = (x: number, y: number): number => Math.hypot(x - middle, y - middle) - radius;
  const solid = Uint8Array.from({ length: N * N }, (_, i) => (solidDistance(i % N, Math.floor(i / N)) < 0 ? 1 : 0));
  const G = (1e-4 * ETA * DRAG[c]) / (N * N);
  const liquid = { density: 1, viscosity: ETA };
  const s = await createSimulation({
    nx: N,
    ny: N,
    sides: PERIODIC,
    liquid,
    solid,
    solidDistance,
    force: { x: G, y: 0 },
    precision: 'f64',
  });
  let upflow = 0;
  for (let n = 0; n < 200; n++) {
    advance(s, N * N);
    const change = s.totals().upflow / upflow - 1;
    upflow = s.totals().upflow;
    if (Math.abs(change) < 1e-6) break;
  }
  return (G * N * N) / (ETA * upflow);
}

export const check: Check = {
  name: 'cylinders',
  async run() {
    const rows = [];
    for (const c of [0.05, 0.1, 0.2]) {
      const ours = [];
      for (const cells of [32, 64, 128]) ours.push({ cells, value: await drag(cells, c) });
      const part = { check: this.name, source: 'Sangani & Acrivos 1982 [M]', quantity: `c ${c}: drag / (eta U)` };
      rows.push(row({ ...part, reference: DRAG[c], ours, gate: 1, at: 64, order: false }));
    }
    return rows;
  },
};
