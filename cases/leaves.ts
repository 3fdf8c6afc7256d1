/**
 * The kinds of value a case file holds at its leaves. Each returns a zod schema that turns the text read into a value,
 * reports a {@link Finding} otherwise, and carries what an editor shows (JSON Schema keywords).
 */
import * as z from 'zod';
import { type Finding, inSI, MEASURES, type Measure, plainText, readQuantity } from './units.ts';

/** `least` and `most` are in `unit`; both belong to what is allowed. `default` is written as in a case file. */
export interface Range {
  unit: string;
  least: number;
  most: number;
  says: string;
  default?: string;
}

type Reader<T> = (text: string) => { value: T } | Finding;

/** Slack on limits, relative: 10 cm and 100 mm differ in the last bit. */
const ROUND_OFF = 1e-12;

function leaf<T>(read: Reader<T>, editor: Record<string, unknown>, allowed: string) {
  return z
    .unknown()
    .transform((given, context): T => {
      const found = given === undefined || given === '' ? { problem: 'is missing', allowed } : readText(given, read, allowed);
      if ('value' in found) return found.value;
      context.addIssue({ code: 'custom', message: found.problem, params: { ...found } });
      return z.NEVER;
    })
    .meta(editor);
}

function readText<T>(given: unknown, read: Reader<T>, allowed: string): { value: T } | Finding {
  if (typeof given !== 'string') return { problem: `is a ${Array.isArray(given) ? 'list' : 'map'}, not a single value`, allowed };
  const found = read(given);
  return 'value' in found ? found : { allowed, ...found };
}

function rangeText(least: number, most: number, unit: string): string {
  const tail = unit === '' ? '' : ` ${unit}`;
  return `${least}${tail} to ${most}${tail}`;
}

/** What the quantities of a table measure, by their schema. */
const measured = z.registry<{ measure: Measure }>();

/** What a value of this schema measures; undefined for words, lists and maps. Wrappers such as defaults are looked through. */
export function measureOf(schema: z.ZodType): Measure | undefined {
  return measured.get(unwrapped(schema))?.measure;
}

/** The schema below defaults and the mark of what may be left out. */
export function unwrapped(schema: z.ZodType): z.ZodType {
  return schema instanceof z.ZodPrefault || schema instanceof z.ZodOptional ? unwrapped(schema.unwrap() as z.ZodType) : schema;
}

/** A number with a unit, in SI once read. */
export function quantity(measure: Measure, range: Range) {
  const allowed = rangeText(range.least, range.most, range.unit);
  const read: Reader<number> = (text) => {
    const found = readQuantity(text, measure);
    if (!('value' in found)) return found;
    const least = inSI(range.least, range.unit, measure);
    const most = inSI(range.most, range.unit, measure);
    const slack = ROUND_OFF * Math.max(Math.abs(least), Math.abs(most));
    if (found.value < least - slack || found.value > most + slack) return { problem: 'is out of range' };
    return found;
  };
  const editor = {
    type: MEASURES[measure].si === '' ? ['string', 'number'] : 'string',
    description: `${range.says}; ${MEASURES[measure].named} with its unit, ${allowed}`,
    pattern: MEASURES[measure].si === '' ? '^[+-]?[0-9.]+([eE][+-]?[0-9]+)?\\s*%?$' : '^[+-]?[0-9.]+([eE][+-]?[0-9]+)?\\s*[^0-9\\s].*$',
    examples: [MEASURES[measure].example],
  };
  const schema = leaf(read, editor, allowed).register(measured, { measure });
  return range.default === undefined ? schema : schema.prefault(range.default);
}

/** A pure number, whole where `whole` says so. */
export function plainNumber(range: { least: number; most: number; whole?: boolean; says: string; default?: string }) {
  const kind = range.whole === true ? 'a whole number' : 'a number without a unit';
  const allowed = `${kind}, ${rangeText(range.least, range.most, '')}`;
  const read: Reader<number> = (text) => {
    const clean = plainText(text);
    const value = Number(clean);
    if (!/^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/.test(clean)) return { problem: `is not ${kind}` };
    if (!Number.isFinite(value)) return { problem: 'is not finite' };
    if (range.whole === true && !Number.isInteger(value)) return { problem: `is not ${kind}` };
    if (value < range.least || value > range.most) return { problem: 'is out of range' };
    return { value };
  };
  const type = range.whole === true ? 'integer' : 'number';
  const editor = { type, minimum: range.least, maximum: range.most, description: `${range.says}; ${allowed}` };
  const schema = leaf(read, editor, allowed).register(measured, { measure: 'share' });
  return range.default === undefined ? schema : schema.prefault(range.default);
}

/** One of a few words. */
export function choice<T extends string>(words: readonly T[], says: string, fallback?: NoInfer<T>) {
  const allowed = words.join(', ');
  const read: Reader<T> = (text) => {
    const found = words.find((word) => word === text);
    return found === undefined ? { problem: 'is not one of the words allowed' } : { value: found };
  };
  const schema = leaf(read, { enum: words, description: says }, allowed);
  return fallback === undefined ? schema : schema.prefault(fallback);
}

/** true or false. */
export function flag(says: string, fallback: 'true' | 'false') {
  const read: Reader<boolean> = (text) =>
    text === 'true' || text === 'false' ? { value: text === 'true' } : { problem: 'is neither true nor false' };
  return leaf(read, { type: 'boolean', description: says }, 'true, false').prefault(fallback);
}

/** One line of text for people. */
export function line(longest: number, says: string, fallback: string) {
  const allowed = `one line of 1 to ${longest} characters`;
  const read: Reader<string> = (text) => {
    if (text.trim() === '' || text.includes('\n')) return { problem: 'is not one line of text' };
    return text.length > longest ? { problem: `has ${text.length} characters` } : { value: text.trim() };
  };
  return leaf(read, { type: ['string', 'number'], maxLength: longest, description: says }, allowed).prefault(fallback);
}

/** A place across the gap: one of some words, or a length from the left wall. */
export function wordOrLength<T extends string>(words: readonly T[], range: Range) {
  const allowed = `${words.join(', ')}, or ${rangeText(range.least, range.most, range.unit)}`;
  const read: Reader<T | number> = (text) => {
    const word = words.find((candidate) => candidate === text);
    if (word !== undefined) return { value: word };
    const found = readQuantity(text, 'length');
    if (!('value' in found)) return /^[\d.+-]/.test(text) ? found : { problem: 'is neither one of the words nor a length' };
    if (found.value < inSI(range.least, range.unit, 'length') || found.value > inSI(range.most, range.unit, 'length'))
      return { problem: 'is out of range' };
    return found;
  };
  const editor = { type: 'string', description: `${range.says}; ${allowed}`, examples: words };
  const schema = leaf(read, editor, allowed).register(measured, { measure: 'length' });
  return range.default === undefined ? schema : schema.prefault(range.default);
}

/** A part of the table that may be left out: `written` is read in its place. The cast: zod counts keys with a default as required here. */
export function leftOut<T extends z.ZodType>(part: T, written: unknown = {}) {
  return part.prefault(written as z.input<T> & z.core.util.NoUndefined<z.input<T>>);
}
