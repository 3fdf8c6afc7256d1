import { existsSync, readdirSync } from 'node:fs';
import { csvParse } from 'd3-dsv';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Bench, type Ended, TINY } from './swathe.ts';

const bench = new Bench();
bench.file('tiny.yaml', TINY);
afterAll(() => bench.remove());

const GRIDS = ['--grids', '12,16,24'];

describe('a refinement from end to end', () => {
  let ended: Ended;
  let table = '';
  beforeAll(async () => {
    ended = await bench.swathe('refine', 'tiny.yaml', ...GRIDS);
    table = existsSync(bench.path('runs/tiny-refine/refine.csv')) ? bench.read('runs/tiny-refine/refine.csv') : '';
  });

  it('runs three grids, the coarsest first, and prints a verdict for each measure with what the index does not know', () => {
    expect(ended.error).toMatch(/^grid 1 of 3: 12 across, 648 cells.*\ngrid 2 of 3: 16 across.*\ngrid 3 of 3: 24 across.*of the work\n$/);
    expect(ended.exit).toBe(0);
    const heads = /^measure +12 across +16 across +24 across +order +extrapolated +change +index +verdict$/m;
    expect(ended.out).toMatch(heads);
    for (const row of ['swept_left', 'swept_together', 'mean_shear_right_Pa', 'p95_shear_left_Pa', 'holdup', 'upflow_m_s'])
      expect(ended.out).toMatch(new RegExp(`^${row} +[\\d.]+ +[\\d.]+ +[\\d.]+ .*(converged|not yet|oscillating|same|agree)`, 'm'));
    expect(ended.out).toContain('A bubble flow is chaotic');
    expect(ended.out).toContain('not for design');
    expect(ended.out).toContain('files: runs/tiny-refine');
  });

  it('leaves three finished runs that differ in nothing but the grid, with steps in proportion to the cells', () => {
    expect(readdirSync(bench.path('runs/tiny-refine')).sort()).toEqual([
      'across-12',
      'across-16',
      'across-24',
      'case.yaml',
      'refine.csv',
      'refine.json',
    ]);
    expect(bench.read('runs/tiny-refine/case.yaml')).toBe(TINY);
    const lines = (across: number) =>
      bench
        .read(`runs/tiny-refine/across-${across}/case.yaml`)
        .split('\n')
        .filter((line) => !line.includes(`across: ${across}`));
    expect(lines(12)).toEqual(lines(24));
    const derived = [12, 16, 24].map((across) => {
      const record = bench.json(`runs/tiny-refine/across-${across}/run.json`);
      expect(record.status).toBe('done');
      return record.derived as { dx_m: number; dt_s: number };
    });
    for (const { dx_m, dt_s } of derived) expect(dx_m / dt_s).toBeCloseTo(derived[0].dx_m / derived[0].dt_s, 9);
  });

  it('writes the values of the three runs', () => {
    const row = csvParse(table).find(({ measure }) => measure === 'rms_shear_right_Pa');
    const rms = [12, 16, 24].map((across) => {
      const { walls } = bench.json(`runs/tiny-refine/across-${across}/summary.json`) as {
        walls: { right: { shear: { rms_Pa: number } } };
      };
      return walls.right.shear.rms_Pa;
    });
    expect([row?.coarse, row?.middle, row?.fine].map(Number)).toEqual(rms.map((value) => Number(value.toPrecision(7))));
  });

  it('takes finished runs as they are, and other grids beside them', async () => {
    const before = bench.read('runs/tiny-refine/across-24/run.json');
    const { exit, out } = await bench.swathe('refine', 'tiny.yaml', '--grids', '24, 16, 14', '--within', '20');
    expect(exit).toBe(0);
    expect(out).toContain('converged means within 20 %');
    expect(out).toContain('a factor of 1.14 only');
    expect(bench.read('runs/tiny-refine/across-24/run.json')).toBe(before);
    expect(csvParse(bench.read('runs/tiny-refine/refine.csv'))[0].coarse_across).toBe('14');
  });

  it('refuses the folder of another case, whose files stay', async () => {
    const before = bench.read('runs/tiny-refine/refine.csv');
    const { exit, error } = await bench.swathe('refine', 'tiny.yaml', ...GRIDS, '--set', 'channel.tilt=5 deg');
    expect(exit).toBe(4);
    expect(error).toContain('a refinement of another case');
    expect(bench.read('runs/tiny-refine/refine.csv')).toBe(before);
  });

  it('goes on where it was interrupted, and ends with the same table', async () => {
    const words = ['refine', 'tiny.yaml', ...GRIDS, '--out', 'cut', '--checkpoint', '0.02'];
    const { child, ended: stopped, printed } = bench.start(...words);
    while (!printed().includes('grid 3 of 3') || !existsSync(bench.path('cut/across-24/checkpoint-a.bin'))) {
      if (child.exitCode !== null) throw new Error(`ended before it was interrupted: ${printed()}`);
      await new Promise((resolve) => setTimeout(resolve, 5));
    }
    child.kill('SIGINT');
    const { exit, error } = await stopped;
    expect(exit).toBe(130);
    expect(error).toContain("swathe refine tiny.yaml --grids '12,16,24' --out cut --checkpoint 0.02\n");
    expect(existsSync(bench.path('cut/refine.csv'))).toBe(false);
    const again = await bench.swathe(...words);
    expect(again.error).toMatch(/across-24 goes on from 0\.\d+ s/);
    expect(again.exit).toBe(0);
    expect(bench.read('cut/refine.csv')).toBe(table);
  });
});

