import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { gridConvergence, type Triple } from '../../output/refine/convergence.ts';

/** Values phi + C h^p on the cells, finest first. */
function series(limit: number, factor: number, order: number, cells: Triple): Triple {
  const at = (h: number): number => limit + factor * h ** order;
  return [at(cells[0]), at(cells[1]), at(cells[2])];
}

describe('the published table', () => {
  // Celik, Ghia, Roache, Freitas, Coleman & Raad 2008, J. Fluids Eng. 130, 078001, table 1, mark V.
  // Every printed digit must come out: order to 0.005, extrapolated value to half of its last digit, shares to 0.05 %. The ratio printed
  // as 1.333 is taken as 4/3: with 1.333 itself the first order is 1.537, not 1.53.
  const rows: { r21: number; r32: number; phi: Triple; p: number; ext: number; digits: number; change: number; index: number }[] = [
    { r21: 1.5, r32: 4 / 3, phi: [6.063, 5.972, 5.863], p: 1.53, ext: 6.1685, digits: 4, change: 1.5, index: 2.2 },
    { r21: 2, r32: 2.143, phi: [10.788, 10.725, 10.605], p: 0.75, ext: 10.8801, digits: 4, change: 0.6, index: 1.1 },
    { r21: 2, r32: 2.143, phi: [6.0042, 5.9624, 6.0909], p: 1.51, ext: 6.0269, digits: 4, change: 0.7, index: 0.5 },
  ];
  it.each(rows)('for $phi comes out as printed: order $p, extrapolated $ext, index $index %', ({ r21, r32, phi, ...printed }) => {
    const { order, extrapolated, change, index } = gridConvergence(phi, [1, r21, r21 * r32]);
    expect(order).toBeCloseTo(printed.p, 2);
    expect(extrapolated).toBeCloseTo(printed.ext, printed.digits);
    expect(100 * (change as number)).toBeCloseTo(printed.change, 1);
    expect(100 * (index as number)).toBeCloseTo(printed.index, 1);
  });

  it('holds two rows of shrinking differences and one whose sign changes', () => {
    expect(rows.map(({ phi, r21, r32 }) => gridConvergence(phi, [1, r21, r21 * r32]).course)).toEqual([
      'shrinking',
      'shrinking',
      'swinging',
    ]);
  });
});

describe('a made series', () => {
  it('gives back its order and its limit, for any order from a half to four, any limit and unequal ratios', () => {
    const ratio = fc.double({ min: 1.2, max: 3, noNaN: true });
    const property = fc.property(
      fc.double({ min: 0.5, max: 4, noNaN: true }),
      fc.double({ min: -2, max: 2, noNaN: true }),
      fc.constantFrom(-0.3, -0.01, 0.02, 0.4),
      ratio,
      ratio,
      (p, limit, factor, r21, r32) => {
        const cells: Triple = [1, r21, r21 * r32];
        const { course, order, extrapolated } = gridConvergence(series(limit, factor, p, cells), cells);
        expect(course).toBe('shrinking');
        // in 5000 draws 8e-13 and 4e-14 were seen: rounding of differences
        expect(order).toBeCloseTo(p, 11);
        expect(extrapolated).toBeCloseTo(limit, 12);
      },
    );
    fc.assert(property, { seed: 78001 });
  });

  it('of second order has an index of 1.25 times the true error of the finest grid', () => {
    const cells: Triple = [1, 1.5, 2.25];
    const { index } = gridConvergence(series(1, 0.1, 2, cells), cells);
    expect(index).toBeCloseTo((1.25 * 0.1) / 1.1, 12);
  });

  it('that swings with shrinking differences has the order that makes the printed equation hold', () => {
    const [r21, r32] = [1.5, 1.4];
    const { course, order } = gridConvergence([1, 1.02, 0.95], [1, r21, r21 * r32]);
    expect(course).toBe('swinging');
    const p = order as number;
    const q = Math.log((r21 ** p + 1) / (r32 ** p + 1));
    expect(Math.abs(Math.log(0.07 / 0.02) + q) / Math.log(r21)).toBeCloseTo(p, 9);
  });

  it('whose differences grow has no order, no limit and no index, though it has a last change', () => {
    expect(gridConvergence([1, 1.2, 1.3], [1, 1.5, 2.25])).toEqual({
      course: 'growing',
      order: null,
      extrapolated: null,
      change: expect.closeTo(0.2, 12),
      index: null,
    });
  });

  it('whose differences shrink less than the ratios of the grids ask for has none either', () => {
    // cells 1, 1.2, 2.4: even a logarithm, order zero, has e32 / e21 = ln 2 / ln 1.2 = 3.8
    expect(gridConvergence([1, 1.1, 1.45], [1, 1.2, 2.4]).course).toBe('growing');
    expect(gridConvergence([1, 1.1, 1.55], [1, 1.2, 2.4]).course).toBe('shrinking');
  });

  it('that swings wider and wider has none', () => {
    expect(gridConvergence([1, 1.2, 1.1], [1, 1.5, 2.25])).toMatchObject({ course: 'wild', order: null, index: null });
  });

  it('whose coarser two agree has none: the finest says that nothing is settled', () => {
    expect(gridConvergence([1.2, 1, 1], [1, 1.5, 2.25]).course).toBe('growing');
  });

  it('whose finer two agree has no order, for that may be chance', () => {
    expect(gridConvergence([1, 1.00001, 1.3], [1, 1.5, 2.25])).toMatchObject({ course: 'chance', order: null, index: null });
  });

  it('that is the same everywhere needs no order, zero and saturated shares included', () => {
    for (const value of [0, 1, 0.37])
      expect(gridConvergence([value, value, value], [1, 1.5, 2.25])).toEqual({
        course: 'same',
        order: null,
        extrapolated: value,
        change: 0,
        index: 0,
      });
  });

  it('that ends at zero has an order and a limit but no relative change and no index', () => {
    const { order, extrapolated, change, index } = gridConvergence([0, 0.01, 0.03], [1, 2, 4]);
    expect(order).toBeCloseTo(1, 12);
    expect(extrapolated).toBeCloseTo(-0.01, 12);
    expect([change, index]).toEqual([null, null]);
  });

  it('of a huge order is read without overflow', () => {
    const { order, extrapolated, index } = gridConvergence([1, 1.001, 1.9], [1, 4, 4 * 1.003]);
    expect(order).toBeGreaterThan(1000);
    expect(extrapolated).toBe(1);
    expect(index).toBe(0);
  });
});
