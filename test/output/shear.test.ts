import { describe, expect, test } from 'vitest';
import { measure } from '../../output/index.ts';
import { makeRecording } from './recordings.ts';

/** f32 samples: relative error of a sum of a few hundred of them; 2e-8 was seen. */
const DIGITS = 6;

describe('shear statistics of a wall', () => {
  test('a sine in time has the mean, rms, maximum and full reversal of a sine', () => {
    const samples = 400;
    const recording = makeRecording({ samples, shear: (_, s) => 2 * Math.sin((2 * Math.PI * (s + 0.5)) / 40) });
    const { shear } = measure(recording).walls.left;
    // mean of |sin| over 40 midpoints of a period: 2/40 sum over a half = 1/(20 sin(pi/40))
    expect(shear.meanAbs_Pa).toBeCloseTo(2 / (20 * Math.sin(Math.PI / 40)), DIGITS);
    expect(shear.mean_Pa).toBeCloseTo(0, DIGITS);
    expect(shear.rms_Pa).toBeCloseTo(Math.SQRT2, DIGITS);
    expect(shear.max_Pa).toBeCloseTo(2 * Math.cos(Math.PI / 40), DIGITS);
    expect(shear.reversal).toBeCloseTo(1, DIGITS);
  });

  test('elements that pull steadily in opposite directions reverse nothing, although their mean is zero', () => {
    const { shear } = measure(makeRecording({ shear: (_, __, e) => (e % 2 === 0 ? 1 : -1) })).walls.right;
    expect(shear.mean_Pa).toBe(0);
    expect(shear.meanAbs_Pa).toBe(1);
    expect(shear.reversal).toBe(0);
  });

  test('three parts forward and one part back reverse half', () => {
    // |mean| = (3 - 1)/4 = 0.5, mean of |tau| = 1
    const { shear } = measure(makeRecording({ samples: 40, shear: (_, s) => (s % 4 === 0 ? -1 : 1) })).walls.left;
    expect(shear.reversal).toBeCloseTo(0.5, DIGITS);
  });

  test('percentiles are those of the ramp 0 to 100', () => {
    const recording = makeRecording({ samples: 101, elements: 3, shear: (_, s) => -s });
    const { percentiles_Pa } = measure(recording).walls.left.shear;
    expect(percentiles_Pa).toEqual({ p5: 5, p25: 25, p50: 50, p75: 75, p95: 95, p99: 99 });
  });

  test('a percentile between two samples is linear between them', () => {
    const { percentiles_Pa } = measure(makeRecording({ samples: 2, elements: 3, shear: (_, s) => s })).walls.left.shear;
    expect(percentiles_Pa.p25).toBeCloseTo(0.25, 12);
  });

  test('time above and the rate of events count strictly above, and rises only', () => {
    // above at samples 0,1 (under way at the start: no event), 5, 6 and 10: two rises in 20 intervals of 10 ms; 0.5 itself is not above
    const high = new Set([0, 1, 5, 6, 10]);
    const { shear } = measure(makeRecording({ samples: 21, shear: (_, s) => (high.has(s) ? -0.8 : 0.5) })).walls.left;
    expect(shear.shareAbove).toBeCloseTo(5 / 21, 12);
    expect(shear.events_1_s).toBeCloseTo(2 / 0.2, 9);
  });

  test('the release and skim bands do not count', () => {
    const { shear } = measure(makeRecording({ shear: (_, __, e) => (e === 0 || e === 9 ? 1000 : 1) })).walls.left;
    expect(shear.max_Pa).toBe(1);
    expect(shear.meanAbs_Pa).toBe(1);
  });

  test('elements under a fin are left out of every number, and said', () => {
    const measures = measure(
      makeRecording({
        shear: (side, _, e) => (side === 'left' && (e === 3 || e === 4) ? Number.NaN : e),
        gas: (_, __, e) => e === 3 || e === 5,
      }),
    );
    const left = measures.walls.left;
    expect(left.elements).toEqual({ open: 6, underFin: 2 });
    expect(left.shear.mean_Pa).toBeCloseTo((1 + 2 + 5 + 6 + 7 + 8) / 6, DIGITS);
    expect(left.shear.percentiles_Pa.p50).toBeCloseTo(5.5, DIGITS);
    expect(left.shear.shareUnderGas).toBeCloseTo(1 / 6, 12);
    expect(left.histogram.pairs).toBe(6 * 20);
    expect(left.swept.elements).toBe(6);
    expect(measures.notes.join('\n')).toContain('The left wall has 2 of 8 elements under fins');
  });

  test('a wall wholly under fins has no number instead of an invented one', () => {
    const { shear, swept } = measure(makeRecording({ shear: (side) => (side === 'left' ? Number.NaN : 1) })).walls.left;
    expect(shear.meanAbs_Pa).toBeNull();
    expect(shear.percentiles_Pa.p50).toBeNull();
    expect(swept.whole).toBeNull();
    expect(swept.overThreshold.whole[0]).toBeNull();
  });

  test('a recording without samples has no number and says so', () => {
    const measures = measure(makeRecording({ samples: 0, complete: false }));
    expect(measures.walls.left.shear.max_Pa).toBeNull();
    expect(measures.walls.left.swept.within).toBeNull();
    expect(measures.together.whole).toBeNull();
    expect(measures.recorded.from_s).toBeNull();
    expect(measures.notes.join('\n')).toContain('No wall sample was recorded');
    expect(measures.notes.join('\n')).toContain('not complete');
  });

  test('one sample gives means but no rate of events', () => {
    const { shear } = measure(makeRecording({ samples: 1, shear: () => 0.7 })).walls.left;
    expect(shear.meanAbs_Pa).toBeCloseTo(0.7, DIGITS);
    expect(shear.events_1_s).toBeNull();
  });

  test('still water has zero shear and no reversal to speak of', () => {
    const { shear } = measure(makeRecording()).walls.left;
    expect(shear.meanAbs_Pa).toBe(0);
    expect(shear.reversal).toBeNull();
  });

  test('softened gas is noted with the figures used', () => {
    expect(measure(makeRecording({ softened: true })).notes.join('\n')).toContain(
      'computed with 20 kg/m3 and 0.0002 Pa s instead of air at 1.20 kg/m3',
    );
  });
});

