import { availableParallelism } from 'node:os';
import { join } from 'node:path';
import { type Case, type Checkpoint, type Derived, type Hooks, layOut, type Recording, simulate } from '../cases/index.ts';
import { allSure, type Beginning, framePainter, measure, RunFolder, surenessOf } from '../output/index.ts';
import { OutputError } from '../solver/index.ts';
import { catchInterrupts } from './interrupt.ts';
import { duration, plain } from './numbers.ts';
import { progressView } from './progress.ts';
import { readSource } from './source.ts';
import { summaryPage, sureLine } from './summary.ts';
import { version } from './version.ts';
import { CAUTION } from './warnings.ts';
import { commandToGoOn } from './words.ts';

/** What the command line asks of a run. */
export interface RunOptions {
  word: string;
  sets: string[];
  out: string | undefined;
  /** starts over whatever run the folder holds */
  again: boolean;
  /** number of pictures, from start to end; 0 for none */
  frames: number;
  /** threads to compute with; as many as there are cores without it */
  threads?: number | undefined;
  /** wall time between checkpoints */
  checkpoint_s: number;
  quiet: boolean;
  /** one of several runs: its answers are not printed */
  partial?: boolean;
  /** the words after `swathe`, to say how to go on */
  words: readonly string[];
}

/** Runs a case into its run folder, from the start or from where it stopped. Returns the exit code. */
export async function run(options: RunOptions): Promise<number> {
  const { name, text, panel } = readSource(options.word, options.sets);
  const { derived } = layOut(panel);
  const path = options.out ?? join('runs', name);
  const folder = await RunFolder.claim(path);
  try {
    if (!options.again && folder.record?.status === 'done' && folder.holds(text)) {
      const how = 'Give another folder with --out to compute it once more, or --again to replace it.';
      if (!options.quiet && !options.partial) process.stdout.write(`${path} holds this very run, done ${folder.record.ended}. ${how}\n`);
      return 0;
    }
    const beginning = { caseText: text, title: panel.title, seed: panel.gas.seed, frames: options.frames, derived, version: version() };
    const resume = await beginOrResume(folder, path, beginning, options);
    return await compute(folder, path, { panel, derived }, resume, options);
  } finally {
    await folder.release();
  }
}

/** The checkpoint to go on from, undefined for a start from nothing. */
async function beginOrResume(folder: RunFolder, path: string, beginning: Beginning, options: RunOptions): Promise<Checkpoint | undefined> {
  if (folder.record !== undefined && !options.again) {
    if (!folder.holds(beginning.caseText)) {
      const held = `a run of another case (${folder.record.title}, ${folder.record.status})`;
      throw new OutputError(path, `${path} holds ${held}; it was kept. Give another folder with --out, or --again to replace it`);
    }
    const { checkpoint, notes } = await folder.resume(beginning);
    const from =
      checkpoint === undefined
        ? 'starts over, for it has no checkpoint to go on from'
        : `goes on from ${plain(checkpoint.step * beginning.derived.dt_s)} s`;
    const begun = folder.record?.frames;
    if (begun !== options.frames) notes.push(`frames: ${begun}, as the run was begun with`);
    if (!options.quiet) process.stderr.write([...notes, `the run in ${path} ${from}`].map((line) => `${line}\n`).join(''));
    return checkpoint;
  }
  await folder.begin(beginning);
  const { nx, ny, steps } = beginning.derived;
  const what = `${nx} x ${ny} cells, ${steps} steps, into ${path}`;
  if (!options.quiet && !options.partial) process.stderr.write(`${beginning.title}: ${what}. Ctrl-C stops it and says how to go on\n`);
  return undefined;
}

/** Simulates, writes all files and says how it went. Whatever happens, run.json tells the truth when it returns or throws. */
async function compute(
  folder: RunFolder,
  path: string,
  laid: { panel: Case; derived: Derived },
  resume: Checkpoint | undefined,
  options: RunOptions,
): Promise<number> {
  const view = progressView(process.stderr, options.quiet);
  const interrupt = catchInterrupts(() => {
    if (!options.quiet) process.stderr.write('\nstopping: the files are being finished; once more ends at once\n');
  });
  let sure = laid.panel.record.until === undefined ? undefined : '';
  try {
    const recording = await simulate(laid.panel, {
      ...(resume === undefined ? {} : { resume }),
      ...frameHooks(folder, laid),
      onProgress: (progress) => {
        view.update(progress, sure);
        folder.progress(progress);
      },
      sureEnough: (soFar) => {
        const found = surenessOf(soFar);
        sure = sureLine(found);
        return allSure(found);
      },
      threads: options.threads ?? availableParallelism(),
      checkpointEvery_s: options.checkpoint_s,
      onCheckpoint: (checkpoint) => folder.writeCheckpoint(checkpoint),
      signal: interrupt.signal,
    });
    view.end();
    const measures = measure(recording);
    await folder.writeResults(recording, measures);
    await folder.end({ status: recording.complete ? 'done' : 'stopped' });
    if (!recording.complete) {
      process.stderr.write(stoppedPage(recording, path, options));
      return interrupt.exit() ?? 1;
    }
    const taken = duration(folder.record?.timeTaken_s ?? 0);
    const page = [`${laid.panel.title}: done in ${taken}`, summaryPage(measures), files(path, options), CAUTION].join('\n');
    if (!options.quiet && !options.partial) process.stdout.write(`${page}\n`);
    return 0;
  } catch (error) {
    view.end();
    await fail(folder, error);
    throw error;
  } finally {
    interrupt.release();
  }
}

/** Frames from the start to the end, as many as the run was begun with, numbered by their place in it so that a resumed one goes on counting. */
function frameHooks(folder: RunFolder, { panel, derived }: { panel: Case; derived: Derived }): Hooks {
  const frames = folder.record?.frames ?? 0;
  if (frames === 0) return {};
  const every = Math.max(1, Math.floor(derived.steps / (frames - 1)));
  const paint = framePainter({ case: panel, derived });
  return {
    frameEvery_s: every * derived.dt_s,
    onFrame: (snapshot) => {
      const index = Math.round(snapshot.time_s / derived.dt_s / every);
      return folder.writeFrame(index, paint(snapshot));
    },
  };
}

/** Marks the run as failed. Where even that cannot be written the first error stands. */
async function fail(folder: RunFolder, error: unknown): Promise<void> {
  try {
    await folder.end({ status: 'failed', error: error instanceof Error ? error : new Error(String(error)) });
  } catch {
    // the disk that would not take a result may not take this either; the caller throws what came first
  }
}

/** Where to look first. */
function files(path: string, { frames }: RunOptions): string {
  return `files: ${path}; look at shear-map-left.png, shear-map-right.png${frames > 0 ? ' and frames/' : ''} first, summary.json holds every answer`;
}

function stoppedPage({ history }: Recording, path: string, { words }: RunOptions): string {
  const reached = plain(history.time_s.at(-1) ?? 0);
  return `stopped at ${reached} s; the files so far and a checkpoint are in ${path}. To go on:\n  ${commandToGoOn(words)}\n`;
}
