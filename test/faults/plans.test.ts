import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { galleryText, planSchema, readPlan } from '../../cases/index.ts';
import { CaseError } from '../../solver/index.ts';

/** Every malformed plan of this folder has the message it must give in a text file of the same name, as malformed cases do. */
const folder = new URL('./plans/', import.meta.url);
const names = readdirSync(folder)
  .filter((file) => file.endsWith('.yaml'))
  .map((file) => file.slice(0, -'.yaml'.length));

const text = (file: string): string => readFileSync(new URL(file, folder), 'utf8');

async function refusal(name: string): Promise<CaseError> {
  try {
    await readPlan(text(`${name}.yaml`), `${name}.yaml`, (word) => ({ text: galleryText(word), file: word }));
  } catch (error) {
    if (error instanceof CaseError) return error;
    throw error;
  }
  throw new Error(`${name}.yaml was accepted`);
}

describe('a malformed plan', () => {
  it.each(names)('%s.yaml is refused with exactly its message', async (name) => {
    const { message } = await refusal(name);
    if (`${message}\n` !== text(`${name}.txt`)) writeFileSync(new URL(`${name}.txt.changed`, folder), `${message}\n`);
    expect(`${message}\n`).toBe(text(`${name}.txt`));
  });

  it('exists for every key of the table', async () => {
    const refusals = await Promise.all(names.map(refusal));
    const touched = new Set(refusals.flatMap(({ faults }) => faults.map(({ path }) => path.replace(/\.\d+/g, '.*'))));
    const { properties } = planSchema() as { properties: { vary: { items: { properties: object } } } };
    const inner = Object.keys(properties.vary.items.properties).map((key) => `vary.*.${key}`);
    const wanted = [...Object.keys(properties), ...inner];
    expect(wanted.filter((key) => ![...touched].some((path) => path === key || path.startsWith(`${key}.`)))).toEqual([]);
  });
});
