import { join } from 'node:path';
import * as z from 'zod';
import { OutputError } from '../../solver/index.ts';
import type { Answer } from '../measures/answers.ts';
import { readWhole } from './files.ts';

const figure = z.number().nullable();
const content = z.object({
  answers: z.record(z.string(), z.object({ value: figure, low: figure, high: figure })),
  recorded: z.object({ samples: z.number(), every_s: z.number() }),
});

/** What other runs are held against. */
interface RunSummary {
  /** by name, in the order they stand there */
  answers: Map<string, Answer>;
  /** time recorded after settling */
  recorded_s: number;
}

/** The answers of {@link readSummary}. */
export async function readAnswers(folder: string): Promise<Map<string, Answer>> {
  return (await readSummary(folder)).answers;
}

/**
 * What a finished run tells in its summary.json.
 * @throws OutputError no summary, or not one of ours
 */
export async function readSummary(folder: string): Promise<RunSummary> {
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
  const { answers, recorded } = read.data;
  return {
    answers: new Map(Object.entries(answers).map(([name, answer]) => [name, { name, ...answer }])),
    recorded_s: recorded.samples * recorded.every_s,
  };
}
