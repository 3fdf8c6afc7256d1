/**
 * Liquid of thickness H at the left wall, as much gas at the right one, under the same force G per volume.
 * compare first with the 1-D equation (eta(phi) u')' = -G, then with two sharp layers [V].
 */
import { createSimulation } from '../../../solver/index.ts';
import { CHANNEL, meanOf, profile, settle } from '../channel.ts';
import { type Check, row } from '../row.ts';

export const [ETA, G] = [0.01, 1e-7];
const W = 5;

/**
 * Wall shear at the liquid's wall by the 1-D equation with 1/eta linear in phi, u = 0 at both walls: tau(s) = tau_w - G s, so
 * tau_w = G int(s/eta) / int(1/eta) over 0..2H; with a sharp interface G h (3 e1 + e2)/(2 (e1 + e2)) [V].
 */
export function liquidShear(H: number, etaGas: number, phi: (distance: number) => number): number {
  const cells = 20_000;
  let fluidity = 0;
  let moment = 0;
  for (let n = 0; n < cells; n++) {
    const s = ((n + 0.5) * 2 * H) / cells;
    const share = phi(s) / ETA + (1 - phi(s)) / etaGas;
    fluidity += share;
    moment += share * s;
  }
  return (G * moment) / fluidity;
}

export interface TwoLayers {
  /** sum of both wall forces over the drive */
  balance: number;
  /** each wall's shear over that of the 1-D equation */
  liquid: number;
  gas: number;
}

/** @param density, viscosity ratios of liquid to gas */
export async function twoLayers(H: number, density: number, viscosity: number, precision: 'f32' | 'f64', eta = ETA): Promise<TwoLayers> {
  const gas = { density: 1 / density, viscosity: eta / viscosity };
  const force = { x: (G * eta) / ETA, y: 0 };
  const simulation = await createSimulation({
    ...{ nx: 4, ny: 2 * H, sides: CHANNEL, precision, interfaceWidth: W, surfaceTension: 0.003 },
    ...{ liquid: { density: 1, viscosity: eta }, gas, force },
    initial: { phi: (_, y) => profile(H - 0.5 - y, W) },
  });
  // slowest: the liquid with a free surface, exp(-eta (pi / 2H)^2 t); 25 of its times
  const samples = settle(simulation, Math.round((10 * H * H) / eta), 500);
  const left = meanOf(samples.shear.left);
  const right = meanOf(samples.shear.right);
  const expected = (liquidShear(H, ETA / viscosity, (s) => profile(H - s, W)) * eta) / ETA;
  return { balance: (left + right) / (2 * H * force.x), liquid: left / expected, gas: right / (2 * H * force.x - expected) };
}

export const check: Check = {
  name: 'two-layer',
  async run() {
    const rows = [];
    for (const eta of [ETA, 0.004]) {
      const flows: (TwoLayers & { cells: number })[] = [];
      for (const cells of [10, 20, 40]) flows.push({ cells, ...(await twoLayers(cells, 832, 55, 'f32', eta)) });
      const of = (value: 'balance' | 'liquid' | 'gas') => flows.map((flow) => ({ cells: flow.cells, value: flow[value] }));
      const part = { check: this.name, reference: 1, at: 20, counts: 'H ' };
      const source = '1-D equation of the diffuse profile [V]';
      rows.push(
        row({
          ...part,
          quantity: `nu ${eta}: wall forces / drive`,
          source: 'momentum balance [V]',
          ours: of('balance'),
          gate: 1,
          order: false,
        }),
        row({ ...part, quantity: `nu ${eta}: shear at the liquid wall / 1-D`, source, ours: of('liquid'), gate: 2 }),
        row({ ...part, quantity: `nu ${eta}: shear at the gas wall / 1-D`, source, ours: of('gas'), gate: 2 }),
      );
    }
    return rows;
  },
};
