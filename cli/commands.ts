import yargs from 'yargs';
import { UsageError } from '../solver/index.ts';
import { OPTIONS } from './options.ts';
import { version } from './version.ts';
import { numberWithin, required, rewordComplaint, single } from './words.ts';

const CASE = { type: 'string', describe: 'a case file (YAML), or the name of a ready-made case' } as const;
const PLAN = { type: 'string', describe: 'a plan file (YAML), or the folder of a sweep' } as const;
const NAME = { type: 'string', describe: 'a ready-made case' } as const;
const RUNS = {
  type: 'string',
  array: true,
  describe: 'run folders, case files (YAML) or ready-made cases, two at least',
} as const;

/** Pictures a run may ask for: more fill a disk and help nobody. */
const FRAMES = { least: 2, most: 10_000, whole: true };
/** More threads than this no box has rows for. */
const THREADS = { least: 1, most: 64, whole: true };
/** Seconds between checkpoints: writing them more often takes longer than the run, more seldom loses hours. */
const CHECKPOINT = { least: 0.01, most: 3600, whole: false };
/** Pictures of each case of a sweep, and cases at a time. */
const SWEEP_FRAMES = { least: 0, most: 10_000, whole: true };
const POINT = { least: 1, most: 100_000, whole: true };
const AT_ONCE = { least: 1, most: 1000, whole: true };
/** Percent of a value that an error of the grid may have. */
const WITHIN = { least: 0.1, most: 50, whole: false };
/** Runs of one case: three are the least whose spread tells something, more than hundreds a sweep is for. */
const SEEDS = { least: 1, most: 100, whole: true };

const CAUTION =
  'Results are for screening, not for design. Compressed air, chemicals and lifting modules can hurt people: ' +
  'bench trials, local codes and licensed practice come first.';

