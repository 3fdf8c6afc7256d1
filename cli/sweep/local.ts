import { hostname } from 'node:os';
import PQueue from 'p-queue';
import { type Plan, type Point, pointSets } from '../../cases/index.ts';
import {
  type Failure,
  type Finished,
  finishedBeside,
  isFinished,
  mayPass,
  nameOf,
  pointHash,
  type SweepFolder,
  type SweepState,
  SweepTable,
} from '../../output/index.ts';
import { OutputError } from '../../solver/index.ts';
import { catchInterrupts } from '../interrupt.ts';
import { duration, size } from '../numbers.ts';
import { version } from '../version.ts';
import { type Limits, runPoint } from './point.ts';
import { freeSpace } from './resources.ts';
import { pointLine, Standing } from './standing.ts';
import { countsLine, type SweepProgress, sweepView } from './view.ts';

/** How a sweep is run on this machine. */
export interface LocalOptions {
  limits: Limits;
  /** cases at a time */
  atOnce: number;
  /** cases are stopped before less is free on the disk */
  keepFree_bytes: number;
  /** failed cases are tried again, whatever they failed of */
  retry: boolean;
  quiet: boolean;
}

/** Exit code of a sweep that ended with failed cases. */
export const SOME_FAILED = 5;

const LOOK_MS = 1000;
/** Until so much of a case has been computed a rate says nothing. */
const FIRST_SHARE = 0.05;

/** Runs what is missing of a sweep, each case as a process of its own. Returns the exit code. */
export async function runLocally(plan: Plan, folder: SweepFolder, options: LocalOptions): Promise<number> {
  const hold = await folder.take();
  try {
    await folder.clearLeftovers();
    return await new LocalSweep(plan, folder, await Standing.read(plan, folder), options).run();
  } finally {
    await hold.release();
  }
}

class LocalSweep {
  private readonly plan: Plan;
  private readonly folder: SweepFolder;
  private readonly standing: Standing;
  private readonly options: LocalOptions;
  private readonly table: SweepTable;
  private readonly running = new Set<Point>();
  private readonly start = { ms: performance.now(), made: 0 };
  /** why the sweep stops before its end, where it is not the user's wish */
  private trouble: OutputError | undefined;
  private finished: Finished = new Map();

  constructor(plan: Plan, folder: SweepFolder, standing: Standing, options: LocalOptions) {
    this.plan = plan;
    this.folder = folder;
    this.standing = standing;
    this.options = options;
    this.table = new SweepTable(plan, folder);
  }

  async run(): Promise<number> {
    const { plan, folder, standing, options } = this;
    const view = sweepView(process.stderr, options.quiet);
    const interrupt = catchInterrupts(() => view.say('stopping: running cases write their checkpoints; once more ends at once'));
    const trouble = new AbortController();
    const stopped = AbortSignal.any([interrupt.signal, trouble.signal]);
    await this.forgive();
    for (const point of plan.points) await this.table.put(point, standing.states[point.number - 1], version());
    this.start.made = standing.made();
    const open = standing.with('open');
    if (open.length < plan.points.length) view.say(`${plan.points.length - open.length} of ${plan.points.length} cases have ended already`);
    if (open.length > 0) this.finished = await finishedBeside(folder.path, version());

    const queue = new PQueue({ concurrency: options.atOnce });
    const work = queue.addAll(
      longestFirst(open, standing.work).map((point) => async () => {
        if (stopped.aborted || this.trouble !== undefined) return;
        try {
          await this.compute(point, stopped, view.say);
        } catch (error) {
          // the table or a failure could not be written: no case after this one could be either
          if (!(error instanceof OutputError)) throw error;
          this.trouble ??= error;
          trouble.abort();
        }
      }),
    );
    const watch = setInterval(() => {
      this.look(trouble).then(
        () => view.update(this.progress()),
        (error: unknown) => {
          if (error instanceof OutputError) this.trouble ??= error;
          trouble.abort();
        },
      );
    }, LOOK_MS);
    try {
      await this.look(trouble);
      await work;
    } finally {
      clearInterval(watch);
      view.end();
      interrupt.release();
    }
    await this.table.write('always');
    await this.table.draw();
    const complete = standing.count('open') === 0;
    await folder.writeState(this.state(complete ? 'done' : 'stopped'));
    if (this.trouble !== undefined) throw this.trouble;
    if (!complete) return interrupt.exit() ?? 1;
    return standing.count('failed') > 0 ? SOME_FAILED : 0;
  }

