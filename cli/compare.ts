import { existsSync, statSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { join, resolve } from 'node:path';
import { layOut, readCase } from '../cases/index.ts';
import {
  ANSWERS,
  comparison,
  each,
  geometryKey,
  grouped,
  groupName,
  holdsFinished,
  openComparison,
  readRun,
  runCase,
  writeComparison,
} from '../output/index.ts';
import { UsageError } from '../solver/index.ts';
import { comparePage } from './comparepage.ts';
import { type Job, runJobs } from './jobs.ts';
import { readSource } from './source.ts';
import { commandToGoOn, suggestion } from './words.ts';

/** What the command line asks of a comparison. */
export interface CompareOptions {
  /** run folders, case files, ready-made cases */
  words: string[];
  by: string;
  sets: string[];
  /** runs of each case, with seeds counted up from its own; undefined: one */
  seeds: number | undefined;
  /** folder for the comparison */
  out: string | undefined;
  /** processes side by side; undefined: as many as cores */
  atOnce: number | undefined;
  quiet: boolean;
  /** the words after `swathe`, to say how to go on */
  given: readonly string[];
}

/** Pictures of the run with the case's own seed, as swathe run makes them. */
const OWN_FRAMES = 25;

/** A run that takes part, there or to be computed. */
interface Part {
  /** of the geometry */
  name: string;
  folder: string;
  key: string;
  /** to be computed with, undefined where the folder holds the finished run */
  job: Job | undefined;
}

/**
 * Ranks geometries by one measure and says which differences are more than chance; of one geometry alone, its runs. Runs that are not
 * there are computed first, each in a process of its own. Returns the exit code: that of a run that failed or of an interrupt, else 0 whatever the verdicts.
 */
export async function compare(options: CompareOptions): Promise<number> {
  const { by, quiet } = options;
  if (!ANSWERS.includes(by))
    throw new UsageError('by', `--by ${by}: no measure has that name${suggestion(by, ANSWERS)}. There are ${ANSWERS.join(', ')}`);
  const parts = await partsOf(options);
  const names = namesOf(parts);
  const apart = oneGeometry(parts);
  const out =
    options.out ?? join('runs', `compare-${names.slice(0, 3).join('-')}${names.length > 3 ? `-and-${names.length - 3}-more` : ''}`);
  await openComparison(out);
  const exit = await compute(parts, options);
  if (exit !== 0) return exit;
  const runs = await Promise.all(parts.map(async ({ name, folder }) => ({ name, run: await readRun(folder) })));
  const found = comparison(apart ? each(runs) : grouped(runs), by);
  await writeComparison(out, found);
  if (!quiet) process.stdout.write(`${comparePage(found, out)}\n`);
  return 0;
}

async function partsOf({ words, sets, seeds }: CompareOptions): Promise<Part[]> {
  const found = await Promise.all(words.map((word) => (isFolder(word) ? folderPart(word) : caseParts(word, sets, seeds ?? 1))));
  if (words.every(isFolder) && (seeds !== undefined || sets.length > 0)) {
    const option = seeds === undefined ? 'set' : 'seeds';
    throw new UsageError(option, `--${option} is for cases, and only folders of runs are given; give cases, or leave it out`);
  }
  // a case named twice, or beside the folder of one of its runs, takes part once
  return [...new Map(found.flat().map((part) => [resolve(part.folder), part])).values()];
}

/** @throws UsageError fewer than two */
function namesOf(parts: readonly Part[]): string[] {
  if (parts.length < 2)
    throw new UsageError(
      '',
      `compare needs two runs at least, and there is one, ${parts[0].name}; name another case or folder, or add --seeds`,
    );
  const names = new Map(parts.map(({ key, name }) => [key, name]));
  return [...names.values()].map((name) => name.replaceAll(/[^\w.-]+/g, '_'));
}

/** Then its runs are held against each other. */
function oneGeometry(parts: readonly Part[]): boolean {
  return new Set(parts.map(({ key }) => key)).size === 1;
}

function isFolder(word: string): boolean {
  return existsSync(word) && statSync(word).isDirectory();
}

async function folderPart(folder: string): Promise<Part[]> {
  const text = await runCase(folder);
  const panel = readCase(text, join(folder, 'case.yaml'));
  const name = groupName(resolve(folder));
  const task = { caseFile: join(folder, 'case.yaml'), sets: [], folder, again: false };
  const job = { label: folder, task, frames: 0, updates: updatesOf(panel) };
  return [{ name, folder, key: geometryKey(panel), job: (await holdsFinished(folder, text)) ? undefined : job }];
}

/** The runs of one case: its own seed in the folder that `swathe run` takes, the further ones beside it. */
async function caseParts(word: string, sets: string[], seeds: number): Promise<Part[]> {
  const { name, panel } = readSource(word, sets);
  const first = panel.gas.seed;
  return Promise.all(
    Array.from({ length: seeds }, async (_, i): Promise<Part> => {
      const folder = join('runs', i === 0 ? name : `${name}-seed-${first + i}`);
      const own = i === 0 ? sets : [...sets, `gas.seed=${first + i}`];
      const task = { caseFile: word, sets: own, folder, again: false };
      const job = { label: `${name}, seed ${first + i}`, task, frames: i === 0 ? OWN_FRAMES : 0, updates: updatesOf(panel) };
      const { text } = readSource(word, own);
      return { name, folder, key: geometryKey(panel), job: (await holdsFinished(folder, text)) ? undefined : job };
    }),
  );
}

function updatesOf(panel: Parameters<typeof layOut>[0]): number {
  const { nx, ny, steps } = layOut(panel).derived;
  return nx * ny * steps;
}

/** Computes what is not there. Returns 0, or the exit code of what went wrong; then all others were given their chance. */
async function compute(parts: readonly Part[], { quiet, given, ...options }: CompareOptions): Promise<number> {
  const jobs = parts.flatMap(({ job }) => (job === undefined ? [] : [job]));
  if (jobs.length === 0) return 0;
  const atOnce = Math.min(jobs.length, options.atOnce ?? availableParallelism());
  const say = (line: string): void => {
    if (!quiet) process.stderr.write(`${line}\n`);
  };
  const there = parts.length - jobs.length;
  say(`${jobs.length} ${jobs.length === 1 ? 'run' : 'runs'} to compute, ${atOnce} at once${there === 0 ? '' : `; ${there} already there`}`);
  const { exit, stopped } = await runJobs(jobs, atOnce, say);
  if (stopped) {
    process.stderr.write(`stopped; finished runs and checkpoints are kept. To go on:\n  ${commandToGoOn(given)}\n`);
  } else if (exit !== 0) {
    const rest = 'Finished runs are kept: the same command computes what is missing, and their folders can be compared without the rest';
    process.stderr.write(`${rest}, as in swathe compare ${parts[0].folder} ${parts[parts.length - 1].folder}\n`);
  }
  return exit;
}
