import { describe, expect, test } from 'vitest';
import { difference, pooled, type RunValue } from '../../output/compare/pooled.ts';
import { verdictOn } from '../../output/compare/verdict.ts';
import { ANY, SHARE } from '../../output/measures/estimate.ts';
import { meanInterval } from '../../output/measures/interval.ts';
import { autoregression, normal } from './series.ts';

/** Repetitions with plain numbers, and with series, which take longer: the coverage is then known within 0.3 and within 1 percent. */
const MANY = 4000;
const SERIES = 500;

/** Percent of repetitions in which the interval holds the truth. */
function coverage(repetitions: number, truth: number, make: (repetition: number) => { low: number | null; high: number | null }): number {
  let held = 0;
  for (let i = 0; i < repetitions; i++) {
    const { low, high } = make(i);
    if (low !== null && high !== null && low <= truth && truth <= high) held++;
  }
  return (100 * held) / repetitions;
}

/** Runs with normal scatter, and nothing known of each alone. */
function scattered(next: () => number, count: number, centre: number, sigma: number, first = 1): RunValue[] {
  return Array.from({ length: count }, (_, i) => ({ seed: first + i, value: centre + sigma * next(), low: null, high: null }));
}

/** Runs that are correlated series of known mean, each with its own interval. */
function recorded(count: number, centre: number, seed: number, first = 1): RunValue[] {
  return Array.from({ length: count }, (_, i) => {
    const series = autoregression(1000, 0.9, 100_000 * i + seed).map((entry) => entry + centre);
    const [low, high] = meanInterval(series, ANY) ?? [null, null];
    return { seed: first + i, value: series.reduce((sum, entry) => sum + entry, 0) / series.length, low, high };
  });
}

describe('a 95 % interval holds the truth in 93 to 97 of 100 repetitions', () => {
  // seen, in this order: 95.1, 95.4; pairs 95 within 0.5; 96.1, 94.6, 94.8, 94.9; 96.6
  const next = normal(20_261);

  test('the mean of four runs, and of two by their own intervals', () => {
    const four = coverage(MANY, 0.7, () => pooled(scattered(next, 4, 0.7, 0.1), ANY));
    const two = coverage(SERIES, 0.7, (i) => pooled(recorded(2, 0.7, i), ANY));
    expect(
      [four, two].map((share) => share >= 93 && share <= 97),
      `${four} ${two}`,
    ).toEqual([true, true]);
  });

  test('the difference of four pairs of equal seeds, with much in common or nothing', () => {
    const paired = (common: number) =>
      coverage(MANY, 0.05, () => {
        const shared = scattered(next, 4, 0, common);
        const add = (runs: RunValue[]) => runs.map((run, k) => ({ ...run, value: run.value + shared[k].value }));
        const found = difference(add(scattered(next, 4, 0.75, 0.02)), add(scattered(next, 4, 0.7, 0.06)));
        expect(found.paired).toBe(true);
        return found;
      });
    const found = [paired(0.2), paired(0)];
    expect(
      found.map((share) => share >= 93 && share <= 97),
      `${found}`,
    ).toEqual([true, true]);
  });

  test('the difference of other seeds, with unequal scatter and unequal numbers', () => {
    const apart = (counts: [number, number], sigma: number) =>
      coverage(MANY, -0.1, () => {
        const found = difference(scattered(next, counts[0], 0.6, sigma), scattered(next, counts[1], 0.7, 0.05, 101));
        expect(found.paired).toBe(false);
        return found;
      });
    const found = [apart([4, 4], 0.05), apart([4, 4], 0.15), apart([8, 4], 0.05), apart([3, 6], 0.05)];
    expect(
      found.map((share) => share >= 93 && share <= 97),
      `${found}`,
    ).toEqual([true, true, true, true]);
  });

  test('the difference of single runs, by their own intervals', () => {
    const share = coverage(SERIES, 0.2, (i) => difference(recorded(1, 0.9, i), recorded(1, 0.7, 3_000_000 + i)));
    expect(share >= 93 && share <= 97, `${share}`).toBe(true);
  });
});

