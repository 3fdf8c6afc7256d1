import { cp, rename, rm } from 'node:fs/promises';
import { join, resolve } from 'node:path';
import { OutputError } from '../../solver/index.ts';
import { list, makeFolder, outputError, readWhole, remove, writeWhole } from '../folder/files.ts';
import { type Hold, LOCK_NAME, takeFolder } from '../folder/lock.ts';
import { type RunRecord, readRecord } from '../folder/record.ts';
import { type Failure, readFailure, removeFailure, writeFailure } from './outcome.ts';
import { readState, type SweepState, writeState } from './state.ts';

const PLAN_FILE = 'plan.yaml';
/** The base case as it was found. */
const BASE_FILE = 'base.yaml';
/** The case all points start from: the base with what the plan sets. */
const START_FILE = 'case.yaml';
const RUNS = 'points';
const FAILURES = 'failures';
const LOGS = 'logs';
const OWN =
  /^(plan|base|case)\.yaml(\.\d+)?$|^(sweep\.json|results\.(csv|parquet)|overview\.png|map\.png)(\.\d+)?$|^(points|failures|logs)$/;

/** What a sweep is begun with. */
export interface SweepTexts {
  plan: string;
  base: string;
  start: string;
}

/** How a point stands. */
export type PointState =
  | { status: 'done'; record: RunRecord }
  | { status: 'failed'; record: RunRecord | undefined; failure: Failure }
  /** nothing yet, or begun and not ended */
  | { status: 'open'; record: RunRecord | undefined };

/**
 * A sweep on disk: the plan, one run folder a point, what is told of failed ones, the table. Whether a point is done is read from its own
 * run folder and nowhere else, so nothing that is killed can leave the two apart.
 */
export class SweepFolder {
  /** absolute */
  readonly path: string;

  private constructor(path: string) {
    this.path = path;
  }

  /**
   * Opens the folder of a sweep, or makes one.
   * @throws OutputError other files in it, a sweep of another plan, not writable
   */
  static async open(path: string, texts: SweepTexts): Promise<SweepFolder> {
    const full = resolve(path);
    const names = (await list(full)) ?? [];
    const foreign = names.find((name) => name !== LOCK_NAME && !OWN.test(name));
    if (foreign !== undefined) {
      throw new OutputError(
        full,
        `${full}: the folder holds other files (such as ${foreign}) and no sweep; choose a new or an empty folder.`,
      );
    }
    const files: [string, string][] = [
      [BASE_FILE, texts.base],
      [START_FILE, texts.start],
      // last: with it the sweep has begun
      [PLAN_FILE, texts.plan],
    ];
    if (names.includes(PLAN_FILE)) {
      for (const [name, text] of files) {
        if ((await readWhole(join(full, name)))?.toString('utf8') === text) continue;
        const held = name === PLAN_FILE ? 'another plan' : 'another base case';
        throw new OutputError(
          full,
          `${full} holds a sweep of ${held}; it was kept. Give another folder with --out: what is computed already is taken over from folders beside it.`,
        );
      }
      return new SweepFolder(full);
    }
    await makeFolder(full);
    for (const name of [RUNS, FAILURES, LOGS]) await makeFolder(join(full, name));
    for (const [name, text] of files) await writeWhole(join(full, name), text);
    return new SweepFolder(full);
  }

  /** The texts a sweep in this folder was begun with; undefined where there is none. */
  static async texts(path: string): Promise<SweepTexts | undefined> {
    const [plan, base, start] = await Promise.all(
      [PLAN_FILE, BASE_FILE, START_FILE].map(async (name) => (await readWhole(join(path, name)))?.toString('utf8')),
    );
    return plan === undefined || base === undefined || start === undefined ? undefined : { plan, base, start };
  }

  /** @throws OutputError another process drives the sweep */
  async take(): Promise<Hold> {
    return takeFolder(this.path, (await readState(this.path))?.process);
  }

  state(): Promise<SweepState | undefined> {
    return readState(this.path);
  }

  writeState(state: SweepState): Promise<void> {
    return writeState(this.path, state);
  }

  /** The case that `--set` changes into a point. */
  get startFile(): string {
    return join(this.path, START_FILE);
  }

  get logs(): string {
    return join(this.path, LOGS);
  }

  /** The run folder of a point. */
  runOf(number: number): string {
    return join(this.path, RUNS, nameOf(number));
  }

  /** @param version of swathe: what another one computed is not done */
  async point(number: number, version: string): Promise<PointState> {
    const record = await this.record(number);
    if (record?.status === 'done' && record.versions.swathe === version) return { status: 'done', record };
    const failure = await readFailure(this.path, nameOf(number));
    return failure === undefined ? { status: 'open', record } : { status: 'failed', record, failure };
  }

  private async record(number: number): Promise<RunRecord | undefined> {
    try {
      return await readRecord(this.runOf(number));
    } catch (error) {
      // something else is in the place of the run folder; the run itself says so when its turn comes
      if (error instanceof OutputError) return undefined;
      throw error;
    }
  }

  fail(number: number, failure: Failure): Promise<void> {
    return writeFailure(this.path, nameOf(number), failure);
  }

  forgive(number: number): Promise<void> {
    return removeFailure(this.path, nameOf(number));
  }

  /** Takes over a finished run from another folder. A copy that is cut off is never taken for a run. */
  async adopt(number: number, from: string): Promise<void> {
    const target = this.runOf(number);
    const part = `${target}.part`;
    try {
      await rm(part, { recursive: true, force: true });
      await cp(from, part, { recursive: true });
      await rm(target, { recursive: true, force: true });
      await rename(part, target);
    } catch (cause) {
      throw outputError(target, `copying ${from}`, cause);
    }
  }

  write(name: 'results.csv' | 'results.parquet' | 'overview.png' | 'map.png', content: string | Buffer): Promise<void> {
    return writeWhole(join(this.path, name), content);
  }

  /** What another writer that was killed left. */
  async clearLeftovers(): Promise<void> {
    const names = (await list(this.path)) ?? [];
    const leftovers = names.filter((name) => /\.\d+$/.test(name) && OWN.test(name));
    await remove(this.path, leftovers);
  }
}

/** 0007 */
export function nameOf(number: number): string {
  return String(number).padStart(4, '0');
}
