import { type Plan, type Point, pointCase, workOf } from '../../cases/index.ts';
import type { PointState, SweepFolder } from '../../output/index.ts';
import { CaseError } from '../../solver/index.ts';
import { version } from '../version.ts';

/** How all points of a sweep stand, from their own files. */
export class Standing {
  readonly states: PointState[] = [];
  /** cell updates of each point; 0 for one that cannot be computed */
  readonly work: number[];
  private readonly folder: SweepFolder;
  private readonly plan: Plan;

  private constructor(plan: Plan, folder: SweepFolder) {
    this.plan = plan;
    this.folder = folder;
    this.work = plan.points.map((point) => workOfPoint(plan, point));
  }

  static async read(plan: Plan, folder: SweepFolder): Promise<Standing> {
    const standing = new Standing(plan, folder);
    for (const { number } of plan.points) await standing.look(number);
    return standing;
  }

  /** Reads again how a point stands. */
  async look(number: number): Promise<PointState> {
    const state = await this.folder.point(number, version());
    this.states[number - 1] = state;
    return state;
  }

  /** Points with a status, in the order of the plan. */
  with(status: PointState['status']): Point[] {
    return this.plan.points.filter((_, i) => this.states[i].status === status);
  }

  count(status: PointState['status']): number {
    return this.states.reduce((sum, state) => sum + (state.status === status ? 1 : 0), 0);
  }

  /** Cell updates that have been made, those of failed points counted whole: they are out of the way. */
  made(): number {
    return this.states.reduce((sum, { status, record }, i) => {
      if (status !== 'open') return sum + this.work[i];
      const { step = 0, steps = 1 } = record?.progress ?? {};
      return sum + (this.work[i] * step) / steps;
    }, 0);
  }

  total(): number {
    return this.work.reduce((sum, updates) => sum + updates, 0);
  }
}

/** Cell updates of a point; 0 where its values contradict one another. */
export function workOfPoint(plan: Plan, point: Point): number {
  try {
    const { cells, steps } = workOf(pointCase(plan, point));
    return cells * steps;
  } catch (error) {
    if (error instanceof CaseError) return 0;
    throw error;
  }
}

/** What a point is, in a line: channel.gap 8 mm, channel.tilt 10 deg, seed 1. */
export function pointLine({ keys }: Plan, { values, seed }: Point): string {
  const parts = keys.map(({ key }, i) => `${key} ${typeof values[i] === 'string' ? values[i] : JSON.stringify(values[i])}`);
  return [...parts, `seed ${seed}`].join(', ');
}
