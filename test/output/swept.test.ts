import { describe, expect, test } from 'vitest';
import type { WallSide } from '../../cases/index.ts';
import { measure } from '../../output/index.ts';
import { makeRecording } from './recordings.ts';

/** A repeatable rough signal with long rests: no pattern a window could lock on to. */
function rough(side: WallSide, s: number, e: number): number {
  const wave = Math.sin(s * 0.37 + e * 1.9) * Math.sin(s * 0.113 + e * e + (side === 'left' ? 0 : 2));
  return 3 * wave ** 5;
}

/** The definition, word for word: slow, and written without a look at the code under test. */
function sweptByDefinition(samples: number, elements: number[], window: number, hit: (s: number, e: number) => boolean): number {
  let sum = 0;
  let windows = 0;
  for (let start = 0; start + window <= samples; start++) {
    windows++;
    let share = 0;
    for (const e of elements) {
      let once = false;
      for (let s = start; s < start + window; s++) once ||= hit(s, e);
      if (once) share += 1 / elements.length;
    }
    sum += share;
  }
  return sum / windows;
}

const ELEMENTS = [1, 2, 3, 4, 5, 6, 7, 8];

describe('the swept fraction', () => {
  test('of one event per element in the middle is the share of windows that hold it', () => {
    // 21 samples, event at 10, windows of 5 samples: 17 fit, 5 hold the event
    const { swept } = measure(makeRecording({ samples: 21, shear: (_, s) => (s === 10 ? -1 : 0) })).walls.left;
    expect(swept.within).toBeCloseTo(5 / 17, 12);
    expect(swept.whole).toBe(1);
  });

  test('equals the definition at every threshold and window length', () => {
    const samples = 60;
    const measures = measure(makeRecording({ samples, shear: rough, swept: { above_Pa: 0.5, within_s: 0.12 } }));
    const { swept } = measures.walls.left;
    const f32 = (s: number, e: number) => Math.abs(Math.fround(rough('left', s, e)));
    swept.overThreshold.threshold_Pa.forEach((threshold, j) => {
      expect(swept.overThreshold.within[j]).toBeCloseTo(
        sweptByDefinition(samples, ELEMENTS, 12, (s, e) => f32(s, e) > threshold),
        10,
      );
      expect(swept.overThreshold.whole[j]).toBeCloseTo(
        sweptByDefinition(samples, ELEMENTS, 60, (s, e) => f32(s, e) > threshold),
        10,
      );
    });
    expect(swept.overTime.window_s).toHaveLength(61);
    for (let w = 1; w <= samples; w++) {
      expect(swept.overTime.window_s[w]).toBeCloseTo(w * 0.01, 12);
      expect(swept.overTime.swept[w]).toBeCloseTo(
        sweptByDefinition(samples, ELEMENTS, w, (s, e) => f32(s, e) > 0.5),
        10,
      );
    }
    // a test of nothing at all would pass with all 0 or all 1
    expect(swept.within).toBeGreaterThan(0.1);
    expect(swept.within).toBeLessThan(0.9);
  });

  test('says the same asked as a number, on the curve over thresholds and on the curve over time', () => {
    const { swept } = measure(makeRecording({ samples: 300, shear: rough, swept: { above_Pa: 0.77, within_s: 0.37 } })).walls.right;
    const onThresholds = swept.overThreshold.within[swept.overThreshold.threshold_Pa.indexOf(0.77)];
    const onTime = swept.overTime.swept[swept.overTime.window_s.findIndex((w) => Math.abs(w - 0.37) < 1e-9)];
    expect(onThresholds).toBeCloseTo(swept.within ?? Number.NaN, 12);
    expect(onTime).toBe(swept.within);
  });

  test('never rises with the threshold and never falls with the window', () => {
    const { swept } = measure(makeRecording({ samples: 200, shear: rough })).walls.left;
    const { within } = swept.overThreshold;
    for (let j = 1; j < within.length; j++) expect(within[j]).toBeLessThanOrEqual(within[j - 1] ?? 0);
    const { swept: overTime } = swept.overTime;
    expect(overTime[0]).toBe(0);
    for (let w = 1; w < overTime.length; w++) expect(overTime[w]).toBeGreaterThanOrEqual(overTime[w - 1] ?? 1);
  });

  test('a value at the threshold itself does not sweep', () => {
    const { swept } = measure(makeRecording({ shear: () => 0.5 })).walls.left;
    expect(swept.within).toBe(0);
    expect(swept.overThreshold.within[swept.overThreshold.threshold_Pa.indexOf(0.5)]).toBe(0);
  });

  test('of both walls together counts each wall by its open elements', () => {
    const measures = measure(
      makeRecording({ shear: (side, s, e) => (side === 'left' && e < 5 ? Number.NaN : side === 'left' && s === 0 ? 1 : 0) }),
    );
    // left: 4 open elements, all swept over the whole; right: 8, none
    expect(measures.together.elements).toBe(12);
    expect(measures.together.whole).toBeCloseTo(4 / 12, 12);
  });

  test('leaves a wall without a membrane out of the whole, but measures it', () => {
    const measures = measure(makeRecording({ membranes: ['right'], shear: (side) => (side === 'left' ? 1 : 0) }));
    expect(measures.walls.left.membrane).toBe(false);
    expect(measures.walls.left.swept.whole).toBe(1);
    expect(measures.together.whole).toBe(0);
    expect(measures.elements.filter((row) => row.wall === 'left').some((row) => row.inMembrane)).toBe(false);
  });

  test('of a recording shorter than the window is empty, with a note; the whole recording still counts', () => {
    const measures = measure(makeRecording({ samples: 4, shear: () => 1 }));
    expect(measures.walls.left.swept.within).toBeNull();
    expect(measures.walls.left.swept.whole).toBe(1);
    expect(measures.walls.left.swept.overThreshold.within.every((value) => value === null)).toBe(true);
    expect(measures.notes.join('\n')).toContain('shorter than the window of 0.05 s');
  });

  test('a window as long as the recording is the whole recording', () => {
    const { swept } = measure(makeRecording({ samples: 5, shear: (_, s, e) => (s === 4 && e < 3 ? 1 : 0) })).walls.left;
    expect(swept.within).toBe(swept.whole);
    expect(swept.whole).toBeCloseTo(2 / 8, 12);
  });

  test('counts the share touched by gas beside it', () => {
    const { swept } = measure(makeRecording({ samples: 21, gas: (_, s, e) => s === 10 && e < 5 })).walls.left;
    expect(swept.touched.whole).toBeCloseTo(4 / 8, 12);
    expect(swept.touched.within).toBeCloseTo((4 / 8) * (5 / 17), 12);
    expect(swept.whole).toBe(0);
  });
});
