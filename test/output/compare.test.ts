import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { csvParse } from 'd3-dsv';
import { PNG } from 'pngjs';
import { afterAll, describe, expect, test } from 'vitest';
import { comparison } from '../../output/compare/comparison.ts';
import { type FinishedRun, type Group, grouped, groupName } from '../../output/compare/run.ts';
import { openComparison, writeComparison } from '../../output/index.ts';
import { makeRecording } from './recordings.ts';

const folder = mkdtempSync(join(tmpdir(), 'swathe-compare-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** A finished run that was never computed. */
function run(title: string, seed: number, swept: number, power_W_m2 = 2, recorded_s = 2): FinishedRun {
  const { case: panel } = makeRecording();
  const answer = (name: string, value: number, half: number | null) =>
    [name, { name, value, low: half === null ? null : value - half, high: half === null ? null : value + half }] as const;
  return {
    folder: `runs/${title}-seed-${seed}`,
    panel: { ...panel, title, gas: { ...panel.gas, seed } },
    version: '1',
    answers: new Map([
      answer('swept_together', swept, 0.01),
      answer('mean_shear_together_Pa', swept / 2, 0.01),
      answer('air_power_W_m2', power_W_m2, 0),
    ]),
    recorded_s,
    taken_s: 60,
    curve: [0.1, 0.2, 0.5, 1].map((threshold_Pa) => ({ threshold_Pa, swept: Math.min(1, (0.5 * swept) / threshold_Pa) })),
  };
}

function group(name: string, values: number[], power_W_m2 = 2): Group {
  return { name, runs: values.map((value, i) => run(name, i + 1, value, power_W_m2)) };
}

const three = [
  group('poor', [0.5, 0.52, 0.49, 0.51]),
  group('good', [0.8, 0.83, 0.79, 0.82], 3),
  group('good too', [0.79, 0.84, 0.8, 0.8]),
];

describe('a comparison', () => {
  test('ranks by the mean, and holds each against each, the best first', () => {
    const { ranking, pairs } = comparison(three, 'swept_together');
    expect(ranking.map(({ name }) => name)).toEqual(['good', 'good too', 'poor']);
    expect(ranking[0].asked?.value).toBeCloseTo(0.81, 12);
    expect(pairs.map(({ first, second, verdict }) => [first, second, verdict.state])).toEqual([
      ['good', 'good too', "can't tell"],
      ['good', 'poor', 'better'],
      ['good too', 'poor', 'better'],
    ]);
    expect(pairs[1].difference).toMatchObject({ paired: true, runs: [4, 4] });
    expect(ranking[0].curve[2]).toEqual({ threshold_Pa: 0.5, swept: (0.8 + 0.83 + 0.79 + 0.82) / 4 });
  });

  test('by what the air costs puts the least first', () => {
    const { ranking, larger } = comparison(three, 'air_power_W_m2');
    expect([larger, ranking.at(-1)?.name]).toEqual([false, 'good']);
  });

  test('says what is not on equal terms, and what chance does not explain', () => {
    expect(comparison(three.slice(1), 'swept_together').notes.join(' ')).toContain('The air costs differ');
    const other = group('other', [0.7, 0.7, 0.71, 0.72]);
    const strict = {
      ...other,
      runs: other.runs.map((one) => ({ ...one, panel: { ...one.panel, swept: { above_Pa: 1, within_s: 0.05 } } })),
    };
    const { notes } = comparison([strict, group('wild', [0.2, 0.9, 0.5, 0.6])], 'swept_together');
    expect(notes.join(' ')).toMatch(/^Not on equal terms.*wild: its runs differ by more than their own intervals explain/);
  });

  test('puts a geometry last whose measure is not to be had, with a word', () => {
    const blind = group('blind', [0.9, 0.9]);
    for (const { answers } of blind.runs)
      (answers as Map<string, object>).set('swept_together', { name: 'swept_together', value: null, low: null, high: null });
    const { ranking, pairs, notes } = comparison([blind, ...three.slice(0, 2)], 'swept_together');
    expect(ranking.map(({ name }) => name)).toEqual(['good', 'poor', 'blind']);
    expect(pairs.length).toBe(1);
    expect(notes.join(' ')).toContain('blind: swept_together is not to be had from its runs');
  });

  test('refuses runs without the measure', () => {
    expect(() => comparison(three, 'p95_shear_left_Pa')).toThrow('has no answer p95_shear_left_Pa');
  });
});

describe('runs', () => {
  test('that differ in nothing but the seed are one geometry', () => {
    const named = [run('a', 1, 0.5), run('b', 1, 0.6), run('a', 2, 0.5)].map((one) => ({ name: groupName(one.folder), run: one }));
    expect(grouped(named).map(({ name, runs }) => [name, runs.length])).toEqual([
      ['a', 2],
      ['b', 1],
    ]);
    expect(() => grouped([...named, { name: 'a', run: { ...run('a', 2, 0.5), folder: 'copy' } }])).toThrow(
      'runs/a-seed-2 and copy hold the same run (a, seed 2), which counts once. Leave one of them out.',
    );
  });

  test.each([
    ['runs/tilted-panel', 'tilted-panel'],
    ['runs/tilted-panel-seed-12', 'tilted-panel'],
    ['deep/supply-0.2-s3', 'supply-0.2'],
    ['runs/seed-4', 'seed-4'],
  ])('in %s belong to %s', (path, name) => expect(groupName(path)).toBe(name));
});

describe('the folder of a comparison', () => {
  const path = join(folder, 'comparison');

  test('holds tables, pictures and JSON, which say the same', async () => {
    await openComparison(path);
    await writeComparison(path, comparison(three, 'swept_together'));
    expect(readdirSync(path).sort()).toEqual([
      'compare.json',
      'differences.csv',
      'measures.csv',
      'power.png',
      'ranking.csv',
      'thresholds.png',
    ]);
    const ranking = csvParse(readFileSync(join(path, 'ranking.csv'), 'utf8'));
    expect(ranking.map(({ rank, geometry, runs, seeds, value }) => [rank, geometry, runs, seeds, Number(value)])).toEqual([
      ['1', 'good', '4', '1 2 3 4', 0.81],
      ['2', 'good too', '4', '1 2 3 4', 0.8075],
      ['3', 'poor', '4', '1 2 3 4', 0.505],
    ]);
    const report = JSON.parse(readFileSync(join(path, 'compare.json'), 'utf8')) as {
      differences: { value: number; verdict: string; more_s: number }[];
    };
    const differences = csvParse(readFileSync(join(path, 'differences.csv'), 'utf8'));
    expect(differences.map((row) => [Number(row.difference), row.verdict, Number(row.more_s)])).toEqual(
      report.differences.map(({ value, verdict, more_s }) => [Number(value.toPrecision(7)), verdict, Number((more_s ?? 0).toPrecision(7))]),
    );
    const measures = csvParse(readFileSync(join(path, 'measures.csv'), 'utf8'));
    expect(measures.filter(({ geometry }) => geometry === 'poor').map(({ measure }) => measure)).toEqual([
      'swept_together',
      'mean_shear_together_Pa',
      'air_power_W_m2',
    ]);
  });

  test('has a picture with a bar as high as each interval, at its power', async () => {
    const { data, width, height } = PNG.sync.read(readFileSync(join(path, 'power.png')));
    // the darkest colour is that of the best: count the rows its bar covers beside the legend
    const rows = new Set<number>();
    const columns = new Set<number>();
    for (let y = 70; y < height - 70; y++) {
      for (let x = 90; x < 640; x++) {
        const i = 4 * (y * width + x);
        if (data[i] === 68 && data[i + 1] === 1 && data[i + 2] === 84) {
          rows.add(y);
          columns.add(x);
        }
      }
    }
    const [{ low, high }] = csvParse(readFileSync(join(path, 'ranking.csv'), 'utf8'));
    const all = csvParse(readFileSync(join(path, 'ranking.csv'), 'utf8')).flatMap((row) => [Number(row.low), Number(row.high)]);
    const span = Math.max(...all) - Math.min(...all);
    // the axis leaves 12 % on either side; seen 53 of 53 rows, the caps are two pixels thick
    const expected = (419 * (Number(high) - Number(low))) / (1.24 * span);
    expect(Math.abs(rows.size - expected)).toBeLessThanOrEqual(3);
    // at 3 of 3.6 W/m2
    expect(Math.abs((Math.min(...columns) + Math.max(...columns)) / 2 - (84 + (559 * 3) / 3.6))).toBeLessThanOrEqual(2);
  });

  test('takes the place of an earlier one, never of other files', async () => {
    await openComparison(path);
    expect(readdirSync(path)).toEqual([]);
    const own = join(folder, 'own');
    await openComparison(own);
    writeFileSync(join(own, 'thesis.txt'), 'years of work');
    await expect(openComparison(own)).rejects.toThrow('holds other files (such as thesis.txt) and no comparison');
    expect(existsSync(join(own, 'thesis.txt'))).toBe(true);
  });
});
