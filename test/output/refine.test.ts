import { mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { csvParse } from 'd3-dsv';
import { afterAll, describe, expect, it } from 'vitest';
import type { Derived } from '../../cases/index.ts';
import { summary } from '../../output/folder/summary.ts';
import { type GridRun, measure, openRefinement, readRefined, refinement, writeRefinement } from '../../output/index.ts';
import { REFINED } from '../../output/refine/answers.ts';
import { makeRecording } from './recordings.ts';

const root = mkdtempSync(join(tmpdir(), 'swathe-refine-'));
afterAll(() => rmSync(root, { recursive: true }));
const made = makeRecording();

/** A run with the given cells across and the same answer for every measure. */
function gridRun(across: number, answer: number | null, changed: Partial<Derived> = {}): GridRun {
  const dx_m = 8e-3 / across;
  const derived = { ...made.derived, ny: across, nx: 10 * across, dx_m, dt_s: dx_m / 15, ...changed };
  return { panel: made.case, derived, folder: `across-${across}`, answers: REFINED.map(() => answer) };
}

/** Three runs on 20, 30 and 45 cells, a ratio of 1.5, with these answers. */
function verdicts(coarse: number | null, middle: number | null, fine: number | null) {
  const { measures } = refinement([gridRun(20, coarse), gridRun(30, middle), gridRun(45, fine)], 0.05);
  const at = (name: string) => measures.find((row) => row.name === name)?.verdict ?? expect.fail(`no ${name}`);
  return { shear: at('mean_shear_left_Pa'), share: at('swept_left') };
}

describe('the verdict on three grids', () => {
  it('is converged within the index where that is small enough', () => {
    // second order, ratio 1.5: changes 0.0225 and 0.01, index 1.25 * 0.01 / 1.25 = 1 %
    expect(verdicts(1.0325, 1.01, 1).shear).toEqual({ state: 'converged', says: 'converged within 1 %', error: expect.closeTo(0.01, 9) });
  });

  it('is not yet where the index is larger than asked', () => {
    expect(verdicts(1.325, 1.1, 1).shear).toMatchObject({ state: 'not yet', says: 'not yet: index 10 %' });
  });

  it('takes order 2 where the observed order is more than the method has', () => {
    // changes 0.2 and 0.01: order 7.4, whose index would be 0.06 %; at order 2 it is 1 %
    expect(verdicts(1.21, 1.01, 1).shear).toEqual({
      state: 'converged',
      says: 'converged within 1 % at order 2',
      error: expect.closeTo(0.01, 9),
    });
  });

  it('is not yet where the differences do not shrink, and says how large the last one is', () => {
    expect(verdicts(1.3, 1.2, 1).shear).toEqual({
      state: 'not yet',
      says: 'not yet: differences do not shrink, the last one is 20 %',
      error: null,
    });
  });

  it('says that values oscillate, whether they settle or not', () => {
    expect(verdicts(0.95, 1.02, 1).shear).toMatchObject({ state: 'oscillating', says: expect.stringContaining('oscillating, index ') });
    expect(verdicts(1.1, 1.2, 1).shear).toEqual({
      state: 'oscillating',
      says: 'oscillating, differences do not shrink, the last one is 20 %',
      error: null,
    });
  });

  it('is no convergence where the values lead to a share above one, though a stress may go there', () => {
    expect(verdicts(0.84, 0.94, 0.99)).toMatchObject({
      share: { state: 'not yet', says: 'not yet: leads to 1.04, which cannot be' },
      shear: { state: 'not yet', says: expect.stringContaining('index') },
    });
  });

  it('names what is the same everywhere, agrees on two grids only, ends at zero or is missing', () => {
    expect(verdicts(1, 1, 1).share).toEqual({ state: 'same', says: 'the same on all three grids', error: 0 });
    expect(verdicts(1.2, 1, 1).shear).toMatchObject({ state: 'unclear', error: null });
    expect(verdicts(0.3, 0.1, 0).shear).toMatchObject({ state: 'unclear', says: 'no index: the finest grid has zero' });
    expect(verdicts(1, null, 1).shear).toEqual({ state: 'missing', says: 'not to be had on every grid', error: null });
  });
});

describe('the notes beside the verdicts', () => {
  const notes = (...runs: [GridRun, GridRun, GridRun]) => refinement(runs, 0.05).notes.join('\n');

  it('say that a bubble flow scatters, which the index does not know', () => {
    const [note, ...others] = refinement([gridRun(20, 1.325), gridRun(30, 1.1), gridRun(45, 1)], 0.05).notes;
    expect(note).toContain('chaotic');
    // 5 bubbles a second for 0.2 s
    expect(note).toContain('about 1 bubble here');
    expect(note).toContain('gas.seed');
    expect(others).toEqual([]);
  });

  it('warn of grids that differ by little', () => {
    expect(notes(gridRun(30, 1), gridRun(36, 1), gridRun(45, 1))).toContain('a factor of 1.2 only');
  });

  it('warn where the bands at the ends take more of the height on the coarsest grid', () => {
    const band = { skim: { from_m: 0.02, to_m: 0.03 } };
    const wider = { skim: { from_m: 0.012, to_m: 0.03 } };
    const text = notes(gridRun(20, 1, wider), gridRun(30, 1, band), gridRun(45, 1, band));
    expect(text).toContain('0.2 to 12 mm on the coarsest, 0.2 to 20 mm on the finest');
  });

  it('do not mind a difference of the bands within a cell of the coarsest grid, 0.4 mm', () => {
    const skim = (from_m: number) => ({ skim: { from_m, to_m: 0.03 } });
    const text = (from_m: number) => notes(gridRun(20, 1, skim(from_m)), gridRun(30, 1, skim(0.02)), gridRun(45, 1, skim(0.02)));
    expect(text(0.0197)).not.toContain('The height that counts');
    expect(text(0.0191)).toContain('The height that counts');
  });

  it('say where an order is not believed', () => {
    expect(notes(gridRun(20, 1.21), gridRun(30, 1.01), gridRun(45, 1))).toContain('verdicts take order 2');
  });
});

describe('the answers of a run', () => {
  it('are those of its summary.json, measure by measure', async () => {
    const recording = makeRecording({ samples: 40, shear: (side, s, e) => (side === 'left' ? 1 : 2) * Math.sin(s + e) });
    const measures = measure(recording);
    const folder = join(root, 'run');
    mkdirSync(folder);
    writeFileSync(join(folder, 'summary.json'), summary(recording, measures));
    const answers = await readRefined(folder);
    const row = (name: string) => answers[REFINED.indexOf(name)];
    expect(row('swept_left')).toBe(measures.answers.find(({ name }) => name === 'swept_left')?.value);
    expect(row('swept_left')).toBeCloseTo(measures.walls.left.swept.within ?? Number.NaN, 12);
    expect(row('swept_together')).toBeCloseTo(measures.together.within ?? Number.NaN, 12);
    expect(row('mean_shear_right_Pa')).toBe(measures.walls.right.shear.meanAbs_Pa);
    expect(row('rms_shear_left_Pa')).toBe(measures.walls.left.shear.rms_Pa);
    expect(row('p95_shear_right_Pa')).toBe(measures.walls.right.shear.percentiles_Pa.p95);
    expect(row('share_above_left')).toBe(measures.walls.left.shear.shareAbove);
    expect(row('holdup')).toBe(measures.loop.holdup);
    expect(row('upflow_m_s')).toBe(measures.loop.upflow_m_s);
    expect(answers).toHaveLength(13);
  });

  it('are refused where the file is missing, cut short or without a measure', async () => {
    const folder = join(root, 'broken');
    mkdirSync(folder);
    await expect(readRefined(folder)).rejects.toThrow(/summary\.json: there is no such file/);
    writeFileSync(join(folder, 'summary.json'), '{"walls": {');
    await expect(readRefined(folder)).rejects.toThrow(/summary\.json: this is no JSON/);
    writeFileSync(join(folder, 'summary.json'), '{"answers": {"swept_left": {"value": "much"}}}');
    await expect(readRefined(folder)).rejects.toThrow(/answers\.swept_left\.value is not as this version writes it/);
    writeFileSync(join(folder, 'summary.json'), '{"answers": {}, "recorded": {"samples": 800, "every_s": 0.002}}');
    await expect(readRefined(folder)).rejects.toThrow(/the run has no answer swept_left/);
  });
});

describe('the folder of a refinement', () => {
  const found = refinement([gridRun(20, 1.0325), gridRun(30, 1.01), gridRun(45, 1)], 0.05);

  it('holds the same numbers as table and as JSON', async () => {
    const folder = join(root, 'made');
    await openRefinement(folder, 'title: A\n', false);
    await writeRefinement(folder, found);
    const rows = csvParse(readFileSync(join(folder, 'refine.csv'), 'utf8'));
    const { measures, grids } = JSON.parse(readFileSync(join(folder, 'refine.json'), 'utf8'));
    expect(grids.map((grid: { across: number }) => grid.across)).toEqual([20, 30, 45]);
    expect(rows).toHaveLength(measures.length);
    rows.forEach((row, i) => {
      expect([row.measure, row.verdict, row.says]).toEqual([measures[i].measure, measures[i].verdict, measures[i].says]);
      for (const key of ['coarse', 'middle', 'fine', 'order', 'extrapolated', 'change', 'index', 'error'])
        expect(Number(row[key])).toBeCloseTo(measures[i][key], 5);
    });
    expect(Number(rows[0].order)).toBeCloseTo(2, 6);
  });

  it('is opened again for the same case with its runs kept and its old results gone', async () => {
    const folder = join(root, 'again');
    await openRefinement(folder, 'title: A\n', false);
    await writeRefinement(folder, found);
    mkdirSync(join(folder, 'across-20'));
    writeFileSync(join(folder, 'refine.csv.123'), 'half');
    await openRefinement(folder, 'title: A\n', false);
    expect(readdirSync(folder).sort()).toEqual(['across-20', 'case.yaml']);
  });

  it('is kept as it is for another case, and taken with its runs removed when told so', async () => {
    const folder = join(root, 'other');
    await openRefinement(folder, 'title: A\n', false);
    await writeRefinement(folder, found);
    mkdirSync(join(folder, 'across-20'));
    await expect(openRefinement(folder, 'title: B\n', false)).rejects.toThrow(/a refinement of another case; it was kept.*--again/);
    expect(readdirSync(folder).sort()).toEqual(['across-20', 'case.yaml', 'refine.csv', 'refine.json']);
    await openRefinement(folder, 'title: B\n', true);
    expect(readdirSync(folder)).toEqual(['case.yaml']);
    expect(readFileSync(join(folder, 'case.yaml'), 'utf8')).toBe('title: B\n');
  });

  it('is refused where other files lie in it', async () => {
    const folder = join(root, 'foreign');
    mkdirSync(folder);
    writeFileSync(join(folder, 'letter.txt'), 'keep me');
    await expect(openRefinement(folder, 'title: A\n', true)).rejects.toThrow(/letter\.txt/);
    expect(readdirSync(folder)).toEqual(['letter.txt']);
  });
});
