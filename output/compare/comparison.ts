import { OutputError } from '../../solver/index.ts';
import { LOWER_IS_BETTER, rangeOf } from '../measures/answers.ts';
import { type Difference, difference, pooled, type RunValue, type Sure } from './pooled.ts';
import { type Group, geometryKey } from './run.ts';
import { type Verdict, verdictOn } from './verdict.ts';

/** One geometry with all its measures. */
export interface Ranked {
  name: string;
  title: string;
  folders: string[];
  seeds: number[];
  /** by one run */
  recorded_s: number;
  /** wall-clock time of all its runs */
  taken_s: number;
  /** of the asked measure; undefined where a run has no value */
  asked: Sure | undefined;
  /** every measure by name, the asked one among them */
  measures: Map<string, Sure>;
  airPower_W_m2: number;
  /** mean over the runs: share swept against the threshold */
  curve: { threshold_Pa: number; swept: number }[];
}

/** Two geometries held against each other: `first` ranks higher. */
export interface Pair {
  first: string;
  second: string;
  difference: Difference;
  verdict: Verdict;
}

export interface Comparison {
  /** the measure asked for */
  by: string;
  larger: boolean;
  swept: { above_Pa: number; within_s: number };
  /** the best first */
  ranking: Ranked[];
  /** every pair, the best against all others first */
  pairs: Pair[];
  /** what a reader must know about these numbers */
  notes: string[];
}

/** Ranks geometries by a measure and holds each against each. */
export function comparison(groups: readonly Group[], by: string): Comparison {
  const larger = !LOWER_IS_BETTER.includes(by);
  const sign = larger ? -1 : 1;
  const sorted = groups
    .map((group) => ({ group, ranked: rank(group, by) }))
    .sort((a, b) => sign * ((a.ranked.asked?.value ?? sign * Infinity) - (b.ranked.asked?.value ?? sign * Infinity)) || 0);
  const pairs = sorted.flatMap((first, i) =>
    sorted.slice(i + 1).flatMap((second): Pair[] => {
      const values = [valuesOf(first.group, by), valuesOf(second.group, by)] as const;
      if (values[0] === undefined || values[1] === undefined) return [];
      const found = difference(values[0], values[1]);
      const recorded_s = Math.min(first.ranked.recorded_s, second.ranked.recorded_s);
      return [{ first: first.ranked.name, second: second.ranked.name, difference: found, verdict: verdictOn(found, recorded_s, larger) }];
    }),
  );
  const ranking = sorted.map(({ ranked }) => ranked);
  return { by, larger, swept: groups[0].runs[0].panel.swept, ranking, pairs, notes: notes(groups, ranking, by) };
}

function rank(group: Group, by: string): Ranked {
  const { runs, name } = group;
  const measures = new Map<string, Sure>();
  for (const answer of runs[0].answers.keys()) {
    const values = valuesOf(group, answer);
    if (values !== undefined) measures.set(answer, pooled(values, rangeOf(answer)));
  }
  const power = runs[0].answers.get('air_power_W_m2')?.value;
  if (!runs[0].answers.has(by) || typeof power !== 'number') {
    const missing = runs[0].answers.has(by) ? 'air_power_W_m2' : by;
    throw new OutputError(runs[0].folder, `${runs[0].folder}: the run has no answer ${missing}; run the case anew (--again).`);
  }
  return {
    name,
    title: runs[0].panel.title,
    folders: runs.map(({ folder }) => folder),
    seeds: runs.map(({ panel }) => panel.gas.seed),
    recorded_s: runs[0].recorded_s,
    taken_s: runs.reduce((sum, { taken_s }) => sum + taken_s, 0),
    asked: measures.get(by),
    measures,
    airPower_W_m2: power,
    curve: runs[0].curve.map(({ threshold_Pa }, i) => ({
      threshold_Pa,
      swept: runs.reduce((sum, { curve }) => sum + (curve[i]?.swept ?? Number.NaN), 0) / runs.length,
    })),
  };
}

