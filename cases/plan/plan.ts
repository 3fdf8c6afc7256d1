import type { Case } from '../case.ts';
import { caseFrom } from '../read.ts';
import type { CaseTree, Path } from '../text.ts';
import type { Measure } from '../units.ts';
import { tabled } from './keys.ts';
import { override } from './override.ts';
import { type CaseValue, shortText, tabledValue } from './values.ts';

/** A key that the points of a plan differ in. */
export interface PlanKey {
  /** as in a case file: channel.gap */
  key: string;
  /** name of its column: ends in its SI unit, angles in deg */
  column: string;
  path: Path;
  measure: Measure | undefined;
}

/** One case of a plan. */
export interface Point {
  /** from 1, in the order of the plan */
  number: number;
  /** one per key */
  values: readonly CaseValue[];
  seed: number;
}

/** Many cases from one. */
export interface Plan {
  title: string;
  /** the case they start from, with everything in it that no point changes */
  baseText: string;
  keys: readonly PlanKey[];
  points: readonly Point[];
  /** points that a comparison left out */
  leftOut: number;
  /** where the values of the base stand, and the values */
  base: { tree: CaseTree; entries: unknown };
}

const SEED_PATH: Path = ['gas', 'seed'];

/** What `--set` changes the base case into this point with. */
export function pointSets({ keys }: Pick<Plan, 'keys'>, { values, seed }: Point): string[] {
  return [...keys.map(({ key }, i) => `${key}=${shortText(values[i])}`), `gas.seed=${seed}`];
}

/** The entries of a point, as plain maps, lists and texts. */
export function pointEntries({ keys, base }: Pick<Plan, 'keys' | 'base'>, { values, seed }: Point): unknown {
  const changed = keys.reduce<unknown>((entries, { path }, i) => override(entries, path, values[i]), base.entries);
  return override(changed, SEED_PATH, String(seed));
}

/**
 * The case of a point.
 * @throws CaseError the values of this point contradict one another
 */
export function pointCase(plan: Plan, point: Point): Case {
  return caseFrom(pointEntries(plan, point), plan.base.tree);
}

/** The varied values of a point as a table holds them, in the order of the keys: numbers in the unit of the column, else text. */
export function pointCells({ keys }: Pick<Plan, 'keys'>, { values }: Point): (number | string)[] {
  return keys.map(({ measure }, i) => tabledValue(values[i], measure, measure === undefined ? 1 : tabled(measure).one));
}