/** Reads the words after `swathe`, does what they say and returns the exit code. A command's work is loaded when it is asked for. */
export async function commandLine(words: string[]): Promise<number> {
  let exit = 0;
  const parser = yargs(words)
    .scriptName('swathe')
    .locale('en')
    .parserConfiguration({
      'boolean-negation': false,
      'camel-case-expansion': false,
      'dot-notation': false,
      'greedy-arrays': false,
      'parse-numbers': false,
      'parse-positional-numbers': false,
      'short-option-groups': false,
    })
    .exitProcess(false)
    .usage('Simulates air bubbles scouring flat-sheet membranes and says how much of the surface they sweep.\n\n$0 <command>')
    .command(
      'run [case]',
      'run a case into a run folder; goes on where an unfinished run stopped',
      (builder) =>
        builder
          .positional('case', CASE)
          .options(OPTIONS.run)
          .example('$0 run tilted-panel', 'a ready-made case')
          .example('$0 run my.yaml --set channel.tilt="10 deg" --out runs/ten', 'a case file with one value changed'),
      async (args) => {
        const word = required('run', args.case);
        const frames = args['no-frames'] ? 0 : numberWithin('frames', single('frames', args.frames) ?? '', FRAMES);
        const checkpoint_s = numberWithin('checkpoint', single('checkpoint', args.checkpoint) ?? '', CHECKPOINT);
        const threads = args.threads === undefined ? undefined : numberWithin('threads', single('threads', args.threads) ?? '', THREADS);
        const out = single('out', args.out);
        const { run } = await import('./run.ts');
        exit = await run({ word, sets: args.set ?? [], out, again: args.again, frames, threads, checkpoint_s, quiet: args.quiet, words });
      },
    )
    .command(
      'check [case]',
      'read and check a case: what will be computed, how long it takes, where its limits lie',
      (builder) => builder.positional('case', CASE).options(OPTIONS.check),
      async (args) => {
        const word = required('check', args.case);
        const { check } = await import('./check.ts');
        await check({ word, sets: args.set ?? [], json: args.json });
      },
    )
    .command(
      'refine [case]',
      'run a case on three grids and say how far each measure is from one without grid',
      (builder) =>
        builder
          .positional('case', CASE)
          .options(OPTIONS.refine)
          .example('$0 refine tilted-panel --grids 24,32,48', 'a ready-made case on grids of your choice'),
      async (args) => {
        const word = required('refine', args.case);
        const grids = single('grids', args.grids);
        const within = numberWithin('within', (single('within', args.within) ?? '').replace(/ ?%$/, ''), WITHIN) / 100;
        const checkpoint_s = numberWithin('checkpoint', single('checkpoint', args.checkpoint) ?? '', CHECKPOINT);
        const out = single('out', args.out);
        const { refine } = await import('./refine.ts');
        exit = await refine({ word, sets: args.set ?? [], grids, within, out, again: args.again, checkpoint_s, quiet: args.quiet, words });
      },
    )
    .command(
      'sweep [plan]',
      'run many cases from one plan, as many at a time as there are cores; one table of all',
      (builder) =>
        builder
          .positional('plan', PLAN)
          .options(OPTIONS.sweep)
          .example('$0 sweep plan.yaml --list', 'the cases and the expected time')
          .example('$0 sweep plan.yaml', 'run them, or go on with what is missing'),
      async (args) => {
        const word = required('sweep', args.plan);
        const atOnce = single('at-once', args['at-once']);
        const point = single('point', args.point);
        const { sweep } = await import('./sweep/sweep.ts');
        exit = await sweep({
          word,
          out: single('out', args.out),
          list: args.list,
          status: args.status,
          engine: single('engine', args.engine) ?? '',
          partition: single('partition', args.partition),
          cpus: numberWithin('cpus', single('cpus', args.cpus) ?? '', AT_ONCE),
          time: single('time', args.time),
          cancel: args.cancel,
          point: point === undefined ? undefined : numberWithin('point', point, POINT),
          gather: args.gather,
          atOnce: atOnce === undefined ? undefined : numberWithin('at-once', atOnce, AT_ONCE),
          memory: single('memory', args.memory),
          limit: single('limit', args.limit),
          keepFree: single('keep-free', args['keep-free']) ?? '',
          retry: args.retry,
          frames: numberWithin('frames', single('frames', args.frames) ?? '', SWEEP_FRAMES),
          checkpoint_s: numberWithin('checkpoint', single('checkpoint', args.checkpoint) ?? '', CHECKPOINT),
          quiet: args.quiet,
        });
      },
    )
    .command(
      'compare [runs..]',
      'rank geometries by a measure and say which differences are more than chance',
      (builder) =>
        builder
          .positional('runs', RUNS)
          .options(OPTIONS.compare)
          .example('$0 compare tilted-panel vertical-panel --seeds 4', 'computes four runs of each, then compares them')
          .example('$0 compare runs/*', 'finished runs; those that differ in nothing but the seed are put together'),
      async (args) => {
        const runs = args.runs ?? [];
        if (runs.length === 0)
          throw new UsageError('', 'compare needs runs or cases, as in swathe compare tilted-panel vertical-panel --seeds 4');
        const by = single('by', args.by) ?? '';
        const seeds = single('seeds', args.seeds);
        const atOnce = single('at-once', args['at-once']);
        const out = single('out', args.out);
        const { compare } = await import('./compare.ts');
        exit = await compare({
          words: runs,
          by,
          sets: args.set ?? [],
          seeds: seeds === undefined ? undefined : numberWithin('seeds', seeds, SEEDS),
          out,
          atOnce: atOnce === undefined ? undefined : numberWithin('at-once', atOnce, AT_ONCE),
          quiet: args.quiet,
          given: words,
        });
      },
    )
    .command(
      'gallery [name]',
      'list the ready-made cases, print one, or copy one or all into a folder',
      (builder) => builder.positional('name', NAME).options(OPTIONS.gallery),
      async (args) => {
        const copy = single('copy', args.copy);
        const { gallery } = await import('./gallery.ts');
        gallery({ name: args.name, copy });
      },
    )
    .command(
      'schema',
      'print the JSON Schema of case files, for completion in editors',
      (builder) => builder.options(OPTIONS.schema),
      async (args) => {
        const out = single('out', args.out);
        const { schema } = await import('./schema.ts');
        schema({ out });
      },
    )
    .demandCommand(1, 'no command given')
    .strict()
    // the parser makes the help of every command it runs; laying it out in lines takes a tenth of a second and more
    .wrap(words.includes('--help') ? 100 : null)
    .version(version())
    .epilogue(CAUTION)
    .fail((message, error) => {
      // the parser's own complaints come as errors here and as messages there
      const complaint = message ?? (error.name === 'YError' ? error.message : undefined);
      throw complaint === undefined ? error : rewordComplaint(complaint, words);
    });
  await parser.parseAsync();
  return exit;
}
