/**
 * Lid-driven square cavity, N x N cells, against u on the line x = 1/2 (Ghia, Ghia & Shin 1982, J. Comput. Phys. 48, 387
 * [L]). The lid is the right side and slides along +x. Lid speed with 1/N, viscosity kept: compressibility falls
 * with the square as the grid gets finer.
 */
import { createSimulation, type Simulation } from '../../../solver/index.ts';
import { advance } from '../channel.ts';
import { type Check, row } from '../row.ts';

const HEIGHTS = [0.9766, 0.9531, 0.8516, 0.7344, 0.6172, 0.5, 0.4531, 0.2813, 0.1719, 0.1016, 0.0547];
const GHIA: Record<number, number[]> = {
  100: [0.84123, 0.68717, 0.23151, 0.00332, -0.13641, -0.20581, -0.2109, -0.15662, -0.1015, -0.06434, -0.03717],
  400: [0.75837, 0.55892, 0.29093, 0.16256, 0.02135, -0.11477, -0.17119, -0.32726, -0.24299, -0.14612, -0.08186],
};

/** Lid speed at 128 cells. */
const LID = 0.05;

/** u over the lid's speed on the line x = 1/2 at a height over N, by the cubic through the four nearest cells. */
function middle(s: Simulation, lid: number, height: number): number {
  const N = s.setup.ny;
  const at = height * N - 0.5;
  const first = Math.min(Math.max(Math.floor(at) - 1, 0), N - 4);
  let u = 0;
  for (let j = 0; j < 4; j++) {
    let weight = 1;
    for (let m = 0; m < 4; m++) if (m !== j) weight *= (at - first - m) / (j - m);
    u += (weight * (s.ux.get(N / 2 - 1, first + j) + s.ux.get(N / 2, first + j))) / 2;
  }
  return u / lid;
}

/** u over the lid's speed at Ghia's heights, and the least u there is on the line, once nothing changes any more. */
export async function cavity(N: number, Re: number): Promise<{ u: number[]; least: number }> {
  const lid = (LID * 128) / N;
  const liquid = { density: 1, viscosity: (lid * N) / Re };
  const sides = { left: 'wall', right: { speed: lid }, bottom: 'wall', top: 'wall' } as const;
  const s = await createSimulation({ nx: N, ny: N, sides, liquid, precision: 'f64' });
  const turn = Math.round(N / lid);
  let u = HEIGHTS.map(() => 0);
  for (let n = 0; n < 100; n++) {
    advance(s, 2 * turn);
    const now = HEIGHTS.map((height) => middle(s, lid, height));
    const change = Math.max(...now.map((value, k) => Math.abs(value - u[k])));
    u = now;
    if (change < 1e-5) break;
  }
  const line = Array.from({ length: 1001 }, (_, n) => middle(s, lid, n / 1000));
  return { u, least: Math.min(...line) };
}

/** Largest distance from Ghia's values, over the lid's speed. */
export const distance = (u: number[], Re: number): number => Math.max(...u.map((value, n) => Math.abs(value - GHIA[Re][n])));

export const check: Check = {
  name: 'cavity',
  async run() {
    const rows = [];
    for (const Re of [100, 400]) {
      const flows = [];
      for (const cells of [32, 64, 128]) flows.push({ cells, ...(await cavity(cells, Re)) });
      const ours = flows.map(({ cells, u }) => ({ cells, value: distance(u, Re) }));
      const source = 'Ghia, Ghia & Shin 1982 [L]';
      rows.push(
        row({ check: this.name, quantity: `Re ${Re}: largest error of u / lid speed`, source, reference: 0, scale: 1, ours, gate: 1 }),
      );
      if (Re !== 100) continue;
      const least = flows.map((flow) => ({ cells: flow.cells, value: flow.least }));
      const sharper = 'Marchi, Suero & Araki 2009 [L]';
      rows.push(
        row({
          check: this.name,
          quantity: 'Re 100: least u / lid speed',
          source: sharper,
          reference: -0.21404,
          scale: 1,
          ours: least,
          gate: 1,
        }),
      );
    }
    return rows;
  },
};
