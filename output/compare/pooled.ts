import type { Range } from '../measures/estimate.ts';
import { student95 } from '../measures/student.ts';

/** A measure of one run; low and high: ends of the run's own 95 % interval, null where it could not be told. */
export interface RunValue {
  seed: number;
  value: number;
  low: number | null;
  high: number | null;
}

/** Where an interval comes from: the spread between runs, or what each run says of itself. */
type Basis = 'runs' | 'recording';

/** A value with its 95 % interval; null: cannot be told. */
export interface Sure {
  value: number;
  low: number | null;
  high: number | null;
  basis: Basis;
}

/** Runs from which on their spread says more than their own intervals: Student's t of one degree of freedom, 12.7, drowns everything. */
const ENOUGH_RUNS = 3;

/** Variance of a mean and the degrees of freedom it was estimated with. */
interface Scatter {
  variance: number;
  freedom: number;
}

/**
 * The mean of independent runs of one case. Three runs and more: mean +- t s / sqrt(k), k - 1 degrees of freedom, from the spread s between
 * them, which holds the chance within a run already and needs no word on how samples hang together (independent replications: Law 2015,
 * Simulation Modeling and Analysis, chapter 9 [M]). Fewer: from the runs' own intervals. All runs count alike.
 */
export function pooled(runs: readonly RunValue[], { least, most }: Range): Sure {
  const value = mean(runs.map((run) => run.value));
  if (runs.length < ENOUGH_RUNS) {
    const [below, above] = [ownFar(runs, 'low'), ownFar(runs, 'high')];
    const told = Number.isFinite(below) && Number.isFinite(above);
    return { value, low: told ? value - below : null, high: told ? value + above : null, basis: 'recording' };
  }
  const { variance, freedom } = spread(runs.map((run) => run.value));
  const half = student95(freedom) * Math.sqrt(variance);
  return { value, low: Math.max(least, value - half), high: Math.min(most, value + half), basis: 'runs' };
}

/** How far the lower or upper end of the mean of few runs lies from it, by their own intervals; not a number where one has none. */
function ownFar(runs: readonly RunValue[], end: 'low' | 'high'): number {
  return Math.hypot(...runs.map((run) => (run[end] ?? Number.NaN) - run.value)) / runs.length;
}

/** The difference of two geometries. */
export interface Difference extends Sure {
  /** paired: the same seeds in both, so each pair saw the same bubbles let in */
  paired: boolean;
  /** runs of each, or pairs */
  runs: readonly [number, number];
}

/**
 * The measure of `first` less that of `second` with a 95 % interval.
 * - The same seeds on both sides, three at least: mean +- t of the differences of the pairs, whatever the runs of a pair have in common.
 * - Else, three runs at least on both sides: Welch 1947, Biometrika 34, 28 [M], with the degrees of freedom of Satterthwaite 1946 [M].
 * - Else from the runs' own intervals: the distances to their ends add up in squares (Zou & Donner 2008, Stat. Med. 27, 1693 [M]).
 *
 * The choice looks at seeds and numbers only, never at values, for that would spoil the coverage.
 */
export function difference(first: readonly RunValue[], second: readonly RunValue[]): Difference {
  const centres = [mean(first.map((run) => run.value)), mean(second.map((run) => run.value))] as const;
  const value = centres[0] - centres[1];
  const runs = [first.length, second.length] as const;
  if (Math.min(...runs) < ENOUGH_RUNS) {
    const below = Math.hypot(ownFar(first, 'low'), ownFar(second, 'high'));
    const above = Math.hypot(ownFar(first, 'high'), ownFar(second, 'low'));
    const told = Number.isFinite(below) && Number.isFinite(above);
    return { value, low: told ? value - below : null, high: told ? value + above : null, basis: 'recording', paired: false, runs };
  }
  const pairs = pairsOf(first, second);
  const paired = pairs !== undefined;
  const { variance, freedom } = paired ? spread(pairs) : together(first, second);
  const half = studentAt(freedom) * Math.sqrt(variance);
  return { value, low: value - half, high: value + half, basis: 'runs', paired, runs };
}

/** Differences of the runs with equal seeds; undefined where one of the runs has no partner. */
function pairsOf(first: readonly RunValue[], second: readonly RunValue[]): number[] | undefined {
  if (first.length !== second.length) return undefined;
  const partner = new Map(second.map(({ seed, value }) => [seed, value]));
  const found = first.map(({ seed, value }) => value - (partner.get(seed) ?? Number.NaN));
  return found.every(Number.isFinite) ? found : undefined;
}

function together(first: readonly RunValue[], second: readonly RunValue[]): Scatter {
  const one = spread(first.map(({ value }) => value));
  const other = spread(second.map(({ value }) => value));
  const variance = one.variance + other.variance;
  const weight = one.variance ** 2 / one.freedom + other.variance ** 2 / other.freedom;
  return { variance, freedom: weight > 0 ? variance ** 2 / weight : one.freedom + other.freedom };
}

/** Of the mean of independent values. */
function spread(values: readonly number[]): Scatter {
  const centre = mean(values);
  const freedom = values.length - 1;
  return { variance: values.reduce((sum, value) => sum + (value - centre) ** 2, 0) / freedom / values.length, freedom };
}

/** Student's t between whole degrees of freedom: linear in 1 / freedom, within 0.3 % from two on. */
export function studentAt(freedom: number): number {
  const below = Math.floor(freedom);
  if (below === freedom) return student95(below);
  const share = (1 / below - 1 / freedom) / (1 / below - 1 / (below + 1));
  return student95(below) + share * (student95(below + 1) - student95(below));
}

function mean(values: readonly number[]): number {
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}