describe('a refinement that cannot be made', () => {
  const wrong: [string[], string][] = [
    [['refine'], 'refine needs a case'],
    [['refine', 'tiny.yaml'], 'with 7 cells across the case cannot be computed: grid.across is out of range (a whole number, 12 to 400)'],
    [['refine', 'tiny.yaml', '--grids', '12,24'], '--grids 12,24: not three whole numbers of cells across'],
    [['refine', 'tiny.yaml', '--grids', '12,24,36.5'], '--grids 12,24,36.5: not three whole numbers'],
    [['refine', 'tiny.yaml', '--grids', '24,12,24'], 'one grid stands there twice'],
    [['refine', 'tiny.yaml', '--grids', '12,24,9000'], 'with 9000 cells across the case cannot be computed'],
    [['refine', 'tiny.yaml', '--grids', '12,24,36', '--within', 'much'], '--within much: not a number from 0.1 to 50'],
    [['refine', 'tiny.yaml', '--set', 'channel.gap=8 kg'], 'channel.gap'],
    [['refine', 'tiny.yaml', '--grid', '12,24,36'], 'did you mean --grids?'],
  ];
  it.each(wrong)('%j ends with exit code 2 before anything is run', async (words, message) => {
    const { exit, out, error } = await bench.swathe(...words, '--out', 'none');
    expect(error).toContain(message);
    expect(error).not.toMatch(/\n\s+at /);
    expect(out).toBe('');
    expect(exit).toBe(2);
    expect(existsSync(bench.path('none'))).toBe(false);
  });

  it('for the flow is too fast on one grid ends with exit code 3 and names the grid', async () => {
    const sets = ['channel.height=130 mm', 'grid.speed=0.05 m/s', 'channel.return.upflow=1.9 m/s'].flatMap((set) => ['--set', set]);
    const { exit, out, error } = await bench.swathe('refine', 'tiny.yaml', '--grids', '16,20,24', ...sets, '--out', 'fast', '--quiet');
    expect(error).toMatch(/^the run with 16 cells across failed; finished ones are kept:\nswathe: .*the speed is/);
    expect({ exit, out }).toEqual({ exit: 3, out: '' });
    expect(existsSync(bench.path('fast/refine.csv'))).toBe(false);
  });
});
