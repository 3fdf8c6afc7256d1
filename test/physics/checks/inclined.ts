/**
 * Steady flow between two solids that lean through a box periodic all round, at slopes the grid does not know: how true the faces of
 * solids are at any angle. Profile and flux of plane Poiseuille flow [V].
 */
import { createSimulation, type Setup, type Simulation } from '../../../solver/index.ts';
import { advance, PERIODIC } from '../channel.ts';
import { type Check, row } from '../row.ts';

/** A channel that leans through a box periodic all round: its rise and run, cells across, what it is filled with. */
interface Inclined {
  slope: [rise: number, run: number];
  /** cells across the channel */
  width: number;
  viscosity: number;
  /** a box with gas in which there is none */
  gas?: Setup['gas'];
  /** where the faces lie between cells is kept from the solver */
  stairs?: boolean;
}

/**
 * Errors of steady flow driven along a channel between two solids: of the velocity in all cells against G/(2 eta) (h^2 - s^2) [V], root
 * of the mean square over the greatest speed, and of the flux, as shares.
 */
export async function inclinedFlow({
  slope: [rise, run],
  width,
  viscosity,
  gas,
  stairs,
}: Inclined): Promise<{ velocity: number; flux: number }> {
  const sine = rise / Math.hypot(rise, run);
  const cosine = run / Math.hypot(rise, run);
  // one period across the channel is 1.6 widths at least, and the box whole cells
  const unit = Math.round((1.6 * width) / (rise * cosine));
  const [nx, ny] = [unit * run, unit * rise];
  const period = ny * cosine;
  const half = width / 2;
  // from the middle of the channel; shifted so that no cell lies on a face
  const across = (x: number, y: number): number => {
    const s = (y + 0.37) * cosine - x * sine;
    return s - period * Math.round(s / period);
  };
  const solidDistance = (x: number, y: number): number => half - Math.abs(across(x, y));
  const solid = Uint8Array.from({ length: nx * ny }, (_, i) => (solidDistance(i % nx, Math.floor(i / nx)) > 0 ? 0 : 1));
  const G = (8 * viscosity * 0.01) / width ** 2;
  const force = { x: G * cosine, y: G * sine };
  const setup: Setup = {
    ...{ nx, ny, sides: PERIODIC, liquid: { density: 1, viscosity }, solid, force, precision: 'f64' },
    ...(gas ? { gas, surfaceTension: 0 } : {}),
    ...(stairs ? {} : { solidDistance }),
  };
  const exact = (x: number, y: number): number => (G / (2 * viscosity)) * (half ** 2 - across(x, y) ** 2);
  setup.initial = { velocity: (x, y) => ({ x: exact(x, y) * cosine, y: exact(x, y) * sine }) };
  const s = await createSimulation(setup);
  const flux = (): number => sumOver(s, solid, (x, y) => s.ux.get(x, y));
  let before = flux();
  for (let n = 0; n < 40; n++) {
    advance(s, Math.ceil((0.1 * width ** 2) / viscosity));
    const now = flux();
    if (Math.abs(now / before - 1) < 1e-6) break;
    before = now;
  }
  const cells = sumOver(s, solid, () => 1);
  const square = sumOver(s, solid, (x, y) => {
    const along = s.ux.get(x, y) * cosine + s.uy.get(x, y) * sine;
    return (along - exact(x, y)) ** 2 + (s.uy.get(x, y) * cosine - s.ux.get(x, y) * sine) ** 2;
  });
  const channels = sumOver(s, solid, (x, y) => s.ux.get(x, y) * cosine + s.uy.get(x, y) * sine);
  // u_max 2/3 width over the area of the channel, nx/cosine long, of which the box holds one
  return { velocity: Math.sqrt(square / cells) / 0.01, flux: channels / ((0.02 / 3) * width * (nx / cosine)) - 1 };
}

export const check: Check = {
  name: 'inclined',
  async run() {
    const rows = [];
    for (const slope of [
      [1, 1],
      [1, 2],
      [1, 4],
    ] as [number, number][]) {
      const ours = [];
      for (const width of [16, 32, 64])
        ours.push({ cells: width, value: 1 + (await inclinedFlow({ slope, width, viscosity: 0.125 })).flux });
      const part = { check: this.name, source: 'plane Poiseuille flow [V]', quantity: `slope 1:${slope[1]}: flux over the exact one` };
      rows.push(row({ ...part, reference: 1, ours, gate: 1 }));
    }
    return rows;
  },
};

function sumOver({ setup: { nx, ny } }: Simulation, solid: Uint8Array, value: (x: number, y: number) => number): number {
  let sum = 0;
  for (let y = 0; y < ny; y++) for (let x = 0; x < nx; x++) if (solid[y * nx + x] === 0) sum += value(x, y);
  return sum;
}
