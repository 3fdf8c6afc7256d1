import { describe, expect, it } from 'vitest';
import { measure } from '../../output/index.ts';
import { type Answer, answersOf } from '../../output/measures/answers.ts';
import { felt } from '../../output/measures/felt.ts';
import { layWall } from '../../output/measures/surface.ts';
import { makeRecording } from './recordings.ts';
import { autoregression, coverage } from './series.ts';

const answer = (answers: readonly Answer[], name: string): Answer => answers.find((one) => one.name === name) ?? expect.fail(name);

describe('the answers of a recording', () => {
  it('have the same names in every run, ending in their unit where they have one', () => {
    const names = measure(makeRecording()).answers.map(({ name }) => name);
    expect(new Set(names).size).toBe(names.length);
    const stems = ['swept', 'touched', 'share_above', 'reversal', 'under_gas'];
    const shears = ['mean', 'steady', 'rms', 'p5', 'p25', 'p50', 'p75', 'p95', 'p99'];
    const places = ['left', 'right', 'together'];
    const expected = places.flatMap((place) => [
      ...stems.map((stem) => `${stem}_${place}`),
      ...shears.map((stem) => `${stem}_shear_${place}_Pa`),
      `events_${place}_1_s`,
    ]);
    for (const name of [...expected, 'holdup', 'upflow_m_s']) expect(names).toContain(name);
    expect(measure(makeRecording({ samples: 0, membranes: ['left'] })).answers.map(({ name }) => name)).toEqual(names);
  });

  it('together are those of both walls as one surface, each by its open elements', () => {
    // left: 8 elements at 1 Pa; right: 6 at 2 Pa, 2 under a fin
    const shear = (side: string, _: number, e: number) => (side === 'left' ? 1 : e < 3 ? Number.NaN : 2);
    const { answers } = measure(makeRecording({ shear }));
    expect(answer(answers, 'mean_shear_together_Pa').value).toBeCloseTo((8 + 2 * 6) / 14, 12);
    expect(answer(answers, 'rms_shear_together_Pa').value).toBeCloseTo(Math.sqrt((8 + 4 * 6) / 14), 12);
    expect(answer(answers, 'p50_shear_together_Pa').value).toBe(1);
    expect(answer(answers, 'p75_shear_together_Pa').value).toBe(2);
    expect(answer(answers, 'swept_together').value).toBe(1);
  });

  it('together are those of the one wall that carries a membrane', () => {
    const { answers } = measure(makeRecording({ membranes: ['right'], shear: (side, s) => (side === 'left' ? 9 : Math.sin(s)) }));
    for (const { name, value } of answers.filter((one) => one.name.includes('_together')))
      expect(value).toBe(answer(answers, name.replace('together', 'right')).value);
  });

  it('of percentiles of two walls are those of all values sorted as one', () => {
    const shear = (side: string, s: number, e: number) => (side === 'left' ? 0.1 : 0.37) * ((7 * s + 3 * e) % 23);
    const { answers } = measure(makeRecording({ samples: 50, shear }));
    const all = ['left', 'right'].flatMap((side) =>
      Array.from({ length: 50 }, (_, s) => Array.from({ length: 8 }, (_, e) => Math.fround(shear(side, s, e + 1)))).flat(),
    );
    all.sort((a, b) => a - b);
    for (const percent of [5, 25, 50, 75, 95, 99]) {
      const at = (percent / 100) * (all.length - 1);
      const below = Math.floor(at);
      const value = (all[below] as number) + (at - below) * ((all[below + 1] as number) - (all[below] as number));
      expect(answer(answers, `p${percent}_shear_together_Pa`).value).toBeCloseTo(value, 6);
    }
  });

  it('have no interval where nothing changes, and none without a recording', () => {
    // hold-up and upflow have a history all the same, and the air's power follows from the case
    const bare = (samples: number) =>
      measure(makeRecording({ samples, shear: () => 1 })).answers.filter(
        ({ name }) => !['holdup', 'upflow_m_s', 'air_power_W_m2'].includes(name),
      );
    for (const { low, high } of bare(200)) expect([low, high]).toEqual([null, null]);
    for (const { value, low } of bare(0)) expect([value, low]).toEqual([null, null]);
  });
});

describe('the 95 % interval of each measure', () => {
  // four elements that scatter normally, phi 0.9 in time: 42 correlation times. For |tau| of a normal tau the truth is known [V].
  const PHI = 0.9;
  const SAMPLES = 800;
  const SIGMA = 1 / Math.sqrt(1 - PHI * PHI);
  const runs = Array.from({ length: 500 }, (_, run) => {
    const rows = Array.from({ length: 4 }, (_, e) => autoregression(SAMPLES, PHI, 10 * run + e));
    const recording = makeRecording({
      elements: 4,
      samples: SAMPLES,
      shear: (side, s, e) => (side === 'left' ? rows[e][s] : 0),
      swept: { above_Pa: 2 * SIGMA, within_s: 0.5 },
    });
    const walls = [felt(layWall(recording, 'left'))];
    return answersOf(recording, { left: walls, right: walls, together: walls });
  });

  it.each([
    // name, truth (none: the mean over all runs), coverage seen
    ['mean_shear_left_Pa', SIGMA * Math.sqrt(2 / Math.PI), 0.95],
    ['steady_shear_left_Pa', 0, 0.95],
    ['rms_shear_left_Pa', SIGMA, 0.95],
    ['p5_shear_left_Pa', 0.062707 * SIGMA, 0.95],
    ['p50_shear_left_Pa', 0.67449 * SIGMA, 0.95],
    ['p95_shear_left_Pa', 1.95996 * SIGMA, 0.93],
    ['p99_shear_left_Pa', 2.57583 * SIGMA, 0.88],
    ['share_above_left', 0.0455003, 0.94],
    ['events_left_1_s', undefined, 0.95],
    ['swept_left', undefined, 0.95],
  ])('%s holds the truth', (name, known, seen) => {
    const truth = known ?? runs.reduce((sum, run) => sum + (answer(run, name).value ?? 0), 0) / runs.length;
    const { held, told } = coverage(truth, (seed) => {
      const { low, high } = answer(runs[seed - 1], name);
      return low === null || high === null ? undefined : [low, high];
    });
    expect(told).toBeGreaterThan(0.9);
    expect(Math.abs(held - seen)).toBeLessThan(0.02);
  });
});
