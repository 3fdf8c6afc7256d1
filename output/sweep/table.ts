import type { Plan, Point } from '../../cases/index.ts';
import { caseText, pointCells, pointSets } from '../../cases/index.ts';
import { readAnswers } from '../folder/answers.ts';
import { sha256 } from '../folder/record.ts';
import type { PointState, SweepFolder } from './folder.ts';
import { drawMap } from './map.ts';
import { drawOverview } from './overview.ts';
import { type ResultRow, resultsCsv, resultsParquet } from './results.ts';

/**
 * Share of the time that writing the table may take: with thousands of rows, or cases of seconds, it is not written after every case. The
 * cases keep all cores busy, so what is written takes time from them.
 */
const WRITING_SHARE = 0.01;

/** What the pictures show: whether the walls are swept, how hard, and how much gas that takes. */
const SHOWN = ['swept_together', 'mean_shear_together_Pa', 'holdup'];

/** SHA-256 of the case text of a point, as its run folder has it. */
export function pointHash(plan: Plan, point: Point): string {
  return sha256(caseText(plan.baseText, pointSets(plan, point)));
}

/** The table of a sweep: rows in the order of the plan, whatever the order they come in. */
export class SweepTable {
  readonly rows: ResultRow[];
  private readonly plan: Plan;
  private readonly folder: SweepFolder;
  private written_ms = Number.NEGATIVE_INFINITY;
  private took_ms = 0;

  constructor(plan: Plan, folder: SweepFolder) {
    this.plan = plan;
    this.folder = folder;
    this.rows = plan.points.map((point) => this.row(point));
  }

  private row(point: Point): ResultRow {
    return {
      point: point.number,
      values: pointCells(this.plan, point),
      seed: point.seed,
      status: 'open',
      error: undefined,
      answers: new Map(),
      timeTaken_s: null,
      version: null,
      case_sha256: null,
    };
  }

  /** Puts in how a point stands. */
  async put(point: Point, state: PointState, version: string): Promise<void> {
    const row = this.row(point);
    this.rows[point.number - 1] = row;
    row.status = state.status;
    if (state.status === 'open') return;
    row.version = version;
    row.timeTaken_s = state.record?.timeTaken_s ?? null;
    if (state.status === 'failed') {
      row.error = state.failure;
      row.case_sha256 = pointHash(this.plan, point);
    } else {
      row.case_sha256 = state.record.case_sha256;
      row.answers = await readAnswers(this.folder.runOf(point.number));
    }
  }

  /** Writes results.csv, unless that has been done just now. */
  async write(now: 'always' | 'if due'): Promise<void> {
    const start = performance.now();
    if (now === 'if due' && start - this.written_ms < this.took_ms / WRITING_SHARE) return;
    const keys = this.plan.keys.map(({ column }) => column);
    await this.folder.write('results.csv', resultsCsv(keys, this.rows));
    await this.folder.write('results.parquet', resultsParquet(keys, this.rows));
    this.written_ms = performance.now();
    this.took_ms = this.written_ms - start;
  }

  /** Writes overview.png and, where two keys are varied, map.png. */
  async draw(): Promise<void> {
    const { plan, rows } = this;
    const keys = plan.keys.map(({ column }) => column);
    const picture = { title: plan.title, keys, rows, measures: SHOWN };
    await this.folder.write('overview.png', drawOverview(picture));
    if (keys.length === 2) await this.folder.write('map.png', drawMap(picture));
  }
}
