/**
 * Plane bubbles that fill a vertical slot of width H, closed above and below, full of water that wets.
 * - Long bubble, H = 20 mm: U = 0.23 sqrt(gH) for a liquid without viscosity, in the limit of no surface tension (Vanden-Broeck 1984,
 *   Phys. Fluids 27, 2604 [L]); shear of the film beside it rho g delta once it falls freely [V].
 * - Stall: no rise below rho g H^2/sigma = 2.871 (plane form of Bretherton 1961, J. Fluid Mech. 10, 166 [V]).
 */
import { createSimulation, type Fluid, type Simulation } from '../../../solver/index.ts';
import { advance, CLOSED, crossings, profile } from '../channel.ts';
import { type Check, row } from '../row.ts';

/** Interface width, cells; the water wets fully, as the references have it; at 20 degrees a bubble that fills the slot hardly rises at rho g H^2/sigma = 3.6. */
const [W, ANGLE] = [5, 0];

interface Slot {
  /** cells across */
  H: number;
  /** all in multiples of H: slot, tail and nose of the bubble at the start */
  length: number;
  tail: number;
  nose: number;
  /** liquid between bubble and wall at the start, cells */
  film: number;
  viscosity: number;
  sigma: number;
  g: number;
  gas: Fluid;
}

/** The bubble with a round nose and tail, at the pressure of the liquid below its tail. */
function slot({ H, length, tail, nose, film, viscosity, sigma, g, gas }: Slot): Promise<Simulation> {
  const radius = H / 2 - film;
  const [low, high] = [tail * H + radius, nose * H - radius];
  const inside = (x: number, y: number): number => radius - Math.hypot(x + 0.5 - Math.min(Math.max(x + 0.5, low), high), y + 0.5 - H / 2);
  const phi = (x: number, y: number) => profile(-inside(x, y), W);
  return createSimulation({
    ...{ nx: Math.round(length * H), ny: H, sides: CLOSED, interfaceWidth: W, surfaceTension: sigma, contactAngle: ANGLE },
    ...{ liquid: { density: 1, viscosity }, gas, gravity: { x: -g, y: 0 }, buoyancy: 1 / (1 - gas.density) },
    // p leaves out the liquid's hydrostatic pressure, so it grows upward in gas
    initial: { phi, pressure: (x, y) => (1 - phi(x, y)) * (sigma / radius + g * (x + 0.5 - tail * H)) },
  });
}

/** Highest point of the gas on the middle line. */
function noseOf(s: Simulation): number {
  const { nx, ny } = s.setup;
  const middle = (x: number) => (s.phi.get(x, ny / 2 - 1) + s.phi.get(x, ny / 2)) / 2;
  return crossings(middle, nx).at(-1) ?? Number.NaN;
}

/**
 * Long bubble in a slot of 20 mm with the surface tension of water, rho g H^2/sigma = 54, but ten times as thick, UH/nu = 200:
 * 0.23 sqrt(gH) holds from 50 and 100 on, and the film is 0.07 H thick where water's would be 0.03 H. With UH/nu = 500 the tail
 * breaks up within a rise of H/2 and the bubble with it. The gas is softened, 50:1 and 5:1: in a column of air 4.5 H high the
 * pressure falls by more than its rho CS2 as it rises, which the lattice answers with divergence.
 *
 * What surface tension takes: potential flow past the bubble with it, by the series of Vanden-Broeck 1984 solved anew with 60 and 100
 * terms, gives 0.219 and 0.218 at rho g H^2/sigma = 54, 0.2249 at 864 [V]. His 0.23 is its limit; a sixteenth of the tension comes near.
 * @param tension share of the surface tension of water
 * @returns U over sqrt(gH) once the nose has gone 1.2 H, over the next 1.5 H; shear over rho g delta and delta (cells), 3 H below the nose
 */
