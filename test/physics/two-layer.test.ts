import { describe, expect, it } from 'vitest';
import { ETA, G, liquidShear, twoLayers } from './checks/two-layer.ts';

const H = 20;

describe('two layers in a channel', () => {
  it('have a 1-D equation that gives the sharp-interface shear as the interface gets thin', () => {
    const [e1, e2] = [ETA, ETA / 55];
    const sharp = (G * H * (3 * e1 + e2)) / (2 * (e1 + e2));
    expect(liquidShear(H, e2, (s) => (s < H ? 1 : 0)) / sharp).toBeCloseTo(1, 4);
  });

  // Density and viscosity ratio, precision; limits on the balance of forces, the liquid's and the gas's wall shear.
  // The balance is the gate (1 %); 6e-6 in f64 and 1.2e-5 in f32 were seen. The shear of each wall is a record of how far the
  // momentum form lies from the 1-D equation: where density and viscosity fall alike it follows it, where the kinematic viscosity
  // jumps by 15 it does not yet (liquid 3.4 % above, gas 9.7 % below; 0.1 % and 0.3 % at equal ratios).
  it.each([
    [50, 50, 'f64', { balance: 5e-5, liquid: 0.005, gas: 0.01 }],
    [50, 50, 'f32', { balance: 1e-4, liquid: 0.005, gas: 0.01 }],
    [832, 55, 'f64', { balance: 5e-5, liquid: 0.05, gas: 0.14 }],
    [832, 55, 'f32', { balance: 1e-4, liquid: 0.05, gas: 0.14 }],
  ] as const)(
    'pull at the walls with the force that drives them, at %d:1 in density and %d:1 in viscosity, in %s',
    async (density, viscosity, precision, limit) => {
      const seen = await twoLayers(H, density, viscosity, precision);
      expect(Math.abs(seen.balance - 1)).toBeLessThan(limit.balance);
      expect(Math.abs(seen.liquid - 1)).toBeLessThan(limit.liquid);
      expect(Math.abs(seen.gas - 1)).toBeLessThan(limit.gas);
    },
  );
});
