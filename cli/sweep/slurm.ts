import { hostname } from 'node:os';
import { fileURLToPath } from 'node:url';
import { execa } from 'execa';
import type { Plan } from '../../cases/index.ts';
import { finishedBeside, isFinished, mayPass, pointHash, type SweepFolder, type SweepState } from '../../output/index.ts';
import { OutputError, UsageError } from '../../solver/index.ts';
import { version } from '../version.ts';
import { shellWord } from '../words.ts';
import { chunks, ranges } from './arrays.ts';
import { Standing } from './standing.ts';

/** What a task of the cluster gets. */
export interface SlurmOptions {
  partition: string | undefined;
  cpus: number;
  memory_bytes: number | undefined;
  /** wall time of one sitting; what is not finished by then writes a checkpoint and queues again */
  time_s: number | undefined;
  /** tasks at a time; undefined: as many as the cluster lets run */
  atOnce: number | undefined;
  /** failed cases are tried again, whatever they failed of */
  retry: boolean;
  /** options of every case, as words of the command line */
  words: readonly string[];
  quiet: boolean;
}

const MAIN = fileURLToPath(new URL('../main.js', import.meta.url));

/** Before the end of its time a task is warned so early: enough to write a checkpoint, s; at most half of its time. */
const WARNING_S = 120;
/** Indices of an array where the cluster does not say how many it takes: the value that Slurm comes with. */
const ARRAY_SIZE = 1001;

/** Hands what is missing of a sweep to Slurm: job arrays, and a job after them that gathers the table. Returns the exit code. */
export async function submit(plan: Plan, folder: SweepFolder, options: SlurmOptions): Promise<number> {
  await checkPartition(options);
  const hold = await folder.take();
  try {
    const state = await folder.state();
    const waiting = await queued(state?.jobs ?? []);
    if (waiting.length > 0) {
      const jobs = (state?.jobs ?? []).join(', ');
      throw new OutputError(
        folder.path,
        `${folder.path}: the sweep is on the cluster already (jobs ${jobs}); see how it stands with --status, or end it with --cancel`,
      );
    }
    const missing = await missingPoints(plan, folder, options.retry);
    const jobs: string[] = [];
    for (const { offset, indices } of chunks(missing, await arraySize())) {
      const last = jobs.at(-1);
      // %n counts in one array only, so arrays of a large plan run one after the other
      const after = last === undefined ? [] : [`--dependency=afterany:${last}`];
      const spread = `${ranges(indices)}${options.atOnce === undefined ? '' : `%${options.atOnce}`}`;
      jobs.push(await sbatch([`--array=${spread}`, ...after, ...resources(folder, options)], taskScript(folder, offset, options.words)));
    }
    const after = jobs.length === 0 ? [] : [`--dependency=afterany:${jobs.join(':')}`];
    const where = options.partition === undefined ? [] : [`--partition=${options.partition}`];
    const gather = ['--job-name=swathe-table', `--output=${folder.logs}/table-%j.log`, ...where, ...after];
    jobs.push(await sbatch(gather, script([...ownWords(folder), '--gather', '--quiet'])));
    await folder.writeState(submitted(plan, jobs));
    if (!options.quiet) {
      process.stdout.write(
        `${plan.title}: ${missing.length} of ${plan.points.length} cases submitted (jobs ${jobs.join(', ')}; the last one gathers the table)\n` +
          `how it stands: swathe sweep ${shellWord(folder.path)} --status; what is missing afterwards: the same command again\n`,
      );
    }
    return 0;
  } finally {
    await hold.release();
  }
}

/** Takes all jobs of a sweep off the cluster; running cases write their checkpoints. */
export async function cancel(folder: SweepFolder): Promise<void> {
  const jobs = (await folder.state())?.jobs ?? [];
  const waiting = await queued(jobs);
  if (waiting.length > 0) await slurm('scancel', jobs);
  process.stdout.write(waiting.length > 0 ? `cancelled: jobs ${jobs.join(', ')}\n` : 'nothing of this sweep is on the cluster\n');
}

/** Puts this task back into the queue, to go on from its checkpoint. Outside of a job nothing happens. */
export async function requeue(): Promise<void> {
  const { SLURM_ARRAY_JOB_ID: array, SLURM_ARRAY_TASK_ID: index, SLURM_JOB_ID: own } = process.env;
  // one task of an array goes by the number of the array itself, which stands for all of them
  const job = array !== undefined && index !== undefined ? `${array}_${index}` : own;
  if (job !== undefined) await slurm('scontrol', ['requeue', job]);
}

function submitted(plan: Plan, jobs: string[]): SweepState {
  return {
    status: 'submitted',
    title: plan.title,
    engine: 'slurm',
    points: plan.points.length,
    process: { pid: process.pid, host: hostname() },
    updated: new Date().toISOString(),
    updatesPerSecond: null,
    left_s: null,
    jobs,
  };
}

