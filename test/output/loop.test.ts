import { describe, expect, test } from 'vitest';
import { measure } from '../../output/index.ts';
import { makeRecording } from './recordings.ts';

/** Settling ends at 1 s; history every 0.5 s. One unit of gas is there at the start. */
const history = {
  time_s: [0, 0.5, 1, 1.5, 2, 2.5],
  holdup: [9, 9, 0.02, 0.04, 0.06, 0.08],
  upflow_m_s: [9, 9, 0.1, 0.2, 0.3, 0.4],
  released_m2: [0, 1, 2, 3, 4, 5],
  skimmed_m2: [0, 0, 0, 1, 2, 2],
  present_m2: [1, 2, 3, 3, 3, 4],
};

describe('the measures of the loop', () => {
  test('are means after settling, with the drift from the first half to the second', () => {
    const { loop } = measure({ ...makeRecording(), history });
    expect(loop.holdup).toBeCloseTo(0.05, 12);
    expect(loop.upflow_m_s).toBeCloseTo(0.25, 12);
    expect(loop.upflowDrift_m_s).toBeCloseTo(0.2, 12);
  });

  test('balance the gas that came, went and stayed', () => {
    expect(measure({ ...makeRecording(), history }).loop.balanceError).toBeCloseTo(0, 12);
    const leaking = { ...history, present_m2: [1, 2, 3, 3, 3, 3.4] };
    // 0.6 of the 1 + 5 that was ever there is gone
    expect(measure({ ...makeRecording(), history: leaking }).loop.balanceError).toBeCloseTo(-0.1, 12);
  });

  test('are empty while the panel still settles', () => {
    const early = Object.fromEntries(Object.entries(history).map(([name, column]) => [name, column.slice(0, 2)])) as typeof history;
    const { loop } = measure({ ...makeRecording(), history: early });
    expect(loop).toMatchObject({ holdup: null, upflow_m_s: null, upflowDrift_m_s: null, released_m2: 1 });
  });
});
