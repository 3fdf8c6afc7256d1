import type { Options } from 'yargs';

const SET = {
  type: 'string',
  array: true,
  requiresArg: true,
  describe: 'change one value of the case, as in --set gas.supply="0.3 m3/(m2 h)"; may be repeated',
} as const satisfies Options;

/** The options of each command: the parser, the help and the near misses are made from this table. */
export const OPTIONS = {
  run: {
    set: SET,
    out: { type: 'string', requiresArg: true, describe: 'run folder; runs/<name of the case> without it' },
    again: { type: 'boolean', default: false, describe: 'start anew in a folder that holds a run; its results are lost' },
    frames: { type: 'string', requiresArg: true, default: '25', describe: 'about so many pictures, from the start to the end of the run' },
    'no-frames': { type: 'boolean', default: false, describe: 'no pictures of the channel' },
    threads: { type: 'string', requiresArg: true, describe: 'threads to compute with; as many as there are cores without it' },
    checkpoint: { type: 'string', requiresArg: true, default: '10', describe: 'seconds of wall time between checkpoints' },
    quiet: { type: 'boolean', default: false, describe: 'say nothing but errors' },
  },
  check: {
    set: SET,
    json: { type: 'boolean', default: false, describe: 'as JSON' },
  },
  refine: {
    set: SET,
    grids: { type: 'string', requiresArg: true, describe: "three numbers of cells across; the case's own and two coarser without it" },
    within: { type: 'string', requiresArg: true, default: '5 %', describe: 'error of the grid that counts as converged' },
    out: { type: 'string', requiresArg: true, describe: 'folder for the three runs; runs/<name of the case>-refine without it' },
    again: { type: 'boolean', default: false, describe: 'start anew in a folder that holds a refinement; its results are lost' },
    checkpoint: { type: 'string', requiresArg: true, default: '10', describe: 'seconds of wall time between checkpoints' },
    quiet: { type: 'boolean', default: false, describe: 'say nothing but errors' },
  },
  sweep: {
    list: { type: 'boolean', default: false, describe: 'print the cases and the expected time, run nothing' },
    status: { type: 'boolean', default: false, describe: 'say how a sweep stands, from this or another shell' },
    out: { type: 'string', requiresArg: true, describe: 'folder of the sweep; runs/<name of the plan> without it' },
    engine: { type: 'string', requiresArg: true, default: 'local', describe: 'local: the cores of this machine; slurm: a cluster' },
    'at-once': { type: 'string', requiresArg: true, describe: 'cases at a time; without it as many as there are cores, or as Slurm lets' },
    limit: { type: 'string', requiresArg: true, describe: 'wall time a case may take, as in "2 h"' },
    memory: { type: 'string', requiresArg: true, describe: 'memory a case may have, as in "500 MB"; its part of the machine without it' },
    'keep-free': { type: 'string', requiresArg: true, default: '500 MB', describe: 'stop before less than this is free on the disk' },
    partition: { type: 'string', requiresArg: true, describe: 'Slurm: where the tasks run' },
    cpus: { type: 'string', requiresArg: true, default: '1', describe: 'Slurm: cores of a task' },
    time: { type: 'string', requiresArg: true, describe: 'Slurm: time of one sitting of a task; unfinished it queues again, as in "4 h"' },
    cancel: { type: 'boolean', default: false, describe: 'Slurm: take the sweep off the cluster' },
    point: { type: 'string', requiresArg: true, describe: 'run this one point, as a task of a cluster does' },
    gather: { type: 'boolean', default: false, describe: 'write table and pictures from what has been computed' },
    retry: { type: 'boolean', default: false, describe: 'try failed cases again, whatever they failed of' },
    frames: { type: 'string', requiresArg: true, default: '0', describe: 'pictures of the channel in each run' },
    checkpoint: { type: 'string', requiresArg: true, default: '10', describe: 'seconds of wall time between checkpoints' },
    quiet: { type: 'boolean', default: false, describe: 'say nothing but errors' },
  },
  compare: {
    by: {
      type: 'string',
      requiresArg: true,
      default: 'swept_together',
      describe: 'measure to rank by, a name from the answers in summary.json',
    },
    seeds: { type: 'string', requiresArg: true, describe: 'runs of each case, with seeds counted up from its own; one without it' },
    set: SET,
    out: { type: 'string', requiresArg: true, describe: 'folder for the comparison; runs/compare-<names> without it' },
    'at-once': { type: 'string', requiresArg: true, describe: 'runs to compute side by side; as many as cores without it' },
    quiet: { type: 'boolean', default: false, describe: 'say nothing but errors' },
  },
  gallery: {
    copy: { type: 'string', requiresArg: true, describe: 'folder to copy to; files that are there are kept' },
  },
  schema: {
    out: { type: 'string', requiresArg: true, describe: 'file to write to' },
  },
} as const satisfies Record<string, Record<string, Options>>;

/** Names of the commands, and of the options of one. */
export const commandNames = Object.keys(OPTIONS);
export function optionNames(command: string | undefined): string[] {
  const own = command !== undefined && command in OPTIONS ? Object.keys(OPTIONS[command as keyof typeof OPTIONS]) : [];
  return [...own, 'help', 'version'];
}
