/** The values of all points of a plan: crossed, paired or spread over the ranges. */
import type { PlacedFinding } from '../faults.ts';
import { MOST_POINTS, type PlanEntries } from './schema.ts';
import { spread } from './spread.ts';
import { between, type CaseValue, type Ends, endsOf, valuesOf, written } from './values.ts';

/** Values of each key, to be checked one by one, and of each point. */
export interface Laid {
  perKey: CaseValue[][];
  points: CaseValue[][];
}

export function layPoints(entries: PlanEntries): Laid | PlacedFinding[] {
  const laid = entries.combine === 'sampled' ? sampled(entries) : listed(entries);
  if (Array.isArray(laid)) return laid;
  const cases = laid.points.length * Math.max(1, entries.seeds.length);
  if (cases <= MOST_POINTS) return laid;
  return [
    {
      path: ['vary'],
      problem: `makes ${cases} cases`,
      allowed: `at most ${MOST_POINTS}`,
      remedy: 'Split the plan, or take combine: sampled',
    },
  ];
}

function listed({ vary, combine, samples }: PlanEntries): Laid | PlacedFinding[] {
  if (samples !== undefined) {
    return [
      { path: ['samples'], atKey: true, problem: 'belongs to sampled plans only', remedy: 'Write combine: sampled, or leave it out' },
    ];
  }
  const perKey: CaseValue[][] = [];
  const wrong: PlacedFinding[] = [];
  vary.forEach((entry, i) => {
    const values = valuesOf(entry, ['vary', i]);
    if (isFindings(values)) wrong.push(...values);
    else perKey.push(values);
  });
  if (wrong.length > 0) return wrong;
  const count = perKey.reduce((product, values) => product * values.length, 1);
  // counted before they are made
  if (combine === 'crossed') return { perKey, points: count > 100 * MOST_POINTS ? new Array<CaseValue[]>(count) : crossed(perKey) };
  const uneven = perKey.findIndex((values) => values.length !== perKey[0].length);
  if (uneven >= 0) {
    const problem = `has ${perKey[uneven].length} values, the first key ${perKey[0].length}`;
    return [{ path: ['vary', uneven], problem, remedy: 'Give paired keys the same number of values, or take combine: crossed' }];
  }
  return { perKey, points: perKey[0].map((_, i) => perKey.map((values) => values[i])) };
}

/** Every value with every other, the last key changing fastest. */
function crossed(perKey: CaseValue[][]): CaseValue[][] {
  return perKey.reduce<CaseValue[][]>((points, values) => points.flatMap((point) => values.map((value) => [...point, value])), [[]]);
}

function sampled({ vary, samples, shuffle }: PlanEntries): Laid | PlacedFinding[] {
  if (samples === undefined) return [{ path: ['samples'], problem: 'is missing', allowed: `a whole number, 2 to ${MOST_POINTS}` }];
  const wrong: PlacedFinding[] = [];
  const sources: (CaseValue[] | Ends)[] = [];
  vary.forEach((entry, i) => {
    const path = ['vary', i];
    const stray = entry.step !== undefined ? 'step' : entry.count !== undefined ? 'count' : undefined;
    const source = entry.values === undefined ? endsOf(entry, path) : valuesOf(entry, path);
    if (stray !== undefined && entry.values === undefined) {
      wrong.push({
        path: [...path, stray],
        atKey: true,
        problem: 'does not go with combine: sampled',
        allowed: 'from, to, spacing, or values',
      });
    } else if (Array.isArray(source) && isFindings(source)) wrong.push(...source);
    else sources.push(source as CaseValue[] | Ends);
  });
  if (wrong.length > 0) return wrong;
  const points = spread(samples, vary.length, shuffle).map((shares) => shares.map((share, k) => drawn(sources[k], share)));
  const perKey = sources.map((source, k) =>
    Array.isArray(source) ? source : [written(source.from, source.unit), written(source.to, source.unit), points[0][k]],
  );
  return { perKey, points };
}

function drawn(source: CaseValue[] | Ends, share: number): CaseValue {
  if (Array.isArray(source)) return source[Math.floor(share * source.length)];
  return written(Number(between(source, share).toPrecision(6)), source.unit);
}

function isFindings(values: CaseValue[] | PlacedFinding[]): values is PlacedFinding[] {
  const [first] = values;
  return typeof first === 'object' && 'problem' in first && Array.isArray((first as PlacedFinding).path);
}