describe('pooled by hand', () => {
  const runs = (values: number[], first = 1): RunValue[] =>
    values.map((value, i) => ({ seed: first + i, value, low: value - 0.1, high: value + 0.1 }));

  test('four runs: mean, t of three degrees of freedom, 3.182 [V tables]', () => {
    // values 1, 2, 3, 4: s^2 = 5/3, s / sqrt(4) = 0.6455
    expect(pooled(runs([1, 2, 3, 4]), ANY)).toMatchObject({ value: 2.5, basis: 'runs' });
    expect(pooled(runs([1, 2, 3, 4]), ANY).high).toBeCloseTo(2.5 + 3.1824 * 0.6455, 3);
  });

  test('a share stays a share, and few runs rest on their own intervals', () => {
    expect(pooled(runs([0.9, 1, 1]), SHARE).high).toBe(1);
    const two = pooled(runs([1, 3]), ANY);
    expect(two).toMatchObject({ value: 2, basis: 'recording' });
    expect(two.high).toBeCloseTo(2 + Math.hypot(0.1, 0.1) / 2, 12);
    expect(pooled([{ seed: 1, value: 1, low: null, high: null }], ANY)).toMatchObject({ low: null, high: null });
  });

  test('pairs cancel what equal seeds have in common; other seeds do not', () => {
    const [first, second] = [
      [1, 2, 3, 4],
      [0.9, 1.8, 3, 3.9],
    ] as const;
    const paired = difference(runs([...first]), runs([...second]));
    // differences 0.1, 0.2, 0, 0.1: s / sqrt(4) = 0.0408
    expect(paired).toMatchObject({ paired: true, runs: [4, 4] });
    expect(paired.high).toBeCloseTo(0.1 + 3.1824 * 0.040825, 4);
    const welch = difference(runs([...first]), runs([...second], 11));
    expect(welch.paired).toBe(false);
    expect(welch.value).toBeCloseTo(paired.value, 12);
    expect((welch.high as number) - welch.value).toBeGreaterThan(15 * ((paired.high as number) - paired.value));
  });

  test('single runs: distances to the ends add up in squares, each side its own', () => {
    const found = difference([{ seed: 1, value: 0.9, low: 0.8, high: 0.95 }], [{ seed: 1, value: 0.7, low: 0.67, high: 0.82 }]);
    expect(found.low).toBeCloseTo(0.2 - Math.hypot(0.1, 0.12), 12);
    expect(found.high).toBeCloseTo(0.2 + Math.hypot(0.05, 0.03), 12);
    expect(found).toMatchObject({ paired: false, basis: 'recording' });
  });
});

describe('a verdict', () => {
  const interval = (value: number, low: number | null, high: number | null) => ({
    value,
    low,
    high,
    basis: 'runs' as const,
    paired: true,
    runs: [4, 4] as const,
  });

  test('is passed where the interval leaves zero out, by what is better', () => {
    expect(verdictOn(interval(0.1, 0.02, 0.18), 2, true).state).toBe('better');
    expect(verdictOn(interval(-0.1, -0.18, -0.02), 2, true).state).toBe('worse');
    expect(verdictOn(interval(-0.1, -0.18, -0.02), 2, false).state).toBe('better');
  });

  test('else says how much longer: at that length the interval just leaves zero out', () => {
    for (const [value, half] of [
      [0.1, 0.15],
      [-0.02, 0.08],
    ]) {
      const { state, more_s } = verdictOn(interval(value, value - half, value + half), 2, true);
      expect(state).toBe("can't tell");
      expect(half * Math.sqrt(2 / (2 + (more_s as number)))).toBeCloseTo(Math.abs(value), 12);
    }
  });

  test('else says how many runs instead: the least whose t over the root of their number is small enough', () => {
    // half width 0.15 to be 0.1: t(k-1)/sqrt(k) from 3.182/2 to below 1.061; k = 6: 2.571/2.449 = 1.050, k = 5: 2.776/2.236 = 1.241 [V tables]
    expect(verdictOn(interval(0.1, -0.05, 0.25), 2, true).moreRuns).toBe(6);
    expect(verdictOn(interval(0.001, -0.149, 0.151), 2, true).moreRuns).toBeNull();
  });

  test('knows what is the same, and what cannot be said', () => {
    expect(verdictOn(interval(0, 0, 0), 2, true).state).toBe('alike');
    expect(verdictOn(interval(0, -0.1, 0.1), 2, true)).toEqual({ state: "can't tell", more_s: null, moreRuns: null });
    expect(verdictOn(interval(0.1, null, null), 2, true).state).toBe('missing');
  });
});
