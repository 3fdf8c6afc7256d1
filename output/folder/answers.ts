import { join } from 'node:path';
import { z } from 'zod';
import { OutputError } from '../../solver/index.ts';
import type { Answer } from '../measures/answers.ts';
import { readWhole } from './files.ts';

const figure = z.number().nullable();
const content = z.object({ answers: z.record(z.string(), z.object({ value: figure, low: figure, high: figure })) });

/**
 * The answers of a finished run by name, from its summary.json, in the order they stand there.
 * @throws OutputError no summary, or not one of ours
 */
export async function readAnswers(folder: string): Promise<Map<string, Answer>> {
  const path = join(folder, 'summary.json');
  const bytes = await readWhole(path);
  if (bytes === undefined) throw new OutputError(path, `${path}: there is no such file; run the case in this folder to its end.`);
  let found: unknown;
  try {
    found = JSON.parse(bytes.toString('utf8'));
  } catch (cause) {
    throw new OutputError(path, `${path}: this is no JSON; run the case anew (--again).`, { cause });
  }
  const read = content.safeParse(found);
  if (!read.success) {
    const [{ path: keys }] = read.error.issues;
    throw new OutputError(path, `${path}: ${keys.join('.')} is not as this version writes it; run the case anew (--again).`);
  }
  return new Map(Object.entries(read.data.answers).map(([name, answer]) => [name, { name, ...answer }]));
}
