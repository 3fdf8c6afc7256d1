/**
 * Rising bubble, case 1 of Hysing, Turek, Kuzmin, Parolini, Burman, Ganesan & Tobiska 2009, Int. J. Numer. Meth. Fluids 60, 1259
 * [L]: box 1 x 2, radius 0.25 at (0.5, 0.5), no slip below and above, free slip at the sides; liquid
 * 1000 and 10, bubble 100 and 1, g 0.98, sigma 24.5; t = 0..3. N cells across the box.
 */
import { createSimulation, type Simulation } from '../../../solver/index.ts';
import { advance, outline, profile } from '../channel.ts';
import { type Check, row } from '../row.ts';
import { pressureAtRest } from '../start.ts';

/** Means of three independent groups. */
export const ANSWERS = {
  speed: (0.2417 + 0.2421 + 0.2417) / 3,
  circularity: (0.9013 + 0.9011 + 0.9013) / 3,
  height: (1.0813 + 1.0799 + 1.0817) / 3,
};

const [W, MOBILITY] = [5, 0.05];

/** Lattice velocity of 0.25 in the units of the case: at 0.01 and more the greatest speed is that of sound in the closed box. */
const SPEED = 0.005;

/** Height of the centre, mean speed and circularity of the bubble, in cells and steps. */
function bubble(s: Simulation): { height: number; speed: number; circularity: number } {
  const { nx, ny } = s.setup;
  let [area, height, speed] = [0, 0, 0];
  for (let y = 0; y < ny; y++) {
    for (let x = 0; x < nx; x++) {
      const gas = 1 - Math.min(Math.max(s.phi.get(x, y), 0), 1);
      area += gas;
      height += gas * (x + 0.5);
      speed += gas * s.ux.get(x, y);
    }
  }
  return { height: height / area, speed: speed / area, circularity: (2 * Math.sqrt(Math.PI * area)) / outline(s.phi) };
}

export interface Rise {
  speed: number;
  circularity: number;
  /** of the centre at t = `until` */
  height: number;
}

/** Greatest speed, least circularity and last height, in the units of the case. */
export async function rise(N: number, until = 3, precision: 'f32' | 'f64' = 'f32'): Promise<Rise> {
  const dt = (SPEED / 0.25) * (1 / N);
  const viscosity = (eta: number) => (eta * dt * N * N) / 1000;
  const phi = (x: number, y: number) => profile(Math.hypot(x + 0.5 - N / 2, y + 0.5 - N / 2) - N / 4, W);
  const surfaceTension = (24.5 * dt * dt * N ** 3) / 1000;
  const box = {
    ...{ nx: 2 * N, ny: N, liquid: { density: 1, viscosity: viscosity(10) }, gas: { density: 0.1, viscosity: viscosity(1) } },
    ...{ surfaceTension, interfaceWidth: W, gravity: { x: -0.98 * dt * dt * N, y: 0 } },
  };
  const p = pressureAtRest(box, phi);
  const s = await createSimulation({
    ...{ ...box, mobility: MOBILITY, sides: { left: 'slip', right: 'slip', bottom: 'wall', top: 'wall' }, precision },
    initial: { phi, pressure: (x, y) => p[y * box.nx + x] },
  });
  const seen: Rise = { speed: 0, circularity: 1, height: 0 };
  const moments = Math.round(until * 50);
  for (let n = 1; n <= moments; n++) {
    advance(s, Math.round((n * until) / moments / dt) - s.step);
    const now = bubble(s);
    seen.speed = Math.max(seen.speed, now.speed / N / dt);
    seen.circularity = Math.min(seen.circularity, now.circularity);
    seen.height = now.height / N;
  }
  return seen;
}

export const check: Check = {
  name: 'rising-bubble',
  async run(long) {
    const seen: (Rise & { cells: number })[] = [];
    for (const cells of long ? [80, 160, 320] : [80, 160]) seen.push({ cells, ...(await rise(cells)) });
    const part = { check: this.name, source: 'Hysing et al. 2009, three groups [L]', gate: 1, at: 160, falling: true };
    const of = (value: keyof Rise) => seen.map((s) => ({ cells: s.cells, value: s[value] }));
    return [
      row({ ...part, quantity: 'case 1: greatest rise speed', reference: ANSWERS.speed, ours: of('speed') }),
      row({ ...part, quantity: 'case 1: least circularity', reference: ANSWERS.circularity, ours: of('circularity') }),
      row({ ...part, quantity: 'case 1: y of the centre at t = 3', reference: ANSWERS.height, ours: of('height') }),
    ];
  },
};
