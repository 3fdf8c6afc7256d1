/** Plan text to Plan: parse, hold against the table, try every value in the base case, lay the points, leave out what is not wanted. */
import { CaseError } from '../../solver/index.ts';
import { findings, type PlacedFinding, placed } from '../faults.ts';
import { readCase } from '../read.ts';
import { caseTable, readEntries } from '../schema.ts';
import { caseText, type Path, parseTree, plain } from '../text.ts';
import { measureAt, pathOf, tabled } from './keys.ts';
import { override, valueAt } from './override.ts';
import { type Plan, type PlanKey, type Point, pointEntries } from './plan.ts';
import { layPoints } from './points.ts';
import { type PlanEntries, planSchema, planTable } from './schema.ts';
import { type CaseValue, shortText } from './values.ts';
import { comparison, NoValue } from './where.ts';

/**
 * Reads the text of a plan file.
 * @param file name shown in messages
 * @param readBase finds the text of the base case
 * @throws CaseError that carries the faults found, of the plan or of its base
 */
export async function readPlan(text: string, file: string, readBase: (word: string) => { text: string; file: string }): Promise<Plan> {
  const tree = parseTree(text, file, []);
  const entries = plain(tree.document.contents);
  const refuse = (found: readonly PlacedFinding[]): void => {
    if (found.length > 0) throw new CaseError(found.map((finding) => placed(tree, entries, finding)));
  };
  const read = planTable.safeParse(entries);
  if (!read.success) refuse(findings(read.error.issues, entries, planSchema));
  const asked = read.data as PlanEntries;
  refuse(asked.vary.length === 0 ? [{ path: ['vary'], problem: 'is empty', allowed: '1 entry or more' }] : keyFindings(asked));

  const source = readBase(asked.base);
  const original = plain(parseTree(source.text, source.file, []).document.contents);
  const fixed = Object.entries(asked.set as Record<string, CaseValue>);
  refuse(fixed.flatMap(([key, value]) => valueFindings(original, pathOf(key), value, ['set', key])));
  const sets = fixed.map(([key, value]) => `${key}=${shortText(value)}`);
  const { gas } = readCase(source.text, source.file, sets);
  const baseText = caseText(source.text, sets);
  const baseTree = parseTree(baseText, source.file, []);
  const base = { tree: baseTree, entries: plain(baseTree.document.contents) };

  const laid = layPoints(asked);
  if (Array.isArray(laid)) refuse(laid);
  const { perKey, points } = laid as Exclude<typeof laid, PlacedFinding[]>;
  const keys = asked.vary.map(({ key }) => planKey(key));
  refuse(perKey.flatMap((values, i) => valuesFindings(base.entries, asked, keys[i], values, i)));

  const seeds = asked.seeds.length > 0 ? asked.seeds : [gas.seed];
  const all = points.flatMap((values) => seeds.map((seed) => ({ values, seed })));
  const kept = await chosen({ keys, base }, all, asked.where, refuse);
  if (kept.length === 0) refuse([{ path: ['where'], problem: `leaves out all ${all.length} points`, remedy: 'Loosen a comparison' }]);
  return {
    title: asked.title,
    baseText,
    keys,
    points: kept.map((point, i) => ({ number: i + 1, ...point })),
    leftOut: all.length - kept.length,
    base,
  };
}

function planKey(key: string): PlanKey {
  const path = pathOf(key);
  const measure = measureAt(path);
  const ending = measure === undefined ? '' : tabled(measure).ending;
  return { key, path, measure, column: [key.replaceAll(' ', '_'), ending].filter((part) => part !== '').join('_') };
}

