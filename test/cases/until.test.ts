import { describe, expect, it } from 'vitest';
import { type Case, type Checkpoint, type Hooks, type Recording, readCase, simulate } from '../../cases/index.ts';
import { lookSteps } from '../../cases/until.ts';

/** Liquid pumped through a short channel: as cheap as a run can be. */
const text = `
channel: {gap: 6 mm, height: 40 mm, return: {upflow: 0.1 m/s}}
gas: {supply: 0 m3/(m2 h)}
grid: {across: 12}
record: {settle: 20 ms, span: 50 ms, every: 5 ms, until: {swept_left: 5 %, holdup: 10 %}, at most: 1 s}
`;
const panel = readCase(text, 'until.yaml');

/** Runs the case; it is sure once so much is recorded. */
async function run(enough_s: number, hooks: Hooks = {}): Promise<{ recording: Recording; looks: number[] }> {
  const looks: number[] = [];
  const sureEnough = ({ times_s }: Recording): boolean => {
    looks.push(Math.round(1000 * (times_s.at(-1) ?? 0)));
    return times_s.length * 0.005 >= enough_s;
  };
  return { recording: await simulate(panel, { sureEnough, ...hooks }), looks };
}

describe('a recording until measures are sure', () => {
  it('is read with what is asked, the span being the least', () => {
    expect(panel.record.until).toEqual({
      sure: [
        { name: 'swept_left', within: 0.05 },
        { name: 'holdup', within: 0.1 },
      ],
      atMost_s: 1,
    });
    expect(panel.record.span_s).toBe(0.05);
    expect(readCase(text, 'until.yaml', ['record={span: 50 ms, every: 5 ms}']).record).not.toHaveProperty('until');
  });

  it('is looked at after the span, then every 0.2 s or tenth of its length, never at its most', () => {
    const record = { settle_s: 1, span_s: 1, every_s: 1, until: { sure: [], atMost_s: 10 } };
    const looks = lookSteps(record, 0.001, { settle: 1000, least: 1000, most: 10_000 });
    expect(looks.slice(0, 4)).toEqual([2000, 2200, 2400, 2600]);
    for (let i = 1; i < looks.length; i++) expect(looks[i] - looks[i - 1]).toBe(Math.ceil(Math.max(200, 0.1 * (looks[i - 1] - 1000))));
    expect(looks.at(-1)).toBeLessThan(11_000);
    const fixed: Case['record'] = { settle_s: 1, span_s: 1, every_s: 1 };
    expect(lookSteps(fixed, 0.001, { settle: 1000, least: 1000, most: 1000 })).toEqual([]);
  });

  it('ends at the first look that finds them sure, and says so', async () => {
    const { recording, looks } = await run(0.4);
    expect(looks).toEqual([70, 270, 470]);
    expect(recording.ended).toBe('sure');
    expect(recording.complete).toBe(true);
    expect(recording.times_s).toHaveLength(90);
    expect((await run(0)).looks).toEqual([70]);
  });

  it('ends at its most otherwise, and without anyone to ask', async () => {
    const { recording, looks } = await run(2);
    expect(looks).toEqual([70, 270, 470, 670, 870]);
    expect(recording.ended).toBe('atMost');
    expect(recording.times_s).toHaveLength(200);
    const { ended, times_s } = await simulate(panel);
    expect([ended, times_s.length]).toEqual(['atMost', 200]);
  });

  it.each([100, 900, 2500])('that was stopped after step %d and resumed equals the whole one bit for bit', async (step) => {
    const { recording: whole } = await run(0.4);
    const stop = new AbortController();
    let checkpoint: Checkpoint | undefined;
    const cut = await run(0.4, {
      signal: stop.signal,
      onProgress: (progress) => {
        if (progress.step >= step) stop.abort();
      },
      onCheckpoint: (made) => {
        checkpoint = made;
      },
    });
    expect(cut.recording.ended).toBe('stopped');
    if (checkpoint === undefined) throw new Error('no checkpoint');
    expect((await run(0.4, { resume: checkpoint })).recording).toEqual(whole);
  });
});
