/** Turns what the table of keys found wrong into faults with place, value, limits and remedy. */
import { distance } from 'fastest-levenshtein';
import type { z } from 'zod';
import type { CaseFault } from '../solver/index.ts';
import { caseSchema } from './schema.ts';
import { type CaseTree, locate, type Path } from './text.ts';
import type { Finding } from './units.ts';

type Issue = z.core.$ZodIssue;

/** A finding with the path it belongs to. */
export type PlacedFinding = Finding & { path: Path; atKey?: boolean };

/** The place of a finding in the text and the value that stands there. */
export function placed(tree: CaseTree, entries: unknown, finding: PlacedFinding): CaseFault {
  const { path, atKey, problem, allowed, remedy } = finding;
  return {
    ...locate(tree, path, atKey === true),
    path: path.join('.'),
    value: shown(valueAt(entries, path)),
    problem,
    ...(allowed === undefined ? {} : { allowed }),
    ...(remedy === undefined ? {} : { remedy }),
  };
}

function valueAt(entries: unknown, path: Path): unknown {
  return path.reduce<unknown>((value, key) => (value as Record<string | number, unknown> | undefined)?.[key], entries);
}

/** A value as short text. */
function shown(value: unknown): string {
  if (value === undefined) return '';
  const text = typeof value === 'string' ? value : JSON.stringify(value).replaceAll('"', '').replaceAll(',', ', ').replaceAll(':', ': ');
  const flat = text.replace(/\s+/g, ' ');
  return flat.length > 60 ? `${flat.slice(0, 57)}...` : flat;
}

/** All findings behind the issues of a table whose JSON Schema is `schema`. */
export function findings(issues: readonly Issue[], entries: unknown, schema: () => object = caseSchema): PlacedFinding[] {
  return issues.flatMap((issue) => finding(issue, entries, schema));
}

function finding(issue: Issue, entries: unknown, schema: () => object): PlacedFinding[] {
  const path = issue.path as Path;
  const value = valueAt(entries, path);
  switch (issue.code) {
    case 'custom':
      return [{ path, ...(issue.params as unknown as Finding) }];
    case 'unrecognized_keys':
      return issue.keys.map((key) => unknownKey([...path, key], value, schema));
    case 'invalid_union':
      if (issue.errors.length > 0)
        return likelyBranch(issue.errors, value).flatMap((inner) => finding(within(inner, path), entries, schema));
      return [wrongKind(path, value, issue as unknown as { options?: string[] })];
    case 'invalid_type':
      return [wrongType(path, value, issue.expected, schema)];
    case 'too_small':
    case 'too_big':
      return [
        {
          path,
          problem: `has ${(value as unknown[]).length} entries`,
          allowed: issue.code === 'too_small' ? `${issue.minimum} entries` : `${issue.maximum} entries`,
        },
      ];
    default:
      return [{ path, problem: issue.message }];
  }
}

function within(issue: Issue, path: Path): Issue {
  return { ...issue, path: [...path, ...issue.path] } as Issue;
}

/** The alternative with the fewest keys that do not belong to it is the one that was meant; one of another shape altogether is not. */
function likelyBranch(branches: readonly Issue[][], value: unknown): Issue[] {
  if (typeof value !== 'object' || value === null) return branches[0] as Issue[];
  const strange = (issue: Issue): number => (issue.code === 'unrecognized_keys' ? issue.keys.length : 1000);
  const strangers = (issues: Issue[]) => issues.reduce((sum, issue) => sum + (issue.path.length === 0 ? strange(issue) : 0), 0);
  return [...branches].sort((a, b) => strangers(a) - strangers(b))[0] as Issue[];
}

function wrongType(path: Path, value: unknown, expected: string, schema: () => object): PlacedFinding {
  const wanted = expected === 'object' ? 'keys with values' : expected === 'array' || expected === 'tuple' ? 'a list' : expected;
  if (value === undefined || value === '') return { path, problem: 'is missing', allowed: keysText(path, schema) ?? wanted };
  const is = Array.isArray(value) ? 'a list' : typeof value === 'object' ? 'keys with values' : 'a single value';
  const keys = keysText(path, schema);
  return { path, problem: `is ${is}, not ${wanted}`, ...(keys === undefined ? {} : { allowed: keys }) };
}

function wrongKind(path: Path, value: unknown, issue: { options?: string[] }): PlacedFinding {
  const allowed = (issue.options ?? []).join(', ');
  if (value === undefined || value === '') return { path, problem: 'is missing', allowed };
  return { path, problem: 'is not one of the words allowed', allowed };
}

function unknownKey(path: Path, around: unknown, schema: () => object): PlacedFinding {
  const key = String(path.at(-1));
  const known = keysAt(path.slice(0, -1), around, schema);
  const near = known
    .map((name) => ({ name, away: distance(key.toLowerCase(), name) }))
    .sort((a, b) => a.away - b.away)
    .find(({ name, away }) => away <= Math.max(2, Math.ceil(name.length / 3)));
  const remedy = near === undefined ? undefined : `Did you mean "${near.name}"?`;
  return { path, atKey: true, problem: 'is not a known key', allowed: known.join(', '), ...(remedy === undefined ? {} : { remedy }) };
}

interface EditorSchema {
  properties?: Record<string, EditorSchema>;
  items?: EditorSchema;
  anyOf?: EditorSchema[];
  oneOf?: EditorSchema[];
  const?: string;
}

function keysText(path: Path, schema: () => object): string | undefined {
  const keys = keysAt(path, undefined, schema);
  return keys.length === 0 ? undefined : `the keys ${keys.join(', ')}`;
}

/** The keys the table knows at a path; of alternatives, the one `around` decides for, else all. */
function keysAt(path: Path, around: unknown, schema: () => object): string[] {
  let schemas: EditorSchema[] = [schema() as EditorSchema];
  for (const part of path) {
    schemas = schemas
      .flatMap(alternatives)
      .flatMap((schema) => (typeof part === 'number' ? schema.items : schema.properties?.[part]) ?? []);
  }
  const open = schemas.flatMap(alternatives);
  const decided = open.filter((schema) => chosen(schema, around));
  return [...new Set((decided.length > 0 ? decided : open).flatMap((schema) => Object.keys(schema.properties ?? {})))];
}

function alternatives(schema: EditorSchema): EditorSchema[] {
  return schema.anyOf ?? schema.oneOf ?? [schema];
}

/** Keys that only one of several kinds of fin has. */
const MARKS = ['outline', 'path'];

function chosen(schema: EditorSchema, around: unknown): boolean {
  if (typeof around !== 'object' || around === null) return false;
  const kind = schema.properties?.kind?.const;
  if (kind !== undefined) return (around as { kind?: unknown }).kind === kind;
  return MARKS.every((mark) => mark in around === (schema.properties?.[mark] !== undefined));
}