/** Values of a measure, one per run; undefined where a run has none. */
function valuesOf({ runs }: Group, name: string): RunValue[] | undefined {
  const found = runs.flatMap(({ panel, answers }) => {
    const { value = null, low = null, high = null } = answers.get(name) ?? {};
    return value === null ? [] : [{ seed: panel.gas.seed, value, low, high }];
  });
  return found.length === runs.length ? found : undefined;
}

/** Times as much variance between runs as their own intervals explain that is no chance (F with 3 and 30 degrees of freedom, 1 %: 4.5). */
const SUSPICIOUS = 4.5;
/** Of a 95 % interval of a normal value, in standard deviations. */
const NORMAL_95 = 1.96;

function notes(groups: readonly Group[], ranking: readonly Ranked[], by: string): string[] {
  const found: string[] = [];
  const differ = (what: (group: Group) => unknown): boolean => new Set(groups.map((group) => JSON.stringify(what(group)))).size > 1;
  if (!differ(({ runs }) => geometryKey(runs[0].panel))) {
    found.push(
      'One geometry: its runs differ in the seed alone, so what tells them apart is chance. One in twenty pairs may seem surely different; ' +
        'more of them mean that the runs are too short or not settled.',
    );
  }
  if (differ(({ runs }) => runs[0].panel.swept)) {
    found.push('Not on equal terms: swept means another threshold or another time in some of the cases (swept.above, swept.within).');
  }
  if (differ(({ runs }) => runs[0].panel.grid.across / runs[0].panel.channel.gap_m) && !by.startsWith('air_')) {
    found.push('Cells differ in size: a part of the differences may be that of the grid. swathe refine says how large it is.');
  }
  if (differ(({ runs }) => runs[0].panel.channel.membranes)) found.push('Other walls carry a membrane in some of the cases.');
  if (new Set(groups.flatMap(({ runs }) => runs.map(({ version }) => version))).size > 1)
    found.push('The runs were computed by different versions of swathe.');
  if (differ(({ runs }) => runs[0].answers.get('air_power_W_m2')?.value)) {
    found.push('The air costs differ: look at the picture of the measure against the power, or rank by a measure per power.');
  }
  for (const { name, asked, seeds } of ranking) {
    if (asked === undefined) found.push(`${name}: ${by} is not to be had from its runs, so it comes last.`);
    else if (asked.low === null) {
      found.push(
        `${name}: ${seeds.length === 1 ? 'its run is' : 'its runs are'} too short for an interval. Record longer, or run three seeds or more.`,
      );
    }
  }
  for (const group of groups) {
    const values = valuesOf(group, by);
    if (values !== undefined && excess(values) > SUSPICIOUS) {
      found.push(
        `${group.name}: its runs differ by more than their own intervals explain, so these are too narrow; the figures here rest on the ` +
          'differences between runs. A longer record.settle or record.span helps.',
      );
    }
  }
  if (groups.length > 2) {
    found.push(
      `Each interval by itself holds the truth in 95 of 100 cases; of the ${(groups.length * (groups.length - 1)) / 2} differences one may well be off.`,
    );
  }
  return found;
}

/** Variance between runs over the mean variance that their own intervals tell; 0 where that is not known. */
function excess(runs: readonly RunValue[]): number {
  if (runs.length < 3) return 0;
  const own = runs.map(({ low, high }) => (low === null || high === null ? Number.NaN : ((high - low) / 2 / NORMAL_95) ** 2));
  const mean = runs.reduce((sum, { value }) => sum + value, 0) / runs.length;
  const between = runs.reduce((sum, { value }) => sum + (value - mean) ** 2, 0) / (runs.length - 1);
  const ratio = between / (own.reduce((sum, value) => sum + value, 0) / runs.length);
  return Number.isFinite(ratio) ? ratio : 0;
}
