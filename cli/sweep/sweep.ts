import { availableParallelism } from 'node:os';
import { UsageError } from '../../solver/index.ts';
import type { Drive } from './drive.ts';
import { listPoints } from './listing.ts';
import { readPlanSource } from './plan.ts';
import { bytesOf, secondsOf } from './resources.ts';
import type { SlurmOptions } from './slurm.ts';

/** Part of a task's memory that its case may have: the sweep, not the cluster, shall say that it was too little. */
const TASK_SHARE = 0.8;

/** What the command line asks of a sweep; quantities as they were written. */
export interface SweepOptions {
  word: string;
  out: string | undefined;
  list: boolean;
  status: boolean;
  engine: string;
  partition: string | undefined;
  cpus: number;
  time: string | undefined;
  cancel: boolean;
  point: number | undefined;
  gather: boolean;
  atOnce: number | undefined;
  memory: string | undefined;
  limit: string | undefined;
  keepFree: string;
  retry: boolean;
  frames: number;
  checkpoint_s: number;
  quiet: boolean;
}

/** Runs many cases from one plan, lists them or says how they stand. Returns the exit code: 5 where cases failed. */
export async function sweep(options: SweepOptions): Promise<number> {
  const source = await readPlanSource(options.word, options.out);
  const atOnce = options.atOnce ?? availableParallelism();
  const asked = limitsOf(options);
  const keepFree_bytes = bytesOf('keep-free', options.keepFree);
  const slurm = slurmOf(options);
  if (options.list) {
    await listPoints(source.plan, atOnce);
    return 0;
  }
  // loaded when needed: a plan is listed in half the time without
  const { drive } = await import('./drive.ts');
  return drive(source, { ...options, asked, atOnce, keepFree_bytes, slurm });
}

function limitsOf({ frames, memory, limit, cpus, checkpoint_s }: SweepOptions): Drive['asked'] {
  if (frames === 1) throw new UsageError('frames', '--frames 1: a run has none, or two or more: its start and its end');
  return {
    memory_bytes: memory === undefined ? undefined : bytesOf('memory', memory),
    time_s: limit === undefined ? undefined : secondsOf('limit', limit),
    threads: cpus,
    frames,
    checkpoint_s,
  };
}

/** What Slurm is asked for; undefined for the local engine. */
function slurmOf(options: SweepOptions): SlurmOptions | undefined {
  const { engine, partition, cpus, time, atOnce, retry, memory, limit, frames, checkpoint_s, quiet } = options;
  if (engine !== 'local' && engine !== 'slurm') throw new UsageError('engine', `--engine ${engine}: neither local nor slurm`);
  const only = partition !== undefined ? 'partition' : time !== undefined ? 'time' : cpus !== 1 ? 'cpus' : undefined;
  if (engine === 'local' && options.point === undefined && only !== undefined)
    throw new UsageError(only, `--${only} goes with --engine slurm`);
  if (engine === 'local') return undefined;
  const words = [
    ...(memory === undefined ? [] : ['--memory', memory]),
    ...(limit === undefined ? [] : ['--limit', limit]),
    ...['--cpus', String(cpus), '--frames', String(frames), '--checkpoint', String(checkpoint_s)],
  ];
  const memory_bytes = memory === undefined ? undefined : bytesOf('memory', memory) / TASK_SHARE;
  const time_s = time === undefined ? undefined : secondsOf('time', time);
  return { partition, cpus, memory_bytes, time_s, atOnce, retry, words, quiet };
}
