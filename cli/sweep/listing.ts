import { layOut, type Plan, type Point, pointCase } from '../../cases/index.ts';
import { CaseError } from '../../solver/index.ts';
import { count, duration, plain } from '../numbers.ts';
import { table } from '../summary.ts';
import { trial } from '../trial.ts';
import { workOfPoint } from './standing.ts';

/** Wall time of the one trial that the expected time rests on, s. */
const TRIAL_S = 0.1;

/** Prints the points of a plan and how long they will take, without running any. */
export async function listPoints(plan: Plan, atOnce: number): Promise<void> {
  const work = plan.points.map((point) => workOfPoint(plan, point));
  const rows = plan.points.map(({ number, values, seed }, i) => [
    String(number),
    ...values.map((value) => (typeof value === 'string' ? value : JSON.stringify(value))),
    String(seed),
    work[i] === 0 ? 'cannot be computed' : plain(work[i] / 1e9),
  ]);
  const heads = ['point', ...plan.keys.map(({ key }) => key), 'seed', '1e9 updates'];
  const left = plan.leftOut === 0 ? '' : `, ${count(plan.leftOut)} left out by where`;
  process.stdout.write(`${plan.title}: ${count(plan.points.length)} cases${left}\n${table([heads, ...rows])}\n`);
  process.stdout.write(`${await expected(plan, work, atOnce)}\n`);
}

async function expected(plan: Plan, work: readonly number[], atOnce: number): Promise<string> {
  const sound = work.findIndex((updates) => updates > 0);
  const unsound = work.filter((updates) => updates === 0).length;
  const notes =
    unsound === 0
      ? ''
      : `${unsound} of them cannot be computed, as in point ${work.indexOf(0) + 1}: ${complaint(plan, plan.points[work.indexOf(0)])}\n`;
  if (sound < 0) return notes.trimEnd();
  const panel = pointCase(plan, plan.points[sound]);
  const { setup, derived } = layOut(panel);
  const { updatesPerSecond } = await trial(panel, setup, derived, { threads: 1, wall_s: TRIAL_S });
  const total = work.reduce((sum, updates) => sum + updates, 0);
  const longest = Math.max(...work);
  const cores = Math.max(1, Math.min(atOnce, plan.points.length - unsound));
  const wall_s = Math.max(total / cores, longest) / updatesPerSecond;
  return `${notes}expected: about ${duration(wall_s)} with ${cores} at a time here, at ${plain(updatesPerSecond / 1e6)} million cell updates a second each (one trial of point ${sound + 1})`;
}

function complaint(plan: Plan, point: Point): string {
  try {
    pointCase(plan, point);
    return '';
  } catch (error) {
    if (error instanceof CaseError) return error.message;
    throw error;
  }
}
