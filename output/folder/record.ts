import { createHash } from 'node:crypto';
import { hostname } from 'node:os';
import { join } from 'node:path';
import type { Derived, Progress } from '../../cases/index.ts';
import { OutputError } from '../../solver/index.ts';
import { readWhole, writeWhole } from './files.ts';

export const RECORD_FILE = 'run.json';
/** Says that a run.json is ours. */
const FORMAT = 'swathe run 1';

/** `running` in a folder that nobody holds means: ended without a word, go on from the checkpoint. */
export type RunStatus = 'running' | 'done' | 'failed' | 'stopped';

/** What run.json says: how far the run is and what it is made of. Written anew, as a whole, on every change. */
export interface RunRecord {
  format: typeof FORMAT;
  status: RunStatus;
  title: string;
  versions: { swathe: string; node: string };
  /** SHA-256 of case.yaml */
  case_sha256: string;
  seed: number;
  /** pictures asked for, from start to end; 0 for none */
  frames: number;
  derived: Derived;
  /** ISO 8601, UTC; `ended` is when the status was left */
  started: string;
  updated: string;
  ended: string | null;
  /** wall-clock time computed, over all sittings */
  timeTaken_s: number;
  progress: Progress | null;
  error: { kind: string; message: string } | null;
  /** what happened on the way: resumed, a checkpoint found broken */
  notes: string[];
  /** who writes, or wrote last */
  process: { pid: number; host: string };
  /** what the run wrote, run.json left out; complete when the status is no longer `running` */
  files: { name: string; bytes: number }[];
}

/** What a run is begun with. */
export interface Beginning {
  /** the case as run; becomes case.yaml */
  caseText: string;
  title: string;
  seed: number;
  /** pictures asked for, from start to end; 0 for none */
  frames: number;
  derived: Derived;
  /** version of swathe */
  version: string;
}

export function newRecord(beginning: Beginning): RunRecord {
  const now = new Date().toISOString();
  return {
    format: FORMAT,
    status: 'running',
    title: beginning.title,
    versions: { swathe: beginning.version, node: process.versions.node },
    case_sha256: sha256(beginning.caseText),
    seed: beginning.seed,
    frames: beginning.frames,
    derived: beginning.derived,
    started: now,
    updated: now,
    ended: null,
    timeTaken_s: 0,
    progress: null,
    error: null,
    notes: [],
    process: { pid: process.pid, host: hostname() },
    files: [],
  };
}

export function sha256(text: string): string {
  return createHash('sha256').update(text, 'utf8').digest('hex');
}

export async function writeRecord(folder: string, record: RunRecord): Promise<void> {
  await writeWhole(join(folder, RECORD_FILE), `${JSON.stringify(record, null, 2)}\n`);
}

/**
 * The record of a folder, undefined where it has none.
 * @throws OutputError when its run.json is not one of ours
 */
export async function readRecord(folder: string): Promise<RunRecord | undefined> {
  const path = join(folder, RECORD_FILE);
  const bytes = await readWhole(path);
  if (bytes === undefined) return undefined;
  let read: unknown;
  try {
    read = JSON.parse(bytes.toString('utf8'));
  } catch (error) {
    throw new OutputError(path, `${path}: this is not a run's record (no JSON); choose another folder, or remove the file.`, {
      cause: error,
    });
  }
  if (typeof read !== 'object' || read === null || !('format' in read) || read.format !== FORMAT) {
    throw new OutputError(
      path,
      `${path}: this is not the record of a run of this version ("format": "${FORMAT}" expected); choose another folder.`,
    );
  }
  return read as RunRecord;
}
