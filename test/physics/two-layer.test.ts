import { describe, expect, it } from 'vitest';
import { createSimulation } from '../../solver/index.ts';
import { CHANNEL, meanOf, settle } from './channel.ts';

/** Liquid of thickness H at the left wall, as much gas at the right one, under the same force G. */
const [H, W, G] = [20, 5, 1e-6];

const profile = (distance: number): number => 0.5 + 0.5 * Math.tanh((2 * (H - distance)) / W);

/**
 * Wall shear at the liquid's wall by the 1-D equation (eta(phi) u')' = -G with 1/eta linear in phi, u = 0 at both walls:
 * tau(s) = tau_w - G s, so tau_w = G int(s/eta) / int(1/eta) over 0..2H. REFERENCES section 3, "compare first with the 1-D
 * equation"; with a sharp interface it becomes G h (3 e1 + e2)/(2 (e1 + e2)) there [V], which a test below holds it to.
 */
function liquidShear(etaLiquid: number, etaGas: number, phi: (distance: number) => number): number {
  const cells = 20_000;
  let fluidity = 0;
  let moment = 0;
  for (let n = 0; n < cells; n++) {
    const s = ((n + 0.5) * 2 * H) / cells;
    const share = phi(s) / etaLiquid + (1 - phi(s)) / etaGas;
    fluidity += share;
    moment += share * s;
  }
  return (G * moment) / fluidity;
}

/** Settles the two layers; errors of the sum of both wall forces and of each wall's shear against the 1-D equation. */
async function twoLayers(density: number, viscosity: number, eta: number, precision: 'f32' | 'f64') {
  const gas = { density: 1 / density, viscosity: eta / viscosity };
  const simulation = await createSimulation({
    ...{ nx: 4, ny: 2 * H, sides: CHANNEL, precision, interfaceWidth: W, surfaceTension: 0.003 },
    ...{ liquid: { density: 1, viscosity: eta }, gas, force: { x: G, y: 0 } },
    initial: { phi: (_, y) => profile(y + 0.5) },
  });
  // slowest: the liquid with a free surface, exp(-eta (pi / 2H)^2 t); 25 of its times
  const samples = settle(simulation, 4000 / eta, 500);
  const left = meanOf(samples.shear.left);
  const right = meanOf(samples.shear.right);
  const expected = liquidShear(eta, gas.viscosity, profile);
  return { balance: (left + right) / (2 * H * G) - 1, liquid: left / expected - 1, gas: right / (2 * H * G - expected) - 1 };
}

describe('two layers in a channel', () => {
  it('have a 1-D equation that gives the sharp-interface shear as the interface gets thin', () => {
    const [e1, e2] = [0.1, 0.1 / 55];
    const sharp = (G * H * (3 * e1 + e2)) / (2 * (e1 + e2));
    expect(liquidShear(e1, e2, (s) => (s < H ? 1 : 0)) / sharp).toBeCloseTo(1, 4);
  });

  // Density and viscosity ratio, viscosity of the liquid, precision; limits on the balance of forces, the liquid's and the gas's shear.
  // What the balance lacks is the share of viscosity that the populations carry, 1 %, and falls to nothing with it. Seen: balance
  // 6e-4 and 4e-4, shear within 1.1e-3.
  it.each([
    [50, 50, 0.1, 'f64', { balance: 2e-3, liquid: 3e-3, gas: 3e-3 }],
    [50, 50, 0.1, 'f32', { balance: 2e-3, liquid: 3e-3, gas: 3e-3 }],
    [832, 55, 0.01, 'f64', { balance: 2e-3, liquid: 3e-3, gas: 3e-3 }],
    [832, 55, 0.01, 'f32', { balance: 2e-3, liquid: 3e-3, gas: 3e-3 }],
  ] as const)(
    'pull at the walls with the force that drives them, at %d:1 in density and %d:1 in viscosity, at %d in liquid, in %s',
    async (density, viscosity, eta, precision, limit) => {
      const error = await twoLayers(density, viscosity, eta, precision);
      expect(Math.abs(error.balance)).toBeLessThan(limit.balance);
      expect(Math.abs(error.liquid)).toBeLessThan(limit.liquid);
      expect(Math.abs(error.gas)).toBeLessThan(limit.gas);
    },
  );
});
