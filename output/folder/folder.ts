import { hostname } from 'node:os';
import { join, resolve } from 'node:path';
import type { Checkpoint, Progress, Recording } from '../../cases/index.ts';
import { OutputError } from '../../solver/index.ts';
import type { Measures } from '../measures/measures.ts';
import { drawHistogram } from '../pictures/histogram.ts';
import { drawShearMap, shearLimit } from '../pictures/shearmap.ts';
import { tables } from '../tables/tables.ts';
import { CHECKPOINT_FILES, CheckpointPair, type FoundCheckpoint } from './checkpoint.ts';
import { list, makeFolder, readWhole, remove, sizeOf, writeWhole } from './files.ts';
import { type Hold, isHeld, LOCK_NAME, takeFolder } from './lock.ts';
import { type Beginning, newRecord, RECORD_FILE, type RunRecord, type RunStatus, readRecord, sha256, writeRecord } from './record.ts';
import { summary } from './summary.ts';

const CASE_FILE = 'case.yaml';
const FRAME_FOLDER = 'frames';
/** What `writeResults` makes, in the order it is written. */
const RESULT_FILES = [
  'walls.csv',
  'histogram.csv',
  'swept.csv',
  'history.csv',
  'fins.csv',
  'bubbles.csv',
  'backtransport.csv',
  'deposit.csv',
  'shear-map-left.png',
  'shear-map-right.png',
  'histogram.png',
  'summary.json',
] as const;
/** What a write that was cut off leaves: the name and a number. */
const LEFTOVER = /^(.+)\.\d+$/;
const OWN_FILES: readonly string[] = [CASE_FILE, RECORD_FILE, ...RESULT_FILES, ...CHECKPOINT_FILES];
const FRAME_FILE = /^\d{4,}\.png$/;
/** run.json is not written more often for progress alone. */
const PROGRESS_EVERY_MS = 2000;

/** How a run ends in its folder. */
export type Ending = { status: 'done' } | { status: 'stopped' } | { status: 'failed'; error: Error };

/**
 * One run on disk. Life: `claim`, then `begin` or `resume`, then frames, checkpoints and progress, then `writeResults` and `end`, at last
 * `release`. Every file is whole or absent; run.json says `done` only when all the others are on the disk.
 */
export class RunFolder {
  /** absolute */
  readonly path: string;
  /** what run.json says; undefined before the first `begin` */
  record: RunRecord | undefined;
  private readonly hold: Hold;
  private readonly checkpoints: CheckpointPair;
  /** start of this sitting, and time taken by those before */
  private sat = { since_ms: Date.now(), before_s: 0 };
  private progressWritten_ms = 0;
  private recordWrites: Promise<void> = Promise.resolve();
  /** of a write nobody waited for */
  private failure: unknown;
  /** the write of the newest frame */
  private frameWrite: Promise<void> = Promise.resolve();

  private constructor(path: string, hold: Hold) {
    this.path = path;
    this.hold = hold;
    this.checkpoints = new CheckpointPair(path);
  }

  /**
   * Takes a folder for this process alone: a new one, an empty one, or one that holds a run.
   * @throws OutputError other files in it, another process writes there, not writable
   */
  static async claim(path: string): Promise<RunFolder> {
    const full = resolve(path);
    const names = (await list(full)) ?? [];
    const last = await readRecord(full);
    const foreign = names.find((name) => name !== LOCK_NAME && LEFTOVER.exec(name)?.[1] !== RECORD_FILE);
    if (last === undefined && foreign !== undefined) {
      throw new OutputError(
        full,
        `${full}: the folder holds other files (such as ${foreign}) and no run; choose a new or an empty folder.`,
      );
    }
    await makeFolder(full);
    const folder = new RunFolder(full, await takeFolder(full, last?.process));
    try {
      // read again: the holder before may have gone on meanwhile
      folder.record = await readRecord(full);
      await folder.clearLeftovers();
      if (folder.record?.status === 'done') await folder.checkpoints.remove();
    } catch (error) {
      await folder.release();
      throw error;
    }
    return folder;
  }

