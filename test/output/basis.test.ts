import { describe, expect, it } from 'vitest';
import { UNTIL_NAMES } from '../../cases/index.ts';
import { allSure, measure, surenessOf } from '../../output/index.ts';
import { makeRecording } from './recordings.ts';
import { autoregression } from './series.ts';

/** A row per observation of a bubble at these heights (m), every 10 ms from 1 s on. */
const rising = (bubble: number, y_m: number, ...heights_m: number[]) =>
  heights_m.map((x_m, i) => ({ time_s: 1.02 + 0.01 * i, bubble, area_m2: 1e-6, x_m, y_m, ux_m_s: 0.1, uy_m_s: 0 }));

/** 400 samples of 10 ms; the membrane reaches from 0.2 to 1.8 mm, its middle at 1 mm; the gap is 1.6 mm. */
const noise = autoregression(400, 0.7, 1);
const recording = makeRecording({ samples: 400, shear: (side, s) => (side === 'left' ? 1 : 2) + 0.2 * noise[s] });

describe('what the numbers rest on', () => {
  it('counts bubbles that pass the middle of the membrane while it is recorded, by the half of the gap', () => {
    const bubbles = [
      ...rising(1, 2e-4, 5e-4, 9e-4, 1.2e-3), // left
      ...rising(2, 1.4e-3, 9e-4, 1.1e-3, 9e-4, 1.2e-3), // right, comes back and passes again
      ...rising(3, 1.4e-3, 1.1e-3, 1.5e-3), // was above already
      ...rising(4, 1.4e-3, 1.1e-3, 0.5e-3), // sinks
      ...rising(5, 1.4e-3, 0.5e-3, 1.5e-3).map((row) => ({ ...row, time_s: row.time_s - 0.5 })), // before the recording
      ...rising(6, 1.2e-3, 0.99e-3, 1.5e-3), // right
    ];
    expect(measure({ ...recording, bubbles }).basis.passages).toEqual({ left: 1, right: 2, together: 3 });
    expect(measure(makeRecording({ samples: 0 })).basis.passages.together).toBe(0);
  });

  it('tells how many independent moments a recording is worth', () => {
    // correlation time 1.7/0.3 = 5.7 samples: 71 of 400, less the five that short series hide; 88 seen
    const { independent } = measure(recording).basis;
    expect(Math.abs((independent.left ?? 0) / 66 - 1)).toBeLessThan(0.5);
    expect(independent.left).toBeCloseTo(independent.right ?? 0, 1);
    expect(measure(makeRecording()).basis.independent.left).toBeNull();
  });

  it('is called too short below twenty passages, with what to do', () => {
    const few = measure({ ...recording, bubbles: rising(1, 2e-4, 5e-4, 1.2e-3) }).notes.join('\n');
    expect(few).toContain('Too short to be sure: 1 bubble passed the middle of the membrane while it was recorded, worth about');
    expect(few).toContain('lengthen record.span');
    const many = Array.from({ length: 20 }, (_, i) => rising(i, 2e-4, 5e-4, 1.2e-3)).flat();
    expect(measure({ ...recording, bubbles: many }).notes.join('\n')).not.toContain('Too short');
  });

  it('names answers whose interval cannot be told', () => {
    const notes = measure(recording).notes.join('\n');
    // 1 and 2 Pa with a spread of 0.3 stay above 0.5 Pa mostly, never under gas
    expect(notes).toMatch(/No interval can be told for .*touched_left.* more: never changed, or changed too slowly/);
    expect(notes).not.toMatch(/told for[^:]*mean_shear/);
  });
});

describe('a recording that goes on until measures are sure', () => {
  const asking = (within: number, ended: 'sure' | 'atMost') => ({
    ...recording,
    ended,
    case: {
      ...recording.case,
      record: { ...recording.case.record, until: { sure: [{ name: 'mean_shear_left_Pa', within }], atMost_s: 4 } },
    },
  });

  it('can wait for every name that a case takes', () => {
    const names = measure(recording).answers.map(({ name }) => name);
    expect(UNTIL_NAMES.filter((name) => !names.includes(name))).toEqual([]);
  });

  it('is sure by half of the interval over the value, and says what was reached', () => {
    const { answers, recorded } = measure(asking(0.2, 'sure'));
    const { value, low, high } = answers.find(({ name }) => name === 'mean_shear_left_Pa') ?? expect.fail();
    const reached = ((high as number) - (low as number)) / 2 / (value as number);
    expect(recorded.until).toEqual([{ name: 'mean_shear_left_Pa', within: 0.2, reached }]);
    expect(surenessOf(asking(0.2, 'sure'))).toEqual(recorded.until);
    expect(allSure(surenessOf(asking(reached, 'sure')))).toBe(true);
    expect(allSure(surenessOf(asking(0.99 * reached, 'sure')))).toBe(false);
  });

  it('is not sure of what cannot be told', () => {
    const still = makeRecording();
    const until = { sure: [{ name: 'swept_left', within: 1 }], atMost_s: 4 };
    expect(allSure(surenessOf({ ...still, case: { ...still.case, record: { ...still.case.record, until } } }))).toBe(false);
  });

  it('notes what was not reached', () => {
    expect(measure(asking(0.001, 'atMost')).notes.join('\n')).toMatch(
      /mean_shear_left_Pa was to be sure within 0.1 %, but it is sure within [\d.]+ % at the end of record.at most/,
    );
  });
});
