import { describe, expect, it } from 'vitest';
import { createReference, createSimulation, type Setup } from '../../solver/index.ts';
import { cornerSolids, fieldValues, MILD_PAIR, randomState, SIDE_KINDS } from './boxes.ts';

const RHEOLOGY = { consistency: 0.002, index: 0.5, yieldStress: 1e-4, least: 1e-3 };

const boxOf = (nx: number, ny: number, sides: Setup['sides'], precision: 'f32' | 'f64' = 'f64'): Setup => ({
  ...{ nx, ny, sides, precision, speedLimit: 10, force: { x: 1e-5, y: -2e-5 } },
  liquid: { ...MILD_PAIR.liquid, rheology: RHEOLOGY },
  solid: cornerSolids(nx, ny),
  initial: randomState(nx, ny, 1000 * nx + ny),
});

const farthest = (a: number[], b: number[]): number => a.reduce((most, value, i) => Math.max(most, Math.abs(value - b[i])), 0);

describe('a liquid alone whose viscosity depends on its shear', () => {
  // 30 steps, three renewals. Seen: 3.5e-17 and 2.3e-7 of speeds and pressures up to 0.03
  it.each([
    ['f64', 3e-16],
    ['f32', 2e-6],
  ] as const)('is the same in the kernel and in the plain reference, in %s', async (precision, limit) => {
    let most = 0;
    for (const sides of Object.values(SIDE_KINDS)) {
      for (const nx of [1, 2, 3, 4, 5, 9, 33]) {
        for (const ny of [1, 8]) {
          const setup = boxOf(nx, ny, sides, precision);
          const [plain, kernel] = [createReference(setup), await createSimulation(setup)];
          for (const s of [plain, kernel]) expect(s.advance(30, 3)).toEqual({ kind: 'ok', step: 30 });
          most = Math.max(most, farthest(fieldValues(plain), fieldValues(kernel)));
          const [a, b] = [plain.takeSamples(), kernel.takeSamples()];
          for (const side of ['left', 'right'] as const) {
            for (let n = 0; n < 10; n++)
              for (let x = 0; x < nx; x++) most = Math.max(most, Math.abs(a.shear[side].get(n, x) - b.shear[side].get(n, x)));
          }
        }
      }
    }
    expect(most).toBeLessThan(limit);
    expect(most).toBeGreaterThan(0);
  });

  it('flows otherwise than one of the viscosity it starts with', async () => {
    const setup = boxOf(33, 8, SIDE_KINDS['walls left and right, periodic ends']);
    const [thins, stays] = [await createSimulation(setup), await createSimulation({ ...setup, liquid: MILD_PAIR.liquid })];
    for (const s of [thins, stays]) s.advance(7);
    expect(fieldValues(thins)).toEqual(fieldValues(stays));
    for (const s of [thins, stays]) s.advance(8);
    expect(farthest(fieldValues(thins), fieldValues(stays))).toBeGreaterThan(1e-4);
  });

  it.each(['kernel', 'reference'])('goes on from a saved image bit for bit, wherever calls end (%s)', async (which) => {
    const setup = boxOf(33, 8, SIDE_KINDS['walls left and right, periodic ends'], 'f32');
    const make = async () => (which === 'kernel' ? createSimulation(setup) : createReference(setup));
    const [whole, first, second] = [await make(), await make(), await make()];
    whole.advance(50);
    first.advance(13);
    second.restore(first.save());
    for (const steps of [3, 1, 20, 13]) second.advance(steps);
    expect(fieldValues(second)).toEqual(fieldValues(whole));
  });

  it('is stopped, not trapped, where the flow is lost', async () => {
    const fast: Setup = { ...boxOf(33, 8, SIDE_KINDS['periodic all round']), force: { x: 1e300, y: 0 }, speedLimit: Number.MAX_VALUE };
    const kernel = await createSimulation(fast);
    expect(kernel.advance(100).kind).toBe('nonFinite');
  });
});