  /**
   * What a folder holds, without taking it.
   * @throws OutputError no run in it
   */
  static async look(path: string): Promise<RunRecord> {
    const full = resolve(path);
    const record = await readRecord(full);
    if (record === undefined)
      throw new OutputError(full, `${full}: no run is in this folder (no ${RECORD_FILE}); give the folder of a run.`);
    return record;
  }

  /** Whether a living process, as far as can be told, writes into a folder. */
  static async isHeld(path: string): Promise<boolean> {
    const full = resolve(path);
    return isHeld(full, (await readRecord(full))?.process);
  }

  /** The run in it was made from this very text. */
  holds(caseText: string): boolean {
    return this.record !== undefined && this.record.case_sha256 === sha256(caseText);
  }

  /** A run is in it that can go on: stopped, failed, or ended without a word. */
  get unfinished(): boolean {
    return this.record !== undefined && this.record.status !== 'done';
  }

  /** Starts over: what an earlier run left is removed, the case written, the status set to running. */
  async begin(beginning: Beginning): Promise<void> {
    this.guard();
    // in this order a kill in between leaves either the earlier run, to be started over, or the new one, to be begun again
    await this.checkpoints.remove();
    this.record = newRecord(beginning);
    this.sat = { since_ms: Date.now(), before_s: 0 };
    await this.writeRecord();
    await remove(this.path, [...RESULT_FILES, FRAME_FOLDER]);
    await writeWhole(join(this.path, CASE_FILE), beginning.caseText);
  }

  /**
   * Goes on with the unfinished run in the folder: hands out its newest whole checkpoint, removes results of the incomplete recording.
   * @throws OutputError no run, a finished one, one of another case or version
   */
  async resume(beginning: Beginning): Promise<FoundCheckpoint> {
    this.guard();
    const { record } = this;
    if (record === undefined || !this.holds(beginning.caseText) || record.status === 'done') {
      const held = record === undefined ? 'no run' : record.status === 'done' ? 'a finished run' : 'a run of another case';
      throw new OutputError(
        this.path,
        `${this.path}: the folder holds ${held}, nothing to go on with; choose another folder, or start over.`,
      );
    }
    const found = await this.checkpoints.read({ case_sha256: record.case_sha256, version: beginning.version });
    if (found.checkpoint === undefined) {
      await this.begin(beginning);
      this.record?.notes.push(...found.notes);
    } else {
      const now = new Date().toISOString();
      record.notes.push(...found.notes, `Resumed at step ${found.checkpoint.step}, ${now}.`);
      Object.assign(record, { status: 'running', updated: now, ended: null, error: null, files: [] });
      record.process = { pid: process.pid, host: hostname() };
      this.sat = { since_ms: Date.now(), before_s: record.timeTaken_s };
      await this.writeRecord();
      await remove(this.path, RESULT_FILES);
    }
    return found;
  }

  /** Notes progress in run.json, every {@link PROGRESS_EVERY_MS} at most. Returns at once; a failure is thrown by the next call. */
  progress(progress: Progress): void {
    const record = this.begun();
    record.progress = progress;
    if (Date.now() - this.progressWritten_ms < PROGRESS_EVERY_MS) return;
    this.progressWritten_ms = Date.now();
    this.update('running').catch((error: unknown) => {
      this.failure = error;
    });
  }

  /**
   * Takes one frame, `frames/0000.png` and so on, and writes it while the run goes on, after the one before it. A checkpoint and the results
   * wait for it, for a run that goes on draws nothing before its checkpoint again; whatever waits throws its failure.
   */
  async writeFrame(index: number, png: Buffer): Promise<void> {
    this.begun();
    await this.frameWrite;
    this.frameWrite = this.putFrame(`${String(index).padStart(4, '0')}.png`, png);
    // told to what waits for it
    this.frameWrite.catch(() => {});
  }

  private async putFrame(name: string, png: Buffer): Promise<void> {
    await makeFolder(join(this.path, FRAME_FOLDER));
    await writeWhole(join(this.path, FRAME_FOLDER, name), png);
  }

