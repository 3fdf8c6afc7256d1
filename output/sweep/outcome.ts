import { join } from 'node:path';
import * as z from 'zod';
import { OutputError } from '../../solver/index.ts';
import { readWhole, remove, writeWhole } from '../folder/files.ts';

/**
 * Why a case has no result: `case` it is none that can be computed, `diverged`, `time` and `memory` the limits of the sweep, `output` its
 * files could not be written, `killed` by a signal, `fault` of the tool.
 */
export type FailureKind = 'case' | 'diverged' | 'time' | 'memory' | 'output' | 'killed' | 'fault';

/** What is told of a case that failed. */
export interface Failure {
  kind: FailureKind;
  message: string;
}

/** Failures that another try may mend without anything being changed. */
const PASSING: readonly FailureKind[] = ['output', 'killed', 'fault'];

export function mayPass({ kind }: Failure): boolean {
  return PASSING.includes(kind);
}

const content = z.object({
  kind: z.enum(['case', 'diverged', 'time', 'memory', 'output', 'killed', 'fault']),
  message: z.string(),
});

function fileOf(folder: string, point: string): { folder: string; name: string } {
  return { folder: join(folder, 'failures'), name: `${point}.json` };
}

/** @throws OutputError not one of ours */
export async function readFailure(folder: string, point: string): Promise<Failure | undefined> {
  const file = fileOf(folder, point);
  const path = join(file.folder, file.name);
  const bytes = await readWhole(path);
  if (bytes === undefined) return undefined;
  try {
    return content.parse(JSON.parse(bytes.toString('utf8')));
  } catch (cause) {
    throw new OutputError(path, `${path}: this is not what a sweep writes of a failed case; remove the file.`, { cause });
  }
}

export async function writeFailure(folder: string, point: string, failure: Failure): Promise<void> {
  const file = fileOf(folder, point);
  await writeWhole(join(file.folder, file.name), `${JSON.stringify(failure, null, 2)}\n`);
}

export async function removeFailure(folder: string, point: string): Promise<void> {
  const file = fileOf(folder, point);
  await remove(file.folder, [file.name]);
}
