import type { Recording } from '../../cases/index.ts';
import { shareAbove } from './above.ts';
import { airEnergy, airPower, perPower } from './air.ts';
import { worstFlux, worstRadius } from './backtransport.ts';
import { settledCover } from './deposit.ts';
import { ANY, type Estimate, type Range, SHARE, SIZE } from './estimate.ts';
import { events } from './events.ts';
import { type Felt, PLACES, type Places } from './felt.ts';
import { meanInterval } from './interval.ts';
import { holdup, upflow } from './loop.ts';
import { meanShear, steadyShear } from './mean.ts';
import { percentiles } from './percentiles.ts';
import { reversal } from './reversal.ts';
import { rmsShear } from './rms.ts';
import { underGas } from './undergas.ts';
import type { WallMeasure } from './wallmeasure.ts';
import { sweptWithin, touchedWithin } from './windows.ts';

/** One headline measure of a recording. */
export interface Answer {
  /** ends in its SI unit; a share has none */
  name: string;
  value: number | null;
  /** ends of its 95 % interval (interval.ts); null: cannot be told from this recording */
  low: number | null;
  high: number | null;
}

/** Headline measures of walls, in the order of every list. */
const WALL_MEASURES: readonly WallMeasure[] = [
  sweptWithin,
  touchedWithin,
  meanShear,
  steadyShear,
  rmsShear,
  ...percentiles,
  shareAbove,
  events,
  reversal,
  underGas,
];

interface Headline {
  name: string;
  range: Range;
  estimate(recording: Recording, places: Places): Estimate;
}

/** Every headline measure by name: the one list that summaries, grids, comparisons and sweeps go by. */
const HEADLINES: readonly Headline[] = [
  ...WALL_MEASURES.flatMap(({ stem, unit, range, estimate }) =>
    PLACES.map((place) => ({
      name: [stem, place, unit].filter((part) => part !== '').join('_'),
      range,
      estimate: ({ case: { swept } }: Recording, places: Places) => estimate(places[place], swept),
    })),
  ),
  { name: 'holdup', range: SHARE, estimate: holdup },
  { name: 'upflow_m_s', range: ANY, estimate: upflow },
  { name: 'air_power_W_m2', range: SIZE, estimate: airPower },
  { name: 'air_energy_J_m3', range: SIZE, estimate: airEnergy },
  ...[sweptWithin, meanShear].flatMap(({ stem, unit, estimate }) =>
    PLACES.map((place) => ({
      name: [stem, 'per_power', place, unit, 'm2_W'].filter((part) => part !== '').join('_'),
      range: SIZE,
      estimate: (recording: Recording, places: Places) => perPower(estimate(places[place], recording.case.swept), recording),
    })),
  ),
  ...ofPlaces('worst_backtransport', '_m_s', SIZE, worstFlux),
  ...ofPlaces('worst_backtransport_radius', '_m', SIZE, worstRadius),
  ...ofPlaces('settled_cover', '', SHARE, settledCover),
];

/** A measure of walls that needs more of the case than a threshold. */
function ofPlaces(stem: string, unit: string, range: Range, of: (recording: Recording, walls: readonly Felt[]) => Estimate): Headline[] {
  return PLACES.map((place) => ({
    name: `${stem}_${place}${unit}`,
    range,
    estimate: (recording, places) => of(recording, places[place]),
  }));
}

/** Names of all answers, in the order of every list. */
export const ANSWERS: readonly string[] = HEADLINES.map(({ name }) => name);

/** Answers of which less is better; which way the others go is the reader's to say, more is taken for better. */
export const LOWER_IS_BETTER: readonly string[] = ['air_power_W_m2', 'air_energy_J_m3', ...PLACES.map((place) => `settled_cover_${place}`)];

/** Values that an answer can have. */
export function rangeOf(name: string): Range {
  return headlineOf(name).range;
}

function headlineOf(name: string): Headline {
  const headline = HEADLINES.find((one) => one.name === name);
  if (headline === undefined) throw new Error(`no answer is called ${name}`);
  return headline;
}

/** One answer of a recording, for less than the price of all. */
export function answerOf(recording: Recording, places: Places, name: string): Answer {
  return { name, ...sure(headlineOf(name).estimate(recording, places)) };
}

/** All answers of a recording, in the order of {@link HEADLINES}. */
export function answersOf(recording: Recording, places: Places): Answer[] {
  return HEADLINES.map(({ name, estimate }) => ({ name, ...sure(estimate(recording, places)) }));
}

function sure({ value, series, range, at, exact }: Estimate): Omit<Answer, 'name'> {
  if (exact) return { value, low: value, high: value };
  const ends = value === null ? undefined : meanInterval(series, range);
  return ends === undefined ? { value, low: null, high: null } : { value, low: at(ends[0]), high: at(ends[1]) };
}