  /** Puts a checkpoint beside the one before, which stays until the next call. */
  async writeCheckpoint(checkpoint: Checkpoint): Promise<void> {
    const { case_sha256, versions } = this.begun();
    await this.frameWrite;
    await this.checkpoints.write(checkpoint, { case_sha256, version: versions.swathe });
  }

  /** Writes tables, shear maps, histogram and summary of a recording, complete or not. The status stays `running` until `end`. */
  async writeResults(recording: Recording, measures: Measures): Promise<void> {
    this.begun();
    await this.frameWrite;
    for (const [name, text] of Object.entries(tables(recording, measures))) await writeWhole(join(this.path, name), text);
    const style = { limit_Pa: shearLimit(recording) };
    for (const side of ['left', 'right'] as const) {
      await writeWhole(join(this.path, `shear-map-${side}.png`), drawShearMap(recording, side, style));
    }
    await writeWhole(join(this.path, 'histogram.png'), drawHistogram(recording, measures));
    await writeWhole(join(this.path, 'summary.json'), summary(recording, measures));
  }

  /** The last word: lists the files and sets the status. Checkpoints go when the run is done, else they stay to go on from. */
  async end(ending: Ending): Promise<void> {
    const record = this.begun();
    await Promise.allSettled([this.frameWrite]);
    record.error = ending.status === 'failed' ? { kind: ending.error.name, message: ending.error.message } : null;
    record.ended = new Date().toISOString();
    record.files = await this.files();
    await this.update(ending.status);
    if (ending.status === 'done') await this.checkpoints.remove();
  }

  /** Lets other processes have the folder. */
  async release(): Promise<void> {
    await Promise.allSettled([this.frameWrite]);
    await this.hold.release();
  }

  private async update(status: RunStatus): Promise<void> {
    const record = this.begun();
    record.status = status;
    record.updated = new Date().toISOString();
    record.timeTaken_s = this.sat.before_s + (Date.now() - this.sat.since_ms) / 1000;
    await this.writeRecord();
  }

  /** One write of run.json after the other: an overtaken one would leave an old status. */
  private writeRecord(): Promise<void> {
    const { record } = this;
    const write = async () => {
      if (record !== undefined) await writeRecord(this.path, record);
    };
    this.recordWrites = this.recordWrites.then(write, write);
    return this.recordWrites;
  }

  private begun(): RunRecord {
    this.guard();
    if (this.record === undefined)
      throw new OutputError(this.path, `${this.path}: no run has begun in this folder; call begin or resume first.`);
    return this.record;
  }

  /** Two writers in one folder would mix two runs. */
  private guard(): void {
    const { failure } = this;
    this.failure = undefined;
    if (failure !== undefined) throw failure;
    if (this.hold.lost) {
      throw new OutputError(
        this.path,
        `${this.path}: another process has taken the folder while this one stood still; this run ends here.`,
      );
    }
  }

  private async files(): Promise<RunRecord['files']> {
    const frames = (await list(join(this.path, FRAME_FOLDER))) ?? [];
    const files: RunRecord['files'] = [];
    for (const name of [CASE_FILE, ...RESULT_FILES, ...frames.map((frame) => `${FRAME_FOLDER}/${frame}`)]) {
      const bytes = await sizeOf(join(this.path, name));
      if (bytes !== undefined) files.push({ name, bytes });
    }
    return files;
  }

  private async clearLeftovers(): Promise<void> {
    for (const place of [this.path, join(this.path, FRAME_FOLDER)]) {
      const names = (await list(place)) ?? [];
      await remove(
        place,
        names.filter((name) => isLeftover(name)),
      );
    }
  }

  /** The case text as run, undefined before the first `begin`. */
  async caseText(): Promise<string | undefined> {
    return (await readWhole(join(this.path, CASE_FILE)))?.toString('utf8');
  }
}

function isLeftover(name: string): boolean {
  const whole = LEFTOVER.exec(name)?.[1];
  return whole !== undefined && (OWN_FILES.includes(whole) || FRAME_FILE.test(whole));
}
