import { availableParallelism } from 'node:os';
import { relative } from 'node:path';
import type { Plan } from '../../cases/index.ts';
import { SweepFolder } from '../../output/index.ts';
import { UsageError } from '../../solver/index.ts';
import { CAUTION } from '../warnings.ts';
import { listPoints } from './listing.ts';
import { runLocally, SOME_FAILED } from './local.ts';
import { readPlanSource } from './plan.ts';
import type { Limits } from './point.ts';
import { bytesOf, memoryPerCase, secondsOf } from './resources.ts';
import { cancel, type SlurmOptions, submit } from './slurm.ts';
import { Standing } from './standing.ts';
import { printStatus } from './status.ts';
import { gather, runTask } from './task.ts';

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
  const { plan, texts, folder: path } = await readPlanSource(options.word, options.out);
  const atOnce = options.atOnce ?? availableParallelism();
  const asked = limitsOf(options);
  const keepFree_bytes = bytesOf('keep-free', options.keepFree);
  const slurm = slurmOf(options);
  if (options.list) {
    await listPoints(plan, atOnce);
    return 0;
  }
  const folder = await SweepFolder.open(path, texts);
  if (options.status) {
    await printStatus(plan, folder);
    return 0;
  }
  if (options.cancel) {
    await cancel(folder);
    return 0;
  }
  const limits = { ...asked, memory_bytes: asked.memory_bytes ?? memoryPerCase(atOnce) };
  // the cluster itself watches the memory of a task that was given none
  if (options.point !== undefined) return runTask(plan, folder, options.point, { ...asked, memory_bytes: asked.memory_bytes ?? Infinity });
  if (options.gather) return gather(plan, folder);
  if (slurm !== undefined) return submit(plan, folder, slurm);
  const exit = await runLocally(plan, folder, { limits, atOnce, keepFree_bytes, retry: options.retry, quiet: options.quiet });
  if (!options.quiet && (exit === 0 || exit === SOME_FAILED)) process.stdout.write(`${await endPage(plan, folder)}\n`);
  return exit;
}

function limitsOf({
  frames,
  memory,
  limit,
  cpus,
  checkpoint_s,
}: SweepOptions): Omit<Limits, 'memory_bytes'> & { memory_bytes: number | undefined } {
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

async function endPage(plan: Plan, folder: SweepFolder): Promise<string> {
  const standing = await Standing.read(plan, folder);
  const failed = standing.count('failed');
  const shown = relative('', folder.path) || '.';
  const told = failed === 0 ? '' : `; ${failed} failed, the column error of the table says why`;
  return [
    `${plan.title}: ${standing.count('done')} of ${plan.points.length} cases done${told}`,
    `table: ${shown}/results.csv and results.parquet; picture: ${shown}/overview.png`,
    CAUTION,
  ].join('\n');
}
