import { availableParallelism } from 'node:os';
import { relative } from 'node:path';
import type { Plan } from '../../cases/index.ts';
import { SweepFolder } from '../../output/index.ts';
import { UsageError } from '../../solver/index.ts';
import { CAUTION } from '../warnings.ts';
import { listPoints } from './listing.ts';
import { runLocally, SOME_FAILED } from './local.ts';
import { readPlanSource } from './plan.ts';
import { bytesOf, memoryPerCase, secondsOf } from './resources.ts';
import { Standing } from './standing.ts';
import { printStatus } from './status.ts';

/** What the command line asks of a sweep; quantities as they were written. */
export interface SweepOptions {
  word: string;
  out: string | undefined;
  list: boolean;
  status: boolean;
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
  const limits = {
    memory_bytes: options.memory === undefined ? memoryPerCase(atOnce) : bytesOf('memory', options.memory),
    time_s: options.limit === undefined ? undefined : secondsOf('limit', options.limit),
    frames: options.frames,
    checkpoint_s: options.checkpoint_s,
  };
  if (options.frames === 1) throw new UsageError('frames', '--frames 1: a run has none, or two or more: its start and its end');
  const keepFree_bytes = bytesOf('keep-free', options.keepFree);
  if (options.list) {
    await listPoints(plan, atOnce);
    return 0;
  }
  const folder = await SweepFolder.open(path, texts);
  if (options.status) {
    await printStatus(plan, folder);
    return 0;
  }
  const exit = await runLocally(plan, folder, { limits, atOnce, keepFree_bytes, retry: options.retry, quiet: options.quiet });
  if (!options.quiet && (exit === 0 || exit === SOME_FAILED)) process.stdout.write(`${await endPage(plan, folder)}\n`);
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