  /** Failed cases that another sitting may mend are open again, or all where that is asked for. */
  private async forgive(): Promise<void> {
    for (const { number } of this.standing.with('failed')) {
      const state = this.standing.states[number - 1];
      if (state.status !== 'failed' || !(this.options.retry || mayPass(state.failure))) continue;
      await this.folder.forgive(number);
      await this.standing.look(number);
    }
  }

  private async compute(point: Point, signal: AbortSignal, say: (text: string) => void): Promise<void> {
    const { plan, folder, standing, options } = this;
    this.running.add(point);
    try {
      const adopted = await this.adopt(point);
      if (!adopted) {
        const { record } = standing.states[point.number - 1];
        const task = {
          caseFile: folder.startFile,
          sets: pointSets(plan, point),
          folder: folder.runOf(point.number),
          again: record !== undefined && record.versions.swathe !== version(),
        };
        const ended = await runPoint(task, options.limits, signal);
        if (ended.status === 'failed') await folder.fail(point.number, ended.failure);
      }
      const state = await standing.look(point.number);
      this.running.delete(point);
      if (state.status === 'open') return;
      await this.table.put(point, state, version());
      await this.table.write('if due');
      const how =
        state.status === 'failed'
          ? `FAILED, ${failureLine(state.failure)}`
          : adopted
            ? 'taken over'
            : `done in ${duration(state.record.timeTaken_s)}`;
      say(`${nameOf(point.number)} ${how} (${pointLine(plan, point)}). ${countsLine(this.progress())}`);
    } finally {
      this.running.delete(point);
    }
  }

  /** Takes the case over from a folder beside this one, if it has been computed there. */
  private async adopt(point: Point): Promise<boolean> {
    if (this.finished.size === 0 || this.standing.states[point.number - 1].record !== undefined) return false;
    const hash = pointHash(this.plan, point);
    const run = this.finished.get(hash);
    if (run === undefined || !(await isFinished(run, hash, version()))) return false;
    await this.folder.adopt(point.number, run);
    return true;
  }

  /** Looks at the running cases and at the disk. */
  private async look(trouble: AbortController): Promise<void> {
    const free = await freeSpace(this.folder.path);
    if (free < this.options.keepFree_bytes && this.trouble === undefined) {
      const { path } = this.folder;
      this.trouble = new OutputError(
        path,
        `${path}: the disk has ${size(free)} left, less than the ${size(this.options.keepFree_bytes)} to be kept free; ` +
          'the running cases wrote checkpoints and nothing is lost. Free some space, then give the same command to go on',
      );
      trouble.abort();
    }
    for (const { number } of this.running) await this.standing.look(number);
    await this.folder.writeState(this.state('running'));
  }

  private progress(): SweepProgress {
    const { standing, plan } = this;
    const made = standing.made();
    const passed_s = (performance.now() - this.start.ms) / 1000;
    const gained = made - this.start.made;
    const rate = gained < FIRST_SHARE * Math.max(...standing.work) ? 0 : gained / passed_s;
    return {
      points: plan.points.length,
      done: standing.count('done'),
      failed: standing.count('failed'),
      running: [...this.running].map((point) => {
        const progress = standing.states[point.number - 1].record?.progress;
        return { name: nameOf(point.number), share: progress == null ? 0 : progress.step / progress.steps, says: pointLine(plan, point) };
      }),
      made,
      total: standing.total(),
      left_s: rate > 0 ? (standing.total() - made) / rate : undefined,
    };
  }

  private state(status: SweepState['status']): SweepState {
    const { made, total, left_s } = this.progress();
    return {
      status,
      title: this.plan.title,
      engine: 'local',
      points: this.plan.points.length,
      process: { pid: process.pid, host: hostname() },
      updated: new Date().toISOString(),
      updatesPerSecond: left_s === undefined || left_s === 0 ? null : (total - made) / left_s,
      left_s: left_s ?? null,
      jobs: [],
    };
  }
}

/** In the order of starting: what is long and starts last keeps one core busy and the others waiting. Equal ones stay in the order of the plan. */
function longestFirst(points: readonly Point[], work: readonly number[]): Point[] {
  return points.toSorted((a, b) => work[b.number - 1] - work[a.number - 1]);
}

function failureLine({ kind, message }: Failure): string {
  return `${kind}: ${message}`;
}
