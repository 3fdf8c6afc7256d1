/** The values of one key of a plan: a list as it stands, or a range resolved to one. */
import type { PlacedFinding } from '../faults.ts';
import type { Path } from '../text.ts';
import { converted, type Finding, inSI, MEASURES, type Measure, readAmount, readQuantity } from '../units.ts';
import type { VaryEntry } from './schema.ts';

/** A value as it goes into a case: text, or a list or map of such. */
export type CaseValue = string | CaseValue[] | { [key: string]: CaseValue };

/** Two ends with one unit. */
export interface Ends {
  from: number;
  to: number;
  unit: string;
  spacing: 'even' | 'log';
}

/** Digits of computed values: fewer than a float holds, so that 0.1 + 0.2 reads 0.3. */
const DIGITS = 12;
/** A last step that falls short of the end by round-off still reaches it. */
const ROUND_OFF = 1e-9;
const MOST_VALUES = 5000;

/** A number as a case file has it. */
export function written(number: number, unit: string): string {
  const digits = String(Number(number.toPrecision(DIGITS)));
  return unit === '' || unit === '%' ? `${digits}${unit}` : `${digits} ${unit}`;
}

/** The values, or what is wrong with the entry at `path`. */
export function valuesOf(entry: VaryEntry, path: Path): CaseValue[] | PlacedFinding[] {
  const { values, from, to, step, count, spacing } = entry;
  if (values !== undefined) {
    const stray = Object.entries({ from, to, step, count, spacing }).find(([, given]) => given !== undefined);
    if (stray !== undefined) {
      const problem = 'stands beside values';
      return [{ path: [...path, stray[0]], atKey: true, problem, allowed: 'values, or from and to with step or count' }];
    }
    if (values.length === 0) return [{ path: [...path, 'values'], problem: 'has 0 entries', allowed: '1 entry or more' }];
    return values as CaseValue[];
  }
  const ends = endsOf(entry, path);
  if (Array.isArray(ends)) return ends;
  if ((step === undefined) === (count === undefined)) {
    const problem = step === undefined ? 'has neither step nor count' : 'has both step and count';
    return [{ path, problem, allowed: 'one of step, count', remedy: 'A range without either belongs to combine: sampled' }];
  }
  const numbers = count !== undefined ? counted(ends, count) : stepped(ends, step as string, path);
  if (numbers.length > 0 && typeof numbers[0] === 'object') return numbers as PlacedFinding[];
  return (numbers as number[]).map((number) => written(number, ends.unit));
}

/** The ends of a range, or what is wrong with them. */
export function endsOf({ from, to, spacing = 'even' }: VaryEntry, path: Path): Ends | PlacedFinding[] {
  const missing = from === undefined ? 'from' : to === undefined ? 'to' : undefined;
  if (from === undefined || to === undefined) {
    return [{ path: [...path, missing as string], problem: 'is missing', allowed: 'values, or from and to' }];
  }
  const first = readAmount(from);
  if (!('value' in first)) return [{ path: [...path, 'from'], ...first }];
  const last = readAmount(to);
  if (!('value' in last)) return [{ path: [...path, 'to'], ...last }];
  const { number: start, unit } = first.value;
  const end = converted(last.value.number, last.value.unit, unit);
  if (end === undefined)
    return [{ path: [...path, 'to'], problem: 'has another kind of unit than from', allowed: `a value in ${unit || 'no unit'}` }];
  if (!(end > start)) return [{ path: [...path, 'to'], problem: 'is not above from', allowed: `more than ${written(start, unit)}` }];
  if (spacing === 'log' && start <= 0) {
    return [
      {
        path: [...path, 'from'],
        problem: 'is not above zero',
        allowed: 'a positive value',
        remedy: 'Ratios need one; or leave spacing even',
      },
    ];
  }
  return { from: start, to: end, unit, spacing };
}

function counted(ends: Ends, count: number): number[] {
  return Array.from({ length: count }, (_, i) => between(ends, i / (count - 1)));
}

/** The value at a share of the way from one end to the other, ends exact. */
export function between({ from, to, spacing }: Ends, share: number): number {
  if (share === 0) return from;
  if (share === 1) return to;
  return spacing === 'log' ? from * (to / from) ** share : from + share * (to - from);
}

function stepped({ from, to, unit, spacing }: Ends, text: string, path: Path): number[] | PlacedFinding[] {
  const place = [...path, 'step'];
  if (spacing === 'log') return [{ path: place, problem: 'does not go with log spacing', allowed: 'count' }];
  const read = readAmount(text);
  if (!('value' in read)) return [{ path: place, ...read }];
  const sameDegrees = unit === 'degC' && read.value.unit === 'K';
  const step = sameDegrees ? read.value.number : converted(read.value.number, read.value.unit, unit);
  if (step === undefined)
    return [{ path: place, problem: 'has another kind of unit than from', allowed: `a value in ${unit || 'no unit'}` }];
  if (!(step > 0)) return [{ path: place, problem: 'is not above zero', allowed: 'a positive value' }];
  const steps = Math.floor((to - from) / step + ROUND_OFF);
  if (steps >= MOST_VALUES) return [{ path: place, problem: `makes ${steps + 1} values`, allowed: `at most ${MOST_VALUES}` }];
  return Array.from({ length: steps + 1 }, (_, i) => from + i * step);
}

/** A value as a table holds it: SI (degrees for angles) where it is a quantity, else its text. */
export function tabledValue(value: CaseValue, measure: Measure | undefined, one: number): number | string {
  if (typeof value !== 'string') return shortText(value);
  if (measure === undefined) return value;
  const read: { value: number } | Finding = readQuantity(value, measure);
  return 'value' in read
    ? Number((read.value / (MEASURES[measure].si === '' ? 1 : inSI(one, MEASURES[measure].si, measure))).toPrecision(DIGITS))
    : value;
}

/** Lists and maps as they may stand in one line of YAML. */
export function shortText(value: CaseValue): string {
  if (typeof value === 'string') return /^[\w.+-]+( [\w.+/()%-]+)*$/.test(value) ? value : JSON.stringify(value);
  if (Array.isArray(value)) return `[${value.map(shortText).join(', ')}]`;
  return `{${Object.entries(value)
    .map(([key, inner]) => `${key}: ${shortText(inner)}`)
    .join(', ')}}`;
}
