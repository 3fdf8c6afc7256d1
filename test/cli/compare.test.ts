import { existsSync, readdirSync } from 'node:fs';
import { csvParse } from 'd3-dsv';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Bench, type Ended, TINY } from './swathe.ts';

const bench = new Bench();
bench.file('tiny.yaml', TINY);
bench.file('leaning.yaml', TINY.replace('tilt: 10 deg', 'tilt: 40 deg').replace('Short', 'Leaning'));
// too fast before anything is recorded: no run can follow it
bench.file(
  'fast.yaml',
  TINY.replace('height: 36 mm', 'height: 130 mm\n  return: {upflow: 1.9 m/s}').replace('{across: 16}', '{across: 16, speed: 0.05 m/s}'),
);
afterAll(() => bench.remove());

describe('a comparison from end to end', () => {
  let ended: Ended;
  beforeAll(async () => {
    ended = await bench.swathe('compare', 'tiny.yaml', 'leaning.yaml', '--seeds', '3', '--at-once', '2');
  }, 240_000);

  it('computes what is missing, ranks, and says which difference is more than chance', () => {
    expect(ended.error).toMatch(/^6 runs to compute, 2 at once\n1 of 6: (tiny|leaning), seed \d done, about .* left\n/);
    expect(ended.error).toMatch(/\n6 of 6: .* done, .* in all\n$/);
    expect(ended.exit).toBe(0);
    expect(ended.out).toMatch(/^ranked by swept_together, the largest first\n/);
    expect(ended.out).toMatch(/^geometry +runs +recorded +swept_together +95 % interval +mean shear +air +swept per W\/m2 +computed in$/m);
    expect(ended.out).toMatch(/^1 (tiny|leaning) +3 +0.12 s +[\d.]+ % +[\d.]+ % to [\d.]+ % +[\d.]+ Pa +11.4 W\/m2 /m);
    expect(ended.out).toMatch(
      / less .*: [\d.]+ points \(95 %: -?[\d.]+ to [\d.]+ points; 3 pairs of equal seeds\): .*(is better|can't tell)/,
    );
    expect(ended.out).toContain('files: runs/compare-tiny-leaning');
  });

  it('leaves a folder for each run, its own seed where swathe run puts it', () => {
    const runs = readdirSync(bench.path('runs')).filter((name) => !name.startsWith('compare'));
    expect(runs.sort()).toEqual(['leaning', 'leaning-seed-2', 'leaning-seed-3', 'tiny', 'tiny-seed-2', 'tiny-seed-3']);
    for (const name of runs) expect(bench.json(`runs/${name}/run.json`)).toMatchObject({ status: 'done', seed: Number(name.at(-1)) || 1 });
  });

  it('takes runs that are there, by case or by folder, in any order', async () => {
    const before = bench.read('runs/compare-tiny-leaning/differences.csv');
    const folders = ['leaning', 'leaning-seed-2', 'leaning-seed-3', 'tiny', 'tiny-seed-2', 'tiny-seed-3'].map((name) => `runs/${name}`);
    const again = await bench.swathe('compare', ...folders, '--out', 'again');
    expect(again.error).toBe('');
    expect(bench.read('again/differences.csv')).toBe(before);
    const mixed = await bench.swathe('compare', 'runs/tiny', 'leaning.yaml', '--by', 'mean_shear_right_Pa', '--out', 'mixed');
    expect(mixed.error).toBe('');
    expect(mixed.out).toContain("from the runs' own intervals");
    expect(csvParse(bench.read('mixed/ranking.csv')).map(({ measure }) => measure)).toEqual(['mean_shear_right_Pa', 'mean_shear_right_Pa']);
  });

  it('holds the runs of one geometry against each other, which differ by chance alone', async () => {
    const same = await bench.swathe('compare', 'tiny.yaml', '--seeds', '3', '--by', 'mean_shear_together_Pa', '--out', 'same');
    expect(same.error).toBe('');
    const names = ['tiny, seed 1', 'tiny, seed 2', 'tiny, seed 3'];
    const ranking = csvParse(bench.read('same/ranking.csv'));
    expect(ranking.map(({ geometry }) => geometry).sort()).toEqual(names);
    expect(ranking.map(({ runs }) => runs)).toEqual(['1', '1', '1']);
    expect(csvParse(bench.read('same/differences.csv'))).toHaveLength(3);
    expect(same.out).toContain('note: One geometry: its runs differ in the seed alone');
  });

  it('goes on with what was interrupted', async () => {
    const words = ['compare', 'tiny.yaml', 'leaning.yaml', '--set', 'record.span=120 ms', '--seeds', '1', '--out', 'cut'];
    const inOther = new Bench();
    try {
      for (const name of ['tiny.yaml', 'leaning.yaml']) inOther.file(name, bench.read(name));
      const { child, ended: stopped } = inOther.start(...words);
      while (!existsSync(inOther.path('runs/tiny/run.json')) || inOther.json('runs/tiny/run.json').progress === null)
        await new Promise((resolve) => setTimeout(resolve, 20));
      child.kill('SIGINT');
      const { exit, error } = await stopped;
      expect(exit).toBe(130);
      expect(error).toContain("To go on:\n  swathe compare tiny.yaml leaning.yaml --set 'record.span=120 ms' --seeds 1 --out cut\n");
      expect(inOther.json('runs/tiny/run.json').status).toBe('stopped');
      const again = await inOther.swathe(...words);
      expect(again.exit).toBe(0);
      expect(inOther.json('runs/tiny/run.json').status).toBe('done');
    } finally {
      inOther.remove();
    }
  }, 240_000);

  it('whose runs fail ends with their message and exit code, and keeps the others', async () => {
    const { exit, error, out } = await bench.swathe('compare', 'tiny.yaml', 'fast.yaml', '--out', 'failing');
    expect({ exit, out }).toEqual({ exit: 3, out: '' });
    expect(error).toMatch(/1 of 1: fast, seed 1 failed.*\nswathe: fast, seed 1 failed: .*speed/);
    expect(error).toContain('Finished runs are kept');
    expect(readdirSync(bench.path('failing'))).toEqual([]);
  }, 120_000);
});

describe('a comparison that cannot be made', () => {
  const wrong: [string[], string][] = [
    [['compare'], 'compare needs runs or cases'],
    [['compare', 'tiny.yaml'], 'compare needs two runs at least, and there is one, tiny'],
    [['compare', 'tiny.yaml', 'tiny.yaml'], 'compare needs two runs at least'],
    [['compare', 'tiny.yaml', 'leaning.yaml', '--by', 'swept_togther'], 'did you mean swept_together?'],
    [['compare', 'tiny.yaml', 'tilted-pannel'], 'Did you mean tilted-panel?'],
    [['compare', 'tiny.yaml', 'leaning.yaml', '--seeds', 'four'], '--seeds four: not a whole number from 1 to 100'],
    [['compare', 'tiny.yaml', 'leaning.yaml', '--at-once', '0'], '--at-once 0: not a whole number from 1 to 1000'],
    [['compare', 'tiny.yaml', 'leaning.yaml', '--seed', '4'], 'did you mean --seeds?'],
    [['compare', 'tiny.yaml', 'leaning.yaml', '--set', 'channel.gap=8 kg'], 'channel.gap'],
  ];
  it.each(wrong)('%j ends with exit code 2 before anything is run', async (words, message) => {
    const { exit, out, error } = await bench.swathe(...words, '--out', 'none');
    expect(error).toContain(message);
    expect(error).not.toMatch(/\n\s+at /);
    expect({ exit, out }).toEqual({ exit: 2, out: '' });
    expect(existsSync(bench.path('none'))).toBe(false);
  });

  it('for a folder holds no run ends with exit code 4', async () => {
    bench.file('empty.txt', '');
    const { exit, error } = await bench.swathe('compare', 'runs', 'tiny.yaml', '--out', 'none');
    expect(exit).toBe(4);
    expect(error).toContain('no run is in this folder');
  });
});