describe('the histogram of |tau|', () => {
  test('puts every pair into one bin and shares add up to one', () => {
    const { bins, pairs } = measure(makeRecording({ samples: 200, shear: (_, s, e) => 10 ** (((s * 7 + e * 3) % 60) / 10 - 3.5) })).walls
      .left.histogram;
    expect(pairs).toBe(200 * 8);
    expect(bins.reduce((sum, bin) => sum + (bin.share ?? 0), 0)).toBeCloseTo(1, 12);
  });

  test('bins are a decade in ten steps from 1 mPa to 100 Pa, with what is under and over beside them', () => {
    const { bins } = measure(makeRecording({ shear: (_, __, e) => [0, 0, 0.0005, 0.05, 0.3, -0.3, 50, 150, 1e-3, 0][e] })).walls.left
      .histogram;
    expect(bins).toHaveLength(52);
    expect(bins[0]).toMatchObject({ from_Pa: 0, to_Pa: 0.001 });
    expect(bins[0].share).toBeCloseTo(2 / 8, 12);
    expect(bins[51]).toMatchObject({ from_Pa: 100, to_Pa: Number.POSITIVE_INFINITY, density_1_Pa: null });
    expect(bins[51].share).toBeCloseTo(1 / 8, 12);
    const around = bins.find((bin) => bin.from_Pa < 0.3 && bin.to_Pa >= 0.3);
    expect(around?.share).toBeCloseTo(2 / 8, 12);
    expect(around?.density_1_Pa).toBeCloseTo(2 / 8 / (0.316228 - 0.251189), 9);
  });
});