/** The findings of all values of the i-th key, at the places in the plan that they come from. */
function valuesFindings(base: unknown, { vary }: PlanEntries, { path }: PlanKey, values: readonly CaseValue[], i: number): PlacedFinding[] {
  const { values: list, step, count } = vary[i];
  const end = (j: number): string | undefined => (j === 0 ? 'from' : j === values.length - 1 && step === undefined ? 'to' : undefined);
  const found = values.flatMap((value, j) => {
    if (list !== undefined) return valueFindings(base, path, value, ['vary', i, 'values', j]);
    const at = end(j) ?? (step !== undefined ? 'step' : count !== undefined ? 'count' : 'to');
    const findings = valueFindings(base, path, value, ['vary', i, at]);
    return end(j) !== undefined
      ? findings
      : findings.map((one) => ({ ...one, problem: `makes ${shortText(value)}, which ${one.problem}` }));
  });
  // a wrong key is found with every value, and what is wrong with an end needs no word on the values between
  const texts = found.map((one) => JSON.stringify(one));
  const once = found.filter((_, j) => texts.indexOf(texts[j]) === j);
  const atEnds = once.filter(({ problem }) => !problem.startsWith('makes '));
  return atEnds.length > 0 ? atEnds : once;
}

/** Keys that cannot be varied, or not together. */
function keyFindings({ vary, seeds }: PlanEntries): PlacedFinding[] {
  const keys = vary.map(({ key }) => key);
  const found = keys.flatMap((key, i): PlacedFinding[] => {
    const path = ['vary', i, 'key'];
    const other = keys.findIndex((other, j) => j < i && (`${key}.`.startsWith(`${other}.`) || `${other}.`.startsWith(`${key}.`)));
    if (other >= 0) return [{ path, problem: `is varied by entry ${other + 1} already`, remedy: 'Take one entry for it' }];
    if (key === 'gas.seed') return [{ path, problem: 'is varied by seeds', remedy: 'Write seeds: [1, 2, 3]' }];
    return [];
  });
  const twice = seeds.findIndex((seed, i) => seeds.indexOf(seed) < i);
  return twice < 0
    ? found
    : [...found, { path: ['seeds', twice], problem: 'stands there twice', remedy: 'The same seed gives the same run' }];
}

/** What the table of cases says of one value at one key; what it says of other keys is left for the points. */
function valueFindings(entries: unknown, path: Path, value: CaseValue, at: Path): PlacedFinding[] {
  const changed = override(entries, path, value);
  const key: Path = at[0] === 'vary' ? [at[0], at[1], 'key'] : at;
  if (changed === undefined) {
    return [{ path: key, problem: 'does not lead to a place in the base case', remedy: 'Check the key against the base case' }];
  }
  const read = caseTable.safeParse(changed);
  if (read.success) return [];
  const found = findings(read.error.issues, changed).filter((finding) => meets(finding.path, path));
  return found.map(({ path: where, atKey, ...rest }) => {
    const unknown = atKey === true && where.length <= path.length;
    return { ...rest, path: unknown ? key : at, ...(unknown ? { atKey: at[0] === 'set' } : {}) };
  });
}

/** One path is the beginning of the other. */
function meets(a: Path, b: Path): boolean {
  return a.slice(0, b.length).every((part, i) => part === b[i]);
}

/** The points that meet every comparison. A point that is no sound case is kept: its error is reported when its turn comes. */
async function chosen(
  plan: Pick<Plan, 'keys' | 'base'>,
  all: readonly Omit<Point, 'number'>[],
  where: readonly string[],
  refuse: (found: readonly PlacedFinding[]) => void,
): Promise<Omit<Point, 'number'>[]> {
  if (where.length === 0) return [...all];
  const read = await Promise.all(where.map(comparison));
  refuse(read.flatMap((found, i) => ('holds' in found ? [] : [{ path: ['where', i], ...found }])));
  return all.filter((point) => {
    const entries = readEntries(pointEntries(plan, { number: 0, ...point }));
    if (!entries.success) return true;
    const lookup = (path: Path): number | undefined => {
      const value = valueAt(entries.data, path);
      return typeof value === 'number' ? value : undefined;
    };
    return read.every((test, i) => {
      try {
        return 'holds' in test && test.holds(lookup);
      } catch (error) {
        if (!(error instanceof NoValue)) throw error;
        refuse([{ path: ['where', i], problem: error.message, remedy: 'Give the key a value in the base case, or with set' }]);
        return false;
      }
    });
  });
}
