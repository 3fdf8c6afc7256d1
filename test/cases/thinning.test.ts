import { describe, expect, it } from 'vitest';
import { layOut, readCase } from '../../cases/index.ts';
import { apparentViscosity_Pa_s, rateOf_1_s, sludge } from '../../cases/thinning.ts';

const text = `
channel: {gap: 8 mm, height: 100 mm}
liquid: {kind: sludge, solids: 10 g/L}
gas: {supply: 0.4 m3/(m2 h), bubble: {diameter: 5 mm}}
`;

describe('a liquid that thins under shear', () => {
  it('is sludge of 10 g/L with the published consistency, index and viscosity', () => {
    // Rosenberger, Kubin & Kraume 2002, Eng. Life Sci. 2, 269 [M]: K 171 mPa s^n, n 0.461, 14.3 mPa s at 100 1/s; half a unit of the last figure
    const { consistency_Pa_sn, index } = sludge(10);
    expect(1000 * consistency_Pa_sn).toBeCloseTo(171, -0.3);
    expect(index).toBeCloseTo(0.461, 3);
    const { liquid } = readCase(text, 'sludge.yaml');
    expect(1000 * liquid.viscosity_Pa_s).toBeCloseTo(14.3, 1);
  });

  it('keeps its stress at a rate of shear on the lattice, whatever the step', () => {
    for (const grid of ['grid.across=30', 'grid.across=80', 'grid.speed=0.7 m/s']) {
      const panel = readCase(text, 'sludge.yaml', [
        grid,
        'liquid={kind: thinning, consistency: 80 mPa s, index: 0.6, yield stress: 0.1 Pa}',
      ]);
      const { setup, derived } = layOut(panel);
      const law = panel.liquid.rheology;
      const lattice = setup.liquid.rheology;
      if (law === undefined || lattice === undefined) throw new Error('no rheology');
      const rate_1_s = 50;
      const rate = rate_1_s * derived.dt_s;
      const stress = lattice.consistency * rate ** lattice.index + lattice.yieldStress;
      expect((stress * derived.unit.stress_Pa) / (apparentViscosity_Pa_s(law, rate_1_s) * rate_1_s)).toBeCloseTo(1, 12);
    }
  });

  it('is never thinner than water, and tells where it is thicker than can be computed', () => {
    const { rheology } = readCase(text, 'sludge.yaml').liquid;
    if (rheology === undefined) throw new Error('no rheology');
    expect(apparentViscosity_Pa_s(rheology, 1e6)).toBe(rheology.least_Pa_s);
    const rate_1_s = rateOf_1_s(rheology, 0.2);
    expect(apparentViscosity_Pa_s(rheology, rate_1_s)).toBeCloseTo(0.2, 10);
    expect(rateOf_1_s(rheology, 1e6)).toBe(0);
  });
});
