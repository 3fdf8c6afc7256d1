import { describe, expect, it } from 'vitest';
import { comparePage } from '../../cli/comparepage.ts';
import type { Comparison, Pair } from '../../output/index.ts';

/** The line that tells a pair, for a difference of the measure and its interval. */
function line(by: string, difference: Partial<Pair['difference']>, verdict: Partial<Pair['verdict']>): string {
  const pair: Pair = {
    first: 'fins',
    second: 'plain',
    difference: { value: 0, low: null, high: null, basis: 'runs', paired: true, runs: [4, 4], ...difference },
    verdict: { state: "can't tell", more_s: null, moreRuns: null, ...verdict },
  };
  const found: Comparison = { by, larger: true, swept: { above_Pa: 0.5, within_s: 1 }, ranking: [], pairs: [pair], notes: ['a note'] };
  return comparePage(found, 'runs/x').split('\n')[3];
}

describe('a pair is told', () => {
  it('in points where the measure is a share, with its interval, where that comes from, and the verdict', () => {
    const text = line('swept_together', { value: 0.0423, low: 0.0191, high: 0.0655 }, { state: 'better' });
    expect(text).toBe('fins less plain: 4.23 points (95 %: 1.91 to 6.55 points; 4 pairs of equal seeds): fins is better');
    const other = line('mean_shear_left_Pa', { value: 0.1, low: 0.05, high: 0.15, paired: false, runs: [4, 3] }, { state: 'better' });
    expect(other).toBe('fins less plain: 0.1 (95 %: 0.05 to 0.15; 4 and 3 runs): fins is better');
  });

  it('with what would tell, where the interval holds zero', () => {
    const text = line('swept_left', { value: 0.03, low: -0.02, high: 0.08 }, { more_s: 3.556, moreRuns: 7 });
    expect(text).toContain(
      "can't tell yet: record about 3.6 s more in each run, or take 7 seeds; that is if the difference stays what it is",
    );
  });

  it('as hardly worth knowing, where it would take too long', () => {
    const text = line('swept_left', { value: 0.001, low: -0.094, high: 0.096 }, { more_s: 11_978 });
    expect(text).toMatch(
      /can't tell: they may well be alike, the difference is hardly more than 9.6 points. To know, record about 12 000 s more in each run$/,
    );
    expect(line('swept_left', { low: -0.1, high: 0.1 }, {})).toContain(
      "can't tell: no difference was seen, and it is hardly more than 10 points",
    );
  });

  it('without an interval as what it is', () => {
    expect(line('swept_left', { value: 0.1, basis: 'recording' }, { state: 'missing' })).toContain(
      "(no interval; from the runs' own intervals): no interval, so nothing can be said; record longer or run three seeds or more",
    );
  });
});
