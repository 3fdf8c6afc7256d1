/** What the table of cases knows about a key such as `channel.gap` or `fins.0.angle`. */
import * as z from 'zod';
import { measureOf, unwrapped } from '../leaves.ts';
import { caseTable } from '../schema.ts';
import type { Path } from '../text.ts';
import { MEASURES, type Measure } from '../units.ts';

/** `fins.0.angle` as path: numbers stand for places in lists. */
export function pathOf(key: string): Path {
  return key.split('.').map((part) => (/^\d+$/.test(part.trim()) ? Number(part) : part.trim()));
}

/** What the values of a key measure; undefined for words, lists and maps. */
export function measureAt(path: Path): Measure | undefined {
  let schemas: z.ZodType[] = [caseTable];
  for (const part of path) schemas = schemas.flatMap((schema) => below(schema, part));
  return schemas.map(measureOf).find((measure) => measure !== undefined);
}

function below(schema: z.ZodType, part: string | number): z.ZodType[] {
  const open = unwrapped(schema);
  if (open instanceof z.ZodObject) return part in open.shape ? [open.shape[part] as z.ZodType] : [];
  if (open instanceof z.ZodArray) return typeof part === 'number' ? alternatives(open.element as z.ZodType) : [];
  if (open instanceof z.ZodUnion) return alternatives(open).flatMap((option) => below(option, part));
  return [];
}

function alternatives(schema: z.ZodType): z.ZodType[] {
  return schema instanceof z.ZodUnion ? (schema.options as z.ZodType[]) : [schema];
}

/**
 * The unit values of a measure are tabled in, as it stands at the end of a column's name, and what one of it is in SI. Angles are the
 * exception to SI: nobody reads a tilt in radians.
 */
export function tabled(measure: Measure): { ending: string; one: number } {
  if (measure === 'angle') return { ending: 'deg', one: Math.PI / 180 };
  return { ending: MEASURES[measure].si.replaceAll('/', '_').replaceAll(' ', '_').replaceAll('^', ''), one: 1 };
}
