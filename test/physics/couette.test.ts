import { describe, expect, it } from 'vitest';
import { createSimulation, type Setup } from '../../solver/index.ts';
import { meanOf, settle } from './channel.ts';

/**
 * Plane Couette flow: a wall at rest, one N cells away sliding with U; velocity U s/N, shear eta U/N (textbook solution). A straight
 * profile is exact on any grid with halfway walls, but for terms of third order in the speed: 3e-6 U was seen at viscosity 0.02.
 */
const [N, U] = [20, 0.05];

function couette(eta: number, moving: 'left' | 'right'): Setup {
  const sides: Setup['sides'] = { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic', [moving]: { speed: U } };
  return { nx: 5, ny: N, sides, liquid: { density: 1.2, viscosity: eta }, precision: 'f64' };
}

describe('plane Couette flow', () => {
  for (const moving of ['left', 'right'] as const) {
    it.each([0.02, 0.2])(`is straight from wall to wall, the ${moving} one moving, at viscosity %d`, async (eta) => {
      const s = await createSimulation(couette(eta, moving));
      const samples = settle(s, Math.ceil((30 * 1.2 * N * N) / (Math.PI ** 2 * eta)));
      for (let y = 0; y < N; y++) {
        const distance = moving === 'right' ? y + 0.5 : N - 0.5 - y;
        expect(Math.abs(s.ux.get(2, y) / U - distance / N)).toBeLessThan(2e-5);
        expect(s.uy.get(2, y)).toBeCloseTo(0, 10);
      }
      // the fluid pulls the wall at rest along and holds the moving one back; samples are f32
      const shear = (eta * U) / N;
      const [resting, dragged] = moving === 'right' ? (['left', 'right'] as const) : (['right', 'left'] as const);
      expect(meanOf(samples.shear[resting]) / shear).toBeCloseTo(1, 6);
      expect(meanOf(samples.shear[dragged]) / shear).toBeCloseTo(-1, 6);
    });
  }
});