/** Numbers of the points to run: open ones, and failed ones that are to be tried again. What is computed beside is taken over at once. */
async function missingPoints(plan: Plan, folder: SweepFolder, retry: boolean): Promise<number[]> {
  const standing = await Standing.read(plan, folder);
  for (const { number } of standing.with('failed')) {
    const state = standing.states[number - 1];
    if (state.status === 'failed' && (retry || mayPass(state.failure))) {
      await folder.forgive(number);
      await standing.look(number);
    }
  }
  const finished = await finishedBeside(folder.path, version());
  for (const point of finished.size === 0 ? [] : standing.with('open')) {
    const hash = pointHash(plan, point);
    const run = finished.get(hash);
    if (run === undefined || standing.states[point.number - 1].record !== undefined || !(await isFinished(run, hash, version()))) continue;
    await folder.adopt(point.number, run);
    await standing.look(point.number);
  }
  return standing.with('open').map(({ number }) => number);
}

function ownWords(folder: SweepFolder): string[] {
  return [process.execPath, MAIN, 'sweep', folder.path];
}

function script(words: readonly string[]): string {
  return `#!/bin/sh\nexec ${words.map(shellWord).join(' ')}\n`;
}

/** `exec`, so that signals reach the task itself. */
function taskScript(folder: SweepFolder, offset: number, words: readonly string[]): string {
  const start = ownWords(folder).map(shellWord).join(' ');
  return `#!/bin/sh\nexec ${start} --point $((SLURM_ARRAY_TASK_ID + ${offset})) ${words.map(shellWord).join(' ')}\n`;
}

function resources(folder: SweepFolder, { partition, cpus, memory_bytes, time_s }: SlurmOptions): string[] {
  const minutes = time_s === undefined ? undefined : Math.max(1, Math.ceil(time_s / 60));
  const warning_s = minutes === undefined ? WARNING_S : Math.min(WARNING_S, 30 * minutes);
  return [
    '--job-name=swathe',
    `--cpus-per-task=${cpus}`,
    `--signal=B:USR1@${warning_s}`,
    '--requeue',
    '--open-mode=append',
    `--output=${folder.logs}/%A_%a.log`,
    ...(partition === undefined ? [] : [`--partition=${partition}`]),
    ...(memory_bytes === undefined ? [] : [`--mem=${Math.ceil(memory_bytes / 2 ** 20)}`]),
    ...(minutes === undefined ? [] : [`--time=${minutes}`]),
  ];
}

/** The id of the job that `text` became. */
async function sbatch(options: readonly string[], text: string): Promise<string> {
  return (await slurm('sbatch', ['--parsable', ...options], text)).split(';')[0].trim();
}

/** The ids of those jobs that are still queued or running. */
async function queued(jobs: readonly string[]): Promise<string[]> {
  if (jobs.length === 0) return [];
  const { stdout, exitCode } = await execa('squeue', ['--noheader', '--format=%i', `--jobs=${jobs.join(',')}`], { reject: false });
  // jobs the cluster has forgotten are no error to us
  return exitCode === 0 ? stdout.split('\n').filter((line) => line !== '') : [];
}

async function arraySize(): Promise<number> {
  const found = /MaxArraySize\s*=\s*(\d+)/.exec(await slurm('scontrol', ['show', 'config']));
  return found === null ? ARRAY_SIZE : Number(found[1]);
}

/** The cluster takes a task that no node has the cores for, and lets it wait for ever. */
async function checkPartition({ partition, cpus }: SlurmOptions): Promise<void> {
  const where = partition === undefined ? [] : [`--partition=${partition}`];
  const text = await slurm('sinfo', ['--noheader', '--format=%c', ...where]);
  const most = Math.max(0, ...text.split('\n').map((line) => Number.parseInt(line, 10) || 0));
  if (most === 0) throw new UsageError('partition', `--partition ${partition}: the cluster has no such partition; sinfo lists them`);
  if (cpus > most) throw new UsageError('cpus', `--cpus ${cpus}: no node there has more than ${most}, and the tasks would wait for ever`);
}

/** @throws UsageError the command is not there, or refuses */
async function slurm(command: string, words: readonly string[], input = ''): Promise<string> {
  const { stdout, stderr, exitCode, code } = await execa(command, words, { input, reject: false });
  if (exitCode === 0) return stdout;
  if (code === 'ENOENT') throw new UsageError('engine', `--engine slurm: ${command} is not found here; log in where jobs are submitted`);
  throw new UsageError('engine', `${command} ${words.join(' ')} failed: ${stderr.replace(/\s+/g, ' ').trim()}`);
}
