import { relative } from 'node:path';
import type { Plan } from '../../cases/index.ts';
import { SweepFolder } from '../../output/index.ts';
import { CAUTION } from '../warnings.ts';
import { runLocally, SOME_FAILED } from './local.ts';
import type { PlanSource } from './plan.ts';
import type { Limits } from './point.ts';
import { memoryPerCase } from './resources.ts';
import { cancel, type SlurmOptions, submit } from './slurm.ts';
import { Standing } from './standing.ts';
import { printStatus } from './status.ts';
import { gather, runTask } from './task.ts';

/** What is to be done with a sweep that has a folder. */
export interface Drive {
  /** as the command line has it */
  asked: Omit<Limits, 'memory_bytes'> & { memory_bytes: number | undefined };
  status: boolean;
  cancel: boolean;
  /** the one point to run, and nothing else */
  point: number | undefined;
  gather: boolean;
  /** what Slurm is asked for; undefined: cases run here */
  slurm: SlurmOptions | undefined;
  atOnce: number;
  keepFree_bytes: number;
  retry: boolean;
  quiet: boolean;
}

/** Runs what is missing, or says how the sweep stands, or ends it. Returns the exit code. */
export async function drive({ plan, texts, folder: path }: PlanSource, options: Drive): Promise<number> {
  const { asked, atOnce, keepFree_bytes, retry, quiet } = options;
  const folder = await SweepFolder.open(path, texts);
  if (options.status) {
    await printStatus(plan, folder);
    return 0;
  }
  if (options.cancel) {
    await cancel(folder);
    return 0;
  }
  // the cluster itself watches the memory of a task that was given none
  if (options.point !== undefined) return runTask(plan, folder, options.point, { ...asked, memory_bytes: asked.memory_bytes ?? Infinity });
  if (options.gather) return gather(plan, folder);
  if (options.slurm !== undefined) return submit(plan, folder, options.slurm);
  const limits = { ...asked, memory_bytes: asked.memory_bytes ?? memoryPerCase(atOnce) };
  const exit = await runLocally(plan, folder, { limits, atOnce, keepFree_bytes, retry, quiet });
  if (!quiet && (exit === 0 || exit === SOME_FAILED)) process.stdout.write(`${await endPage(plan, folder)}\n`);
  return exit;
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
