import { describe, expect, test } from 'vitest';
import { waterDensity_kg_m3, waterViscosity_Pa_s } from '../../cases/fluids.ts';
import { type Measures, measure } from '../../output/index.ts';
import { worstRadius } from '../../output/measures/backtransport.ts';
import { placesOf } from '../../output/measures/felt.ts';
import { type Making, makeRecording } from './recordings.ts';

const density_kg_m3 = waterDensity_kg_m3(293.15);
const water = {
  kind: 'water' as const,
  temperature_K: 293.15,
  density_kg_m3,
  viscosity_Pa_s: waterViscosity_Pa_s(293.15, density_kg_m3),
};
/** 1 m3/(m2 s) in L/(m2 h). */
const LITRES = 3.6e6;

const measured = (shear: NonNullable<Making['shear']>, making: Making = {}): Measures =>
  measure(makeRecording({ liquid: water, shear, ...making }));
const atRadius = (measures: Measures, radius_m: number) => {
  const found = measures.backTransport.left.sizes.find((size) => Math.abs(size.radius_m / radius_m - 1) < 1e-9);
  if (found === undefined) throw new Error(`no radius ${radius_m}`);
  return [found.brownian_m_s, found.shearInduced_m_s, found.inertialLift_m_s].map((flux) => flux * LITRES);
};

describe('back-transport', () => {
  test('of water at 20 degrees over 1 m with 60 times the particles at the wall has the worked values', () => {
    // worked from the formulas of Belfort, Davis & Zydney 1994 [V arithmetic, M coefficients], L/(m2 h)
    const worked = [
      { radius_m: 1e-6, tau_Pa: 0.3, brownian: 0.29, induced: 3.04, lift: 0.012 },
      { radius_m: 5.01187e-6, tau_Pa: 0.3, brownian: 0.1, induced: 26.0, lift: 1.45 },
      { radius_m: 1e-7, tau_Pa: 1, brownian: 1.98, induced: 0.47, lift: 0 },
    ];
    for (const { radius_m, tau_Pa, brownian, induced, lift } of worked) {
      const found = atRadius(
        measured(() => tau_Pa),
        radius_m,
      );
      // printed digits; the table's 5.012 um stands for 5 um (0.3 and 0.7 % more flux)
      expect(Math.abs(found[0] - brownian)).toBeLessThan(0.006);
      expect(Math.abs(found[1] / induced - 1)).toBeLessThan(0.015);
      expect(Math.abs(found[2] - lift)).toBeLessThan(0.016);
    }
  });

  test('is the mean over the shear felt: by the cube root, the first and the second power, whatever its sign', () => {
    // half the time 0.1 Pa, half 0.8 Pa downward
    const mixed = atRadius(
      measured((_, s) => (s % 2 === 0 ? 0.1 : -0.8)),
      1e-6,
    );
    const weak = atRadius(
      measured(() => 0.1),
      1e-6,
    );
    expect(mixed[0] / weak[0]).toBeCloseTo((1 + 2) / 2, 6);
    expect(mixed[1] / weak[1]).toBeCloseTo((1 + 8) / 2, 6);
    expect(mixed[2] / weak[2]).toBeCloseTo((1 + 64) / 2, 5);
  });

  test('is worst at the radius from which every other has more', () => {
    const { left } = measured((_, s) => 0.1 + 0.02 * s).backTransport;
    const worst = left.worst;
    if (worst === null) throw new Error('no worst size');
    expect(worst.radius_m).toBeGreaterThan(1e-7);
    expect(worst.radius_m).toBeLessThan(1e-6);
    for (const { total_m_s } of left.sizes) expect(total_m_s).toBeGreaterThanOrEqual(worst.total_m_s);
    // without lift the least of B a^(-2/3) + S a^(4/3) lies at a^2 = B / (2 S); lift is some 1e-4 of it there
    const small = left.sizes[0];
    const b = small.brownian_m_s * small.radius_m ** (2 / 3);
    const s = small.shearInduced_m_s / small.radius_m ** (4 / 3);
    expect(Math.abs(worst.radius_m / Math.sqrt(b / (2 * s)) - 1)).toBeLessThan(5e-3);
  });

  test('takes its length and concentrations from the case', () => {
    const of = (particles: { length_m: number; wallToBulk: number }) =>
      atRadius(
        measured(() => 0.3, { particles }),
        1e-6,
      );
    const [base, long, thin] = [
      of({ length_m: 1, wallToBulk: 60 }),
      of({ length_m: 8, wallToBulk: 60 }),
      of({ length_m: 1, wallToBulk: 7.5 }),
    ];
    expect(long.map((flux, i) => flux / base[i]).map((ratio) => ratio.toFixed(9))).toEqual(['0.500000000', '0.500000000', '1.000000000']);
    expect(thin[0] / base[0]).toBeCloseTo(Math.log(7.5) / Math.log(60), 9);
    expect(thin[1] / base[1]).toBeCloseTo(0.5, 9);
  });

  test('together is over both membrane walls, and the answers hold the worst size and its flux with an interval', () => {
    const recording = makeRecording({
      samples: 400,
      liquid: water,
      shear: (side, s, e) => (side === 'left' ? 0.2 : 0.6) + 0.1 * Math.sin(s + e),
    });
    const { answers, backTransport } = measure(recording);
    const answer = (name: string) => answers.find((one) => one.name === name);
    for (const place of ['left', 'right', 'together'] as const) {
      const worst = backTransport[place].worst;
      const flux = answer(`worst_backtransport_${place}_m_s`);
      expect(flux?.value).toBeCloseTo(worst?.total_m_s ?? Number.NaN, 15);
      expect(flux?.low).toBeLessThan(flux?.value ?? 0);
      const radius = answer(`worst_backtransport_radius_${place}_m`);
      expect(radius?.value).toBe(worst?.radius_m);
      expect(radius?.low).toBeLessThan(radius?.value ?? 0);
      expect(radius?.high).toBeGreaterThan(radius?.value ?? 1);
    }
    const [left, right, together] = (['left', 'right', 'together'] as const).map(
      (place) => backTransport[place].sizes[20].shearInduced_m_s,
    );
    expect((left + right) / 2 / together).toBeCloseTo(1, 6);
  });

  test('moves its worst size with the shear as the interval of that size takes it', () => {
    // shear larger by a share e for a half of the time: the size itself against the mean of its linearised series
    const e = 0.01;
    const felt = (share: number) =>
      makeRecording({ samples: 200, liquid: water, shear: (_, s) => (s % 2 === 0 ? 0.3 : 0.3 * (1 + share)) });
    const [still, moved] = [felt(0), felt(e)];
    const places = placesOf(moved);
    const { series, value } = worstRadius(moved, places.left);
    const swing = Math.log(worstRadius(felt(0), placesOf(still).left).value ?? 0) - Math.log(value ?? 0);
    // the mean of the series is ln of the size, and its weaker samples lie higher by twice what the half time moves the size
    expect(Math.abs((series[0] - series[1]) / (2 * swing) - 1)).toBeLessThan(0.02);
  });

  test('is not to be had without shear or without samples', () => {
    expect(measured(() => 0).backTransport.left.worst).toBeNull();
    const none = measured(() => 1, { samples: 0 });
    expect(none.backTransport.left).toEqual({ sizes: [], worst: null });
    expect(none.answers.find(({ name }) => name === 'worst_backtransport_left_m_s')?.value).toBeNull();
  });
});
