import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { caseSchema, readCase } from '../../cases/index.ts';
import { CaseError, type CaseFault } from '../../solver/index.ts';

/**
 * Every malformed case file of this folder has the message it must give in a text file of the same name. To look at a changed
 * message: the test writes it to a file ending in `.changed` beside the expected one.
 */
const folder = new URL('./', import.meta.url);
const names = readdirSync(folder)
  .filter((file) => file.endsWith('.yaml'))
  .map((file) => file.slice(0, -'.yaml'.length));

const text = (file: string): string => readFileSync(new URL(file, folder), 'utf8');

function refusal(name: string): CaseError {
  try {
    readCase(text(`${name}.yaml`), `${name}.yaml`);
  } catch (error) {
    if (error instanceof CaseError) return error;
    throw error;
  }
  throw new Error(`${name}.yaml was accepted`);
}

describe('a malformed case file', () => {
  it.each(names)('%s.yaml is refused with exactly its message', (name) => {
    const { message, exit } = refusal(name);
    const expected = text(`${name}.txt`);
    if (`${message}\n` !== expected) writeFileSync(new URL(`${name}.txt.changed`, folder), `${message}\n`);
    expect(`${message}\n`).toBe(expected);
    expect(exit).toBe(2);
  });

  it('exists for every key of the table', () => {
    const faults = names.flatMap((name) => refusal(name).faults);
    const touched = new Set(faults.map(generalPath));
    expect(leaves(caseSchema() as EditorSchema, []).filter((path) => !touched.has(path))).toEqual([]);
  });

  it('tells line and column of the value, counted from 1', () => {
    for (const name of names) {
      const lines = text(`${name}.yaml`).split('\n');
      for (const { line, column, value, path } of refusal(name).faults) {
        if (path === '' || value === '' || value.startsWith('{') || value.startsWith('[')) continue;
        const there = lines[line - 1]?.slice(column - 1) ?? '';
        const key = path.split('.').at(-1) as string;
        expect(
          [value, key, '"', '|', '!'].some((start) => there.startsWith(start)),
          `${name}: "${there}" for ${path}`,
        ).toBe(true);
      }
    }
  });
});

function generalPath({ path }: CaseFault): string {
  return path.replace(/\.\d+/g, '.*');
}

interface EditorSchema {
  properties?: Record<string, EditorSchema>;
  items?: EditorSchema;
  prefixItems?: EditorSchema[];
  anyOf?: EditorSchema[];
  oneOf?: EditorSchema[];
}

/** Paths of all values the table knows, list indices as stars. */
function leaves(schema: EditorSchema, path: string[]): string[] {
  const branches = schema.anyOf ?? schema.oneOf;
  if (branches !== undefined) return [...new Set(branches.flatMap((branch) => leaves(branch, path)))];
  if (schema.properties !== undefined) return Object.entries(schema.properties).flatMap(([key, inner]) => leaves(inner, [...path, key]));
  if (schema.items !== undefined) return leaves(schema.items, [...path, '*']);
  if (schema.prefixItems !== undefined) return [...new Set(schema.prefixItems.flatMap((inner) => leaves(inner, [...path, '*'])))];
  return [path.join('.')];
}
