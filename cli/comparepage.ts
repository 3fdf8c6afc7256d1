import { type Comparison, type Pair, rangeOf } from '../output/index.ts';
import { count, duration, percent, plain } from './numbers.ts';
import { table } from './summary.ts';
import { CAUTION } from './warnings.ts';

/** Pairs told on the screen; all stand in the tables. */
const MOST_PAIRS = 12;

/** A difference that may be so many times what was seen takes too long to find out. */
const HOPELESS = 5;

/** A comparison on a page: the ranking, what the differences are and which of them are more than chance. */
export function comparePage(found: Comparison, path: string): string {
  const { by, larger, swept, ranking, pairs, notes } = found;
  const show = shower(by);
  const rows = ranking.map(({ name, seeds, recorded_s, taken_s, asked, airPower_W_m2, measures }, i) => [
    `${i + 1} ${name}`,
    `${seeds.length}`,
    `${plain(recorded_s * seeds.length)} s`,
    show(asked?.value ?? null),
    asked === undefined || asked.low === null ? '-' : `${show(asked.low)} to ${show(asked.high)}`,
    `${plain(measures.get('mean_shear_together_Pa')?.value)} Pa`,
    `${plain(airPower_W_m2)} W/m2`,
    percent(measures.get('swept_per_power_together_m2_W')?.value),
    duration(taken_s),
  ]);
  const heads = ['geometry', 'runs', 'recorded', by, '95 % interval', 'mean shear', 'air', 'swept per W/m2', 'computed in'];
  const told = pairs.slice(0, MOST_PAIRS);
  return [
    `ranked by ${by}, ${larger ? 'the largest' : 'the smallest'} first`,
    `swept: share of the wall above ${plain(swept.above_Pa)} Pa at least once within ${plain(swept.within_s)} s`,
    table([heads, ...rows]),
    ...told.map((pair) => pairLine(pair, found)),
    ...(pairs.length > told.length ? [`${pairs.length - told.length} more pairs are in differences.csv`] : []),
    ...notes.map((note) => `note: ${note}`),
    `files: ${path}`,
    CAUTION,
  ].join('\n');
}

function pairLine({ first, second, difference, verdict }: Pair, { by }: Comparison): string {
  const { value, low, high, basis, paired, runs } = difference;
  const show = shower(by);
  const points = rangeOf(by).most === 1 ? ' points' : '';
  const end = (share: number | null): string => show(share).replace(/ %$/, '');
  const interval = low === null ? 'no interval' : `95 %: ${end(low)} to ${end(high)}${points}`;
  const farthest = Math.max(-(low ?? 0), high ?? 0);
  const from =
    basis === 'recording' ? "from the runs' own intervals" : paired ? `${runs[0]} pairs of equal seeds` : `${runs[0]} and ${runs[1]} runs`;
  return `${first} less ${second}: ${end(value)}${points} (${interval}; ${from}): ${words(first, verdict, farthest > HOPELESS * Math.abs(value), `${end(farthest)}${points}`)}`;
}

function words(first: string, { state, more_s, moreRuns }: Pair['verdict'], hopeless: boolean, farthest: string): string {
  switch (state) {
    case 'better':
    case 'worse':
      return `${first} is ${state}`;
    case 'alike':
      return 'the same in every run; nothing to choose between them by this measure';
    case 'missing':
      return 'no interval, so nothing can be said; record longer or run three seeds or more';
    case "can't tell": {
      if (more_s === null) return `can't tell: no difference was seen, and it is hardly more than ${farthest}`;
      const longer = `record about ${rough(more_s)} s more in each run`;
      if (hopeless) return `can't tell: they may well be alike, the difference is hardly more than ${farthest}. To know, ${longer}`;
      const instead = moreRuns === null ? '' : `, or take ${moreRuns} seeds`;
      return `can't tell yet: ${longer}${instead}; that is if the difference stays what it is`;
    }
  }
}

/** How a value of the measure is written: shares in percent. */
function shower(by: string): (value: number | null) => string {
  return rangeOf(by).most === 1 ? percent : plain;
}

function rough(seconds: number): string {
  return seconds < 100 ? plain(seconds, 2) : count(Number(seconds.toPrecision(2)));
}
