import { type Plan, pointSets } from '../../cases/index.ts';
import { type SweepFolder, SweepTable } from '../../output/index.ts';
import { UsageError } from '../../solver/index.ts';
import { catchInterrupts } from '../interrupt.ts';
import { version } from '../version.ts';
import { SOME_FAILED } from './local.ts';
import { type Limits, runPoint } from './point.ts';
import { requeue } from './slurm.ts';
import { Standing } from './standing.ts';

/**
 * Runs one point of a sweep: what a task of a cluster does. A warning that its time is nearly up makes it write a checkpoint and queue
 * again. Returns the exit code.
 */
export async function runTask(plan: Plan, folder: SweepFolder, number: number, limits: Limits): Promise<number> {
  const point = plan.points[number - 1];
  if (point === undefined) throw new UsageError('point', `--point ${number}: the plan has points 1 to ${plan.points.length}`);
  const warned = new AbortController();
  const warn = (): void => warned.abort();
  process.on('SIGUSR1', warn);
  const interrupt = catchInterrupts(() => process.stderr.write('stopping with a checkpoint\n'));
  try {
    const { status, record } = await folder.point(number, version());
    if (status === 'done') return 0;
    await folder.forgive(number);
    const task = {
      caseFile: folder.startFile,
      sets: pointSets(plan, point),
      folder: folder.runOf(number),
      again: record !== undefined && record.versions.swathe !== version(),
    };
    const ended = await runPoint(task, limits, AbortSignal.any([interrupt.signal, warned.signal]));
    if (ended.status === 'failed') {
      await folder.fail(number, ended.failure);
      process.stderr.write(`${ended.failure.kind}: ${ended.failure.message}\n`);
      return SOME_FAILED;
    }
    if (ended.status === 'done') return 0;
    if (warned.signal.aborted) await requeue();
    return interrupt.exit() ?? 0;
  } finally {
    interrupt.release();
    process.off('SIGUSR1', warn);
  }
}

/** Writes table and pictures from what the points' own files say. Returns the exit code. */
export async function gather(plan: Plan, folder: SweepFolder): Promise<number> {
  const hold = await folder.take();
  try {
    const standing = await Standing.read(plan, folder);
    const table = new SweepTable(plan, folder);
    for (const point of plan.points) await table.put(point, standing.states[point.number - 1], version());
    await table.write('always');
    await table.draw();
    return standing.count('failed') > 0 ? SOME_FAILED : 0;
  } finally {
    await hold.release();
  }
}
