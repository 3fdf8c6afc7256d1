import { existsSync, mkdirSync, readdirSync, readFileSync } from 'node:fs';
import { csvParse } from 'd3-dsv';
import { PNG } from 'pngjs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Bench, type Ended, TINY } from './swathe.ts';

const bench = new Bench();
afterAll(() => bench.remove());

describe('a run from end to end', () => {
  let ended: Ended;
  beforeAll(async () => {
    bench.file('tiny.yaml', TINY);
    ended = await bench.swathe('run', 'tiny.yaml', '--frames', '3', '--set', 'channel.tilt=20 deg');
  });

  it('says at once what is computed, where to, and how to stop it', () => {
    expect(ended.error).toMatch(
      /^Short piece for tests: 72 x 16 cells, \d+ steps, into runs\/tiny\. Ctrl-C stops it and says how to go on\n/,
    );
  });

  it('ends well and says where the files are and what they hold', () => {
    expect(ended.error).not.toContain('swathe:');
    expect(ended.exit).toBe(0);
    expect(ended.out).toContain('Short piece for tests');
    expect(ended.out).toContain('above 0.1 Pa at least once within 0.02 s');
    expect(ended.out).toMatch(/left +\d.*%.*Pa/);
    expect(ended.out).toMatch(/right +\d.*%.*Pa/);
    expect(ended.out).toMatch(/^files: runs\/tiny; look at shear-map-left.png, shear-map-right.png and frames\/ first/m);
    expect(ended.out).toContain('softened');
    expect(ended.out).toContain('not for design');
  });

  it('leaves a folder that says done, with every file it lists', () => {
    const record = bench.json('runs/tiny/run.json');
    expect(record.status).toBe('done');
    for (const name of ['case.yaml', 'summary.json', 'walls.csv', 'histogram.csv', 'swept.csv', 'history.csv', 'bubbles.csv']) {
      expect(existsSync(bench.path('runs/tiny', name)), name).toBe(true);
    }
    expect(readdirSync(bench.path('runs/tiny')).filter((name) => /checkpoint|lock/.test(name))).toEqual([]);
  });

  it('keeps the case as run, with the values set on the command line', () => {
    expect(bench.read('runs/tiny/case.yaml')).toContain('tilt: 20 deg');
  });

  it('writes tables of finite numbers, one row per wall element', () => {
    const walls = csvParse(bench.read('runs/tiny/walls.csv'));
    expect(walls).toHaveLength(2 * 72);
    const history = csvParse(bench.read('runs/tiny/history.csv'));
    expect(history.length).toBeGreaterThanOrEqual(50);
    for (const row of history) for (const value of Object.values(row)) expect(Number.isFinite(Number(value))).toBe(true);
  });

  it('draws the asked number of frames and a shear map of each wall', () => {
    const frames = readdirSync(bench.path('runs/tiny/frames'));
    expect(frames).toHaveLength(3);
    for (const path of ['shear-map-left.png', 'shear-map-right.png', `frames/${frames[0]}`]) {
      const picture = PNG.sync.read(readFileSync(bench.path('runs/tiny', path)));
      expect(picture.width).toBeGreaterThan(50);
      expect(picture.height).toBeGreaterThan(50);
    }
  });

  it('does not compute again what is there, and says how to', async () => {
    const before = bench.read('runs/tiny/run.json');
    const { exit, out } = await bench.swathe('run', 'tiny.yaml', '--set', 'channel.tilt=20 deg');
    expect(exit).toBe(0);
    expect(out).toContain('--again');
    expect(out).toContain('--out');
    expect(bench.read('runs/tiny/run.json')).toBe(before);
  });

  it('refuses a folder that holds another case, whose files stay', async () => {
    const before = bench.tables('runs/tiny');
    const { exit, error } = await bench.swathe('run', 'tiny.yaml', '--set', 'channel.tilt=5 deg');
    expect(exit).toBe(4);
    expect(error).toContain('another case');
    expect(error).toContain('--out');
    expect(bench.tables('runs/tiny')).toEqual(before);
  });

  it('starts anew when told so, with the same bytes for the same case', async () => {
    const before = bench.tables('runs/tiny');
    const { exit } = await bench.swathe('run', 'tiny.yaml', '--set', 'channel.tilt=20 deg', '--again', '--no-frames');
    expect(exit).toBe(0);
    expect(bench.tables('runs/tiny')).toEqual(before);
    expect(existsSync(bench.path('runs/tiny/frames'))).toBe(false);
  });

  it('reproduces itself from the case in its folder', async () => {
    const { exit } = await bench.swathe('run', 'runs/tiny/case.yaml', '--out', 'copy', '--no-frames');
    expect(exit).toBe(0);
    expect(bench.tables('copy')).toEqual(bench.tables('runs/tiny'));
  });

  it('says nothing when quiet', async () => {
    const { exit, out, error } = await bench.swathe('run', 'tiny.yaml', '--quiet', '--no-frames', '--out', 'quiet');
    expect({ exit, out, error }).toEqual({ exit: 0, out: '', error: '' });
  });
});

describe('a run that cannot be written', () => {
  it.each([
    ['below a file', 'plain.txt/run'],
    ['in a place of the system', '/proc/swathe'],
    ['over a folder of something else', 'other'],
    ['over a file', 'plain.txt'],
  ])('%s ends with exit code 4 and names the path', async (_, out) => {
    bench.file('tiny.yaml', TINY);
    bench.file('plain.txt', 'text\n');
    mkdirSync(bench.path('other'), { recursive: true });
    bench.file('other/letter.txt', 'keep me\n');
    const { exit, error } = await bench.swathe('run', 'tiny.yaml', '--out', out);
    expect(error).toContain(out);
    expect(error).not.toMatch(/\n\s+at /);
    expect(exit).toBe(4);
    expect(bench.read('other/letter.txt')).toBe('keep me\n');
  });
});

describe('a run that leaves the range of the method', () => {
  it('ends with exit code 3, names place, time and remedy, and its folder says failed', async () => {
    bench.file('tiny.yaml', TINY);
    // a pump that wants more than the time step can carry
    const sets = ['channel.height=130 mm', 'grid.speed=0.05 m/s', 'channel.return.upflow=1.9 m/s'].flatMap((set) => ['--set', set]);
    const { exit, error } = await bench.swathe('run', 'tiny.yaml', ...sets, '--out', 'fast', '--no-frames');
    expect(error).toMatch(/at [\d.]+ s \(step \d+\), [\d.]+ mm along and [\d.]+ mm across, the speed is [\d.]+ m\/s; at most 1 m\/s/);
    expect(error).toContain('Try a finer time step (grid.speed: ');
    expect(exit).toBe(3);
    const record = bench.json('fast/run.json');
    expect(record.status).toBe('failed');
    expect(record.error).toMatchObject({ kind: 'SolverError', message: expect.stringContaining('mm along') });
    expect(existsSync(bench.path('fast/summary.json'))).toBe(false);
  });
});
