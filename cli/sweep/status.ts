import type { Plan } from '../../cases/index.ts';
import { nameOf, type SweepFolder } from '../../output/index.ts';
import { duration, percent } from '../numbers.ts';
import { pointLine, Standing } from './standing.ts';

/** A driver that has not written its state for so long is gone, ms. */
const SILENT_MS = 30_000;
/** A run that has not written its record for so long is not computing, ms. */
const STILL_MS = 60_000;
const MOST_FAILURES = 20;

/** Prints how a sweep stands, from its files: from another shell, or another machine. */
export async function printStatus(plan: Plan, folder: SweepFolder): Promise<void> {
  const standing = await Standing.read(plan, folder);
  const state = await folder.state();
  const now = Date.now();
  const running = standing.with('open').filter(({ number }) => {
    const { record } = standing.states[number - 1];
    return record?.status === 'running' && now - Date.parse(record.updated) < STILL_MS;
  });
  const { length } = plan.points;
  const waiting = standing.count('open') - running.length;
  const lines = [
    `${plan.title}: ${length} cases, done ${standing.count('done')}, failed ${standing.count('failed')}, running ${running.length}, waiting ${waiting}`,
    `${percent(standing.made() / Math.max(1, standing.total()), 2)} of the work`,
  ];
  if (state?.engine === 'slurm') lines.push(`on Slurm: jobs ${state.jobs.join(', ')}`);
  else if (state?.status === 'running') {
    const alive = now - Date.parse(state.updated) < SILENT_MS;
    const who = `process ${state.process.pid} on ${state.process.host}`;
    const left = state.left_s === null ? '' : `, about ${duration(state.left_s)} left`;
    lines.push(
      alive
        ? `driven by ${who}${left}`
        : `${who} has said nothing for ${duration((now - Date.parse(state.updated)) / 1000)}; give the command again to go on`,
    );
  }
  for (const point of running) {
    const progress = standing.states[point.number - 1].record?.progress;
    const share = progress == null ? 0 : progress.step / progress.steps;
    lines.push(`running ${nameOf(point.number)} ${percent(share, 2)} (${pointLine(plan, point)})`);
  }
  const failed = standing.with('failed');
  for (const point of failed.slice(0, MOST_FAILURES)) {
    const found = standing.states[point.number - 1];
    if (found.status === 'failed') lines.push(`failed ${nameOf(point.number)} ${found.failure.kind}: ${found.failure.message}`);
  }
  if (failed.length > MOST_FAILURES) lines.push(`and ${failed.length - MOST_FAILURES} more, see ${folder.path}/results.csv`);
  process.stdout.write(`${lines.join('\n')}\n`);
}
