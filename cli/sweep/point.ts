import { setTimeout as pause } from 'node:timers/promises';
import { fileURLToPath } from 'node:url';
import { stripVTControlCharacters } from 'node:util';
import { execa } from 'execa';
import { type Failure, type FailureKind, mayPass, RunFolder, type RunRecord } from '../../output/index.ts';
import { duration, size } from '../numbers.ts';
import { memoryOf } from './resources.ts';

/** What a case may take, and how it is run. */
export interface Limits {
  memory_bytes: number;
  /** wall time over all sittings; undefined: as long as it takes */
  time_s: number | undefined;
  /** 1 where as many cases run as there are cores */
  threads: number;
  frames: number;
  checkpoint_s: number;
}

/** A case to be run: what `swathe run` is told of it. */
export interface Task {
  caseFile: string;
  sets: readonly string[];
  folder: string;
  /** another version of swathe computed in the folder: start over */
  again: boolean;
}

export type Ended = { status: 'done' } | { status: 'failed'; failure: Failure } | { status: 'stopped' };

const MAIN = fileURLToPath(new URL('../main.js', import.meta.url));
const LOOK_MS = 500;
/** A case that was asked to stop has so long to write its checkpoint. */
const PATIENCE_MS = 30_000;
/** A run that lost its sweep lets go of its folder within this time. */
const ORPHAN_MS = 60_000;
/** Tries of what may pass. */
const TRIES = 2;
/** Longest message kept in a table, characters. */
const LONGEST = 600;

/**
 * Runs one case as a process of its own, `swathe run`, within limits. What may pass is tried once more. Never throws for what the case does.
 * @param signal asks for an orderly stop with a checkpoint
 */
export async function runPoint(task: Task, limits: Limits, signal: AbortSignal): Promise<Ended> {
  let ended: Ended = { status: 'stopped' };
  for (let attempt = 0; attempt < TRIES && !signal.aborted; attempt++) {
    await untilFree(task.folder, signal);
    ended = await oneTry({ ...task, again: task.again && attempt === 0 }, limits, signal);
    if (ended.status !== 'failed' || !mayPass(ended.failure)) return ended;
  }
  return signal.aborted ? { status: 'stopped' } : ended;
}

/** Waits for the run of an earlier sitting, which stops by itself. */
async function untilFree(folder: string, signal: AbortSignal): Promise<void> {
  const end = Date.now() + ORPHAN_MS;
  while (!signal.aborted && Date.now() < end && (await isHeld(folder))) await pause(LOOK_MS / 5);
}

async function isHeld(folder: string): Promise<boolean> {
  try {
    return await RunFolder.isHeld(folder);
  } catch {
    // what is wrong with the folder the run itself will say
    return false;
  }
}

async function oneTry(task: Task, limits: Limits, signal: AbortSignal): Promise<Ended> {
  const before_s = (await recordOf(task.folder))?.timeTaken_s ?? 0;
  const start_ms = Date.now();
  const child = execa(process.execPath, [MAIN, ...words(task, limits)], {
    // the channel tells the run when this process is gone
    ipc: true,
    stdio: ['ignore', 'ignore', 'pipe', 'ipc'],
    reject: false,
    env: { NO_COLOR: '1' },
    forceKillAfterDelay: false,
  });
  let exceeded: Failure | undefined;
  let asked_ms: number | undefined;
  const stop = (): void => {
    asked_ms ??= Date.now();
    child.kill('SIGINT');
  };
  const look = async (): Promise<void> => {
    if (child.pid === undefined || exceeded?.kind === 'memory') return;
    const held = await memoryOf(child.pid);
    if (held !== undefined && held > limits.memory_bytes) {
      exceeded = {
        kind: 'memory',
        message: `held ${size(held)}, more than the ${size(limits.memory_bytes)} a case may have; raise --memory, or take a coarser grid`,
      };
      child.kill('SIGKILL');
    }
    const taken_s = before_s + (Date.now() - start_ms) / 1000;
    if (limits.time_s !== undefined && taken_s > limits.time_s && exceeded === undefined) {
      exceeded = {
        kind: 'time',
        message: `took longer than the ${duration(limits.time_s)} a case may; raise --limit and give --retry to go on from its checkpoint`,
      };
      stop();
    }
    if (asked_ms !== undefined && Date.now() - asked_ms > PATIENCE_MS) child.kill('SIGKILL');
  };
  const watch = setInterval(() => void look(), LOOK_MS);
  signal.addEventListener('abort', stop);
  if (signal.aborted) stop();
  try {
    const { exitCode, signal: by, stderr } = await child;
    if (exitCode === 0) return { status: 'done' };
    if (exceeded !== undefined) return { status: 'failed', failure: exceeded };
    if (signal.aborted) return { status: 'stopped' };
    return { status: 'failed', failure: failureOf(exitCode, by, stderr) };
  } finally {
    clearInterval(watch);
    signal.removeEventListener('abort', stop);
  }
}

function words({ caseFile, sets, folder, again }: Task, limits: Limits): string[] {
  const pictures = limits.frames === 0 ? ['--no-frames'] : ['--frames', String(limits.frames)];
  return [
    'run',
    caseFile,
    ...sets.flatMap((set) => ['--set', set]),
    '--out',
    folder,
    '--threads',
    String(limits.threads),
    ...pictures,
    '--checkpoint',
    String(limits.checkpoint_s),
    ...(again ? ['--again'] : []),
    '--quiet',
  ];
}

const KINDS: Record<number, FailureKind> = { 2: 'case', 3: 'diverged', 4: 'output' };

function failureOf(exitCode: number | undefined, signal: string | undefined, stderr: string): Failure {
  if (exitCode === undefined || exitCode > 128) {
    const by = signal ?? `exit code ${exitCode}`;
    return { kind: 'killed', message: `was ended by ${by} ${TRIES} times; the system does that where memory is short` };
  }
  const text = stripVTControlCharacters(stderr);
  const told = text.slice(Math.max(0, text.lastIndexOf('swathe: ')));
  const flat = told.replace('swathe: ', '').replace(/\s+/g, ' ').trim();
  return { kind: KINDS[exitCode] ?? 'fault', message: flat.length > LONGEST ? `${flat.slice(0, LONGEST - 3)}...` : flat };
}

async function recordOf(folder: string): Promise<RunRecord | undefined> {
  try {
    return await RunFolder.look(folder);
  } catch {
    return undefined;
  }
}
