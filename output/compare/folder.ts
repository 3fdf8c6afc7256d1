import { join, resolve } from 'node:path';
import { OutputError } from '../../solver/index.ts';
import { list, makeFolder, remove, writeWhole } from '../folder/files.ts';
import { type Cell, csv } from '../tables/table.ts';
import type { Comparison, Pair, Ranked } from './comparison.ts';
import { drawPower } from './power.ts';
import { drawThresholds } from './thresholds.ts';

const FILES = ['compare.json', 'ranking.csv', 'differences.csv', 'measures.csv', 'power.png', 'thresholds.png'];
/** An own file, or what a write of it that was cut off leaves. */
const OWN_FILE = new RegExp(`^(${FILES.join('|').replaceAll('.', '\\.')})(\\.\\d+)?$`);

/**
 * Makes ready the folder of a comparison: a new one, an empty one, or one of an earlier comparison, whose files are written anew.
 * @throws OutputError other files in it, not writable
 */
export async function openComparison(path: string): Promise<void> {
  const full = resolve(path);
  const names = (await list(full)) ?? [];
  const foreign = names.find((name) => !OWN_FILE.test(name));
  if (foreign !== undefined) {
    const why = `the folder holds other files (such as ${foreign}) and no comparison; choose a new or an empty folder with --out`;
    throw new OutputError(full, `${full}: ${why}.`);
  }
  await makeFolder(full);
  await remove(full, names);
}

/** Writes tables, pictures and JSON of a comparison. Each file is whole or absent. */
export async function writeComparison(path: string, found: Comparison): Promise<void> {
  await writeWhole(join(path, 'ranking.csv'), rankingTable(found));
  await writeWhole(join(path, 'differences.csv'), differenceTable(found));
  await writeWhole(join(path, 'measures.csv'), measureTable(found));
  await writeWhole(join(path, 'power.png'), drawPower(found));
  await writeWhole(join(path, 'thresholds.png'), drawThresholds(found));
  await writeWhole(join(path, 'compare.json'), `${JSON.stringify(report(found), null, 2)}\n`);
}

/** One row per geometry, the best first. The names of measures carry their units; empty cells: not to be had. */
function rankingTable({ by, ranking }: Comparison): string {
  const header = [
    'rank',
    'geometry',
    'title',
    'runs',
    'seeds',
    'recorded_s',
    'taken_s',
    'air_power_W_m2',
    'measure',
    'value',
    'low',
    'high',
  ];
  const rows = ranking.map(({ name, title, seeds, recorded_s, taken_s, airPower_W_m2, asked }, i): Cell[] => [
    i + 1,
    name,
    title,
    seeds.length,
    seeds.join(' '),
    recorded_s * seeds.length,
    taken_s,
    airPower_W_m2,
    by,
    asked?.value ?? null,
    asked?.low ?? null,
    asked?.high ?? null,
  ]);
  return csv(header, rows);
}

/** One row per pair; the difference is that of the first less the second. */
function differenceTable({ by, pairs }: Comparison): string {
  const header = ['first', 'second', 'measure', 'difference', 'low', 'high', 'estimator', 'verdict', 'more_s', 'more_runs'];
  const rows = pairs.map(({ first, second, difference, verdict }): Cell[] => [
    first,
    second,
    by,
    difference.value,
    difference.low,
    difference.high,
    estimator(difference),
    verdict.state,
    verdict.more_s,
    verdict.moreRuns,
  ]);
  return csv(header, rows);
}

/** One row per geometry and measure. */
function measureTable({ ranking }: Comparison): string {
  const rows = ranking.flatMap(({ name, measures }) =>
    [...measures].map(([measure, { value, low, high, basis }]): Cell[] => [name, measure, value, low, high, basis]),
  );
  return csv(['geometry', 'measure', 'value', 'low', 'high', 'basis'], rows);
}

function report({ by, larger, swept, ranking, pairs, notes }: Comparison): object {
  return {
    by,
    better: larger ? 'larger' : 'smaller',
    swept,
    method:
      '95 % intervals; three runs or more: Student t on the spread between runs, paired by seed where seeds agree, else Welch 1947; fewer: own intervals',
    ranking: ranking.map(rankReport),
    differences: pairs.map(pairReport),
    notes,
  };
}

function rankReport({ name, title, folders, seeds, recorded_s, taken_s, asked, measures, airPower_W_m2, curve }: Ranked): object {
  return {
    geometry: name,
    title,
    runs: folders,
    seeds,
    recorded_s: recorded_s * seeds.length,
    taken_s,
    airPower_W_m2,
    value: asked?.value ?? null,
    low: asked?.low ?? null,
    high: asked?.high ?? null,
    measures: Object.fromEntries([...measures].map(([measure, { value, low, high, basis }]) => [measure, { value, low, high, basis }])),
    sweptOverThreshold: { threshold_Pa: curve.map(({ threshold_Pa }) => threshold_Pa), swept: curve.map((point) => point.swept) },
  };
}

function pairReport({ first, second, difference, verdict }: Pair): object {
  const { value, low, high } = difference;
  return {
    first,
    second,
    value,
    low,
    high,
    estimator: estimator(difference),
    verdict: verdict.state,
    more_s: verdict.more_s,
    moreRuns: verdict.moreRuns,
  };
}

function estimator({ basis, paired }: Pair['difference']): string {
  return basis === 'recording' ? 'own intervals' : paired ? 'paired by seed' : 'Welch';
}
