import PQueue from 'p-queue';
import type { FailureKind } from '../output/index.ts';
import { catchInterrupts } from './interrupt.ts';
import { duration } from './numbers.ts';
import { type Ended, runPoint, type Task } from './sweep/point.ts';
import { memoryPerCase } from './sweep/resources.ts';

/** A run to be computed in a process of its own. */
export interface Job {
  /** for people: which run this is */
  label: string;
  task: Task;
  /** pictures of the channel, 0 for none */
  frames: number;
  /** cell updates it takes, to tell the time left by */
  updates: number;
}

/** Wall time between checkpoints, s. */
const CHECKPOINT_S = 10;

const EXITS: Partial<Record<FailureKind, number>> = { case: 2, diverged: 3, output: 4 };

/**
 * Computes runs side by side, in the order given, and says how far they are. One that fails does not keep the others from their end.
 * After an interrupt nothing is begun any more, and those at work stop with a checkpoint.
 * @param say takes a line for people
 * @returns exit code: 0, that of the first failure, or that of an interrupt
 */
export async function runJobs(
  jobs: readonly Job[],
  atOnce: number,
  say: (line: string) => void,
): Promise<{ exit: number; stopped: boolean }> {
  const interrupt = catchInterrupts(() => say('stopping: the runs keep a checkpoint; once more ends at once'));
  const queue = new PQueue({ concurrency: atOnce });
  const left = timeLeft(jobs);
  let ended = 0;
  const runJob = async ({ label, task, frames, updates }: Job): Promise<Ended> => {
    const limits = { threads: 1, memory_bytes: memoryPerCase(atOnce), time_s: undefined, frames, checkpoint_s: CHECKPOINT_S };
    const ending = await runPoint(task, limits, interrupt.signal);
    ended++;
    if (ending.status === 'done') say(`${ended} of ${jobs.length}: ${label} done${left(updates)}`);
    if (ending.status === 'failed') say(`${ended} of ${jobs.length}: ${label} failed${left(updates)}`);
    return ending;
  };
  try {
    const endings = await queue.addAll(jobs.map((job) => () => runJob(job)));
    const stopped = interrupt.exit();
    if (stopped !== undefined) return { exit: stopped, stopped: true };
    const failures = endings.flatMap((ending, i) => (ending.status === 'failed' ? [{ label: jobs[i].label, ...ending.failure }] : []));
    for (const { label, message } of failures) process.stderr.write(`swathe: ${label} failed: ${message}\n`);
    return { exit: failures.length === 0 ? 0 : (EXITS[failures[0].kind] ?? 1), stopped: false };
  } finally {
    interrupt.release();
  }
}

/** Says the wall time still needed, at the pace of the runs that ended. */
function timeLeft(jobs: readonly Job[]): (updates: number) => string {
  const began = performance.now();
  const all = jobs.reduce((sum, { updates }) => sum + updates, 0);
  let done = 0;
  return (updates) => {
    done += updates;
    const passed_s = (performance.now() - began) / 1000;
    return done >= all ? `, ${duration(passed_s)} in all` : `, about ${duration((passed_s * (all - done)) / done)} left`;
  };
}
