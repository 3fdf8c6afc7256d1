import { join } from 'node:path';
import { OutputError } from '../../solver/index.ts';
import { readWhole, writeWhole } from '../folder/files.ts';

/** Says that a sweep.json is ours. */
const FORMAT = 'swathe sweep 1';
const STATE_FILE = 'sweep.json';

/** What sweep.json says: who drives the sweep, and how far it was when that was written. Points tell their own state in their files. */
export interface SweepState {
  status: 'running' | 'submitted' | 'done' | 'stopped';
  title: string;
  engine: 'local' | 'slurm';
  points: number;
  /** who drives it, or drove it last */
  process: { pid: number; host: string };
  /** ISO 8601, UTC */
  updated: string;
  /** cell updates of all cases together per second of wall time, in this sitting; null while nothing is known */
  updatesPerSecond: number | null;
  left_s: number | null;
  /** of Slurm: the arrays, and the job that gathers the table */
  jobs: string[];
}

/** @throws OutputError not one of ours */
export async function readState(folder: string): Promise<SweepState | undefined> {
  const path = join(folder, STATE_FILE);
  const bytes = await readWhole(path);
  if (bytes === undefined) return undefined;
  try {
    const { format, ...state } = JSON.parse(bytes.toString('utf8')) as SweepState & { format: string };
    if (format === FORMAT) return state;
  } catch {
    // the same to the reader as another format
  }
  throw new OutputError(path, `${path}: this is not the state of a sweep of this version; choose another folder.`);
}

export async function writeState(folder: string, state: SweepState): Promise<void> {
  await writeWhole(join(folder, STATE_FILE), `${JSON.stringify({ format: FORMAT, ...state }, null, 2)}\n`);
}
