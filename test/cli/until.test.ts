import { afterAll, describe, expect, it } from 'vitest';
import { Bench, TINY } from './swathe.ts';

const bench = new Bench();
bench.file('tiny.yaml', TINY);
afterAll(() => bench.remove());

const UNTIL = ['--set', 'record.until={holdup: 80 %}', '--set', 'record.at most=700 ms'];
const recordedOf = (run: string) =>
  bench.json(`runs/${run}/summary.json`).recorded as { samples: number; ended: string; until: { name: string; reached: number }[] };

describe('a run until a measure is sure', () => {
  it('is told beforehand with what it waits for and the most it takes', async () => {
    const { out, exit } = await bench.swathe('check', 'tiny.yaml', ...UNTIL);
    expect(exit).toBe(0);
    expect(out).toContain('0.01 s settling + 0.04 to 0.7 s (until holdup is sure within 80 %) recorded = at most ');
    expect(out).toMatch(/wall time +at most about/);
  });

  it('ends at a look when it is, and says how sure it came out', async () => {
    const { out, exit } = await bench.swathe('run', 'tiny.yaml', ...UNTIL, '--out', 'runs/sure');
    expect(exit).toBe(0);
    const { samples, ended, until } = recordedOf('sure');
    expect(ended).toBe('sure');
    // looks after 40, 240, 440 and 640 samples of 1 ms
    expect([40, 240, 440, 640]).toContain(samples);
    expect(until).toEqual([{ name: 'holdup', within: 0.8, reached: expect.any(Number) }]);
    expect(until[0].reached).toBeLessThanOrEqual(0.8);
    expect(out).toContain('; sure enough to end there');
    expect(out).toMatch(/^holdup within [\d.]+ % \(80 % asked\)$/m);
    expect(out).toMatch(/^channel: hold-up [\d.]+ \([\d.]+ to [\d.]+\) %, upflow /m);
    expect(bench.json('runs/sure/run.json').status).toBe('done');
  });

  it('ends at its most where it is not, and notes that', async () => {
    const never = ['--set', 'record.until={holdup: 0.1 %}', '--set', 'record.at most=60 ms'];
    const { out, exit } = await bench.swathe('run', 'tiny.yaml', ...never, '--out', 'runs/most');
    expect(exit).toBe(0);
    expect(recordedOf('most')).toMatchObject({ ended: 'atMost', samples: 60 });
    expect(out).toContain('; the most that was asked');
    expect(out).toMatch(/note: holdup was to be sure within 0.1 %, but .* at the end of record\.at most/);
  });
});