export async function longBubble(H: number, tension = 1): Promise<{ froude: number; film: number; delta: number }> {
  // 0.1 m/s at the lattice velocity 0.0025: at 0.005 the gas is so soft that the column breathes, and U swings by a tenth
  const dx_m = 0.02 / H;
  const dt_s = (dx_m * 0.0025) / 0.1;
  const g = (9.80665 * dt_s ** 2) / dx_m;
  const sigma = (tension * 0.072736 * dt_s ** 2) / (998.207 * dx_m ** 3);
  const speed = 0.23 * Math.sqrt(g * H);
  const viscosity = (speed * H) / 200;
  const gas = { density: 0.02, viscosity: viscosity / 5 };
  const s = await slot({ H, length: 9, tail: 0.5, nose: 5, film: H / 10, viscosity, sigma, g, gas });
  const start = noseOf(s);
  advance(s, Math.round((1.2 * H) / speed));
  const [from, since] = [noseOf(s), s.step];
  advance(s, Math.round((1.5 * H) / speed) - 1);
  advance(s, 1, 1);
  const nose = noseOf(s);
  if (!(nose > start)) throw new Error('the long bubble does not rise');
  const { shear } = s.takeSamples();
  const at = Math.round(nose - 3 * H);
  const delta = (crossings((y) => s.phi.get(at, y), H / 2)[0] ?? Number.NaN) + 0.5;
  return { froude: (nose - from) / (s.step - since) / Math.sqrt(g * H), film: -shear.left.get(0, at) / (g * delta), delta };
}

/** Rise of a bubble 2 H long, in H, during the time in which `pace` sqrt(gH) would carry it 1 H; `bond` is rho g H^2/sigma. */
export async function stalled(H: number, bond: number, pace = 0.01): Promise<number> {
  const [sigma, viscosity] = [0.01, 0.05];
  const g = (bond * sigma) / (H * H);
  // as light as air, but thinner beside so thick a liquid: its kinematic viscosity is bounded
  const gas = { density: 1 / 832, viscosity: 0.15 / 832 };
  const s = await slot({ H, length: 5, tail: 1, nose: 3, film: 3, viscosity, sigma, g, gas });
  const time = Math.round(H / (pace * Math.sqrt(g * H)));
  advance(s, time);
  const from = noseOf(s);
  advance(s, time);
  return (noseOf(s) - from) / H;
}

export const longCheck: Check = {
  name: 'long-bubble',
  async run() {
    const seen: { cells: number; froude: number; film: number; delta: number }[] = [];
    const limit: { cells: number; value: number }[] = [];
    for (const cells of [40, 80]) {
      seen.push({ cells, ...(await longBubble(cells)) });
      limit.push({ cells, value: (await longBubble(cells, 1 / 16)).froude });
    }
    const part = { check: this.name, counts: 'H ' };
    const speeds = seen.map((s) => ({ ...s, value: s.froude }));
    const films = seen.map((s) => ({ ...s, value: s.film }));
    const widths = seen.map(({ delta }) => delta.toFixed(1)).join(' and ');
    const free = `shear / (rho g delta), 3 H below the nose, delta ${widths} cells`;
    return [
      row({
        ...{ ...part, quantity: '20 mm, UH/nu 200, gas 50:1: U / sqrt(gH)', source: 'Vanden-Broeck 1984 [L]', reference: 0.23 },
        ...{ ours: speeds, scale: { absolute: '' }, gate: 0.015 },
      }),
      row({
        ...{ ...part, quantity: 'tension a sixteenth of it: U / sqrt(gH)', source: 'Vanden-Broeck 1984 [L]', reference: 0.23 },
        ...{ ours: limit, scale: { absolute: '' }, gate: 0.015 },
      }),
      row({
        ...{ ...part, quantity: 'water: U / sqrt(gH)', source: 'potential flow with its surface tension [V]', reference: 0.218 },
        ...{ ours: speeds, scale: { absolute: '' } },
      }),
      row({ ...part, quantity: free, source: 'film falling freely [V]', reference: 1, ours: films }),
    ];
  },
};

/** Most that counts as standing still, and least that counts as rising, in H in that time. */
const STILL = 0.01;
export const RISING = 0.05;

export const stallCheck: Check = {
  name: 'stall',
  async run() {
    const part = { check: this.name, source: 'plane form of Bretherton 1961, stall at 2.871 [V]', counts: 'H ' };
    const words = 'rise in H while 0.01 sqrt(gH) makes 1 H';
    const [below, above] = [await stalled(32, 2.4), await stalled(32, 3.6)];
    return [
      row({
        ...{ ...part, quantity: `rho g H^2/sigma 2.4: ${words}`, reference: 0, scale: { absolute: 'H' } },
        ...{ ours: [{ cells: 32, value: below }], gate: STILL },
      }),
      row({
        ...{ ...part, quantity: `rho g H^2/sigma 3.6: ${words}, at least ${RISING}`, reference: RISING, scale: { absolute: 'H' } },
        ...{ ours: [{ cells: 32, value: above, error: Math.max(RISING - above, 0) }], gate: 0 },
      }),
    ];
  },
};
