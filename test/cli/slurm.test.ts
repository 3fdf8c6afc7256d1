import { existsSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { chunks, ranges } from '../../cli/sweep/arrays.ts';
import { Cluster, noCluster } from './cluster.ts';
import { Bench } from './swathe.ts';
import { FINNED, PIECE, PLAN, PLAN24, rowsOf, SLOW, timeless, until } from './sweeps.ts';

const reason = noCluster();
/** Points of the plan that is compared with the local engine. */
const POINTS = SLOW ? 24 : 12;
const bench = new Bench();
bench.file('piece.yaml', PIECE);
bench.file('finned.yaml', FINNED);
afterAll(() => bench.remove());

describe('the arrays of a large sweep', () => {
  it('hold each point once, with indices below what the cluster takes', () => {
    const numbers = [1, 2, 3, 9, 10, 11, 25];
    const found = chunks(numbers, 10);
    expect(found).toEqual([
      { offset: 0, indices: [1, 2, 3, 9] },
      { offset: 10, indices: [0, 1] },
      { offset: 20, indices: [5] },
    ]);
    expect(found.flatMap(({ offset, indices }) => indices.map((index) => offset + index))).toEqual(numbers);
  });

  it('are written with ranges', () => {
    expect(ranges([1, 2, 3, 7, 9, 10])).toBe('1-3,7,9-10');
    expect(ranges([])).toBe('');
  });
});

describe.skipIf(reason !== undefined)(`a sweep on Slurm${reason === undefined ? '' : ` (left out: ${reason})`}`, () => {
  const cluster = new Cluster();
  beforeAll(async () => {
    await cluster.start();
    process.env.SLURM_CONF = cluster.configuration;
  }, 120_000);
  afterAll(async () => {
    delete process.env.SLURM_CONF;
    await cluster.stop();
  }, 60_000);

  const queue = (): string => cluster.command('squeue', '--noheader', '--array', '--format=%F_%K %T');
  /** Wall time between looks at the queue, ms: asked all the time, the daemons have no answer any more. */
  const LOOK_MS = 1000;
  /** Looks for which a task put back is left alone: one that starts in the second it was put back in is refused by the node. */
  const LEFT_ALONE = 5;
  const looks = new Map<string, number>();
  /** A task put back waits two minutes before it starts anew; the tests do not. */
  const hurry = (job: string): void => {
    // looked up in the whole queue: a job that has ended is soon unknown
    const reasons = cluster.command('squeue', '--noheader', '--array', '--format=%F_%K %r');
    if (!reasons.split('\n').some((line) => line.startsWith(`${job} BeginTime`))) return;
    const seen = (looks.get(job) ?? 0) + 1;
    looks.set(job, seen);
    if (seen === LEFT_ALONE) cluster.command('scontrol', 'update', `JobId=${job}`, 'StartTime=now');
  };
  const ON_SLURM = ['--engine', 'slurm', '--partition', 'bench', '--at-once', '2', '--memory', '300 MB', '--checkpoint', '0.05'];

  it('gives the table of the local engine, with one task cancelled and one put back midway, in more than one array', async () => {
    // ten points to an array
    const plan = SLOW ? PLAN24 : PLAN.replace('7 mm, 8 mm, 9 mm', '7 mm, 7.5 mm, 8 mm, 8.5 mm, 9 mm, 9.5 mm');
    bench.file('plan.yaml', plan.replace('base:', 'set: {record.span: 250 ms}\nbase:'));
    const jobs = SLOW ? '(\\d+, ){3}\\d+' : '(\\d+, ){2}\\d+';
    const submitted = await bench.swathe('sweep', 'plan.yaml', '--out', 'cluster/plan', ...ON_SLURM);
    expect(submitted.error).toBe('');
    expect(submitted.out).toMatch(
      new RegExp(`: ${POINTS} of ${POINTS} cases submitted \\(jobs ${jobs}; the last one gathers the table\\)`),
    );
    const [first] = /jobs (\d+)/.exec(submitted.out)?.slice(1) ?? [];

    // at once, for the checkpoint is gone when the case ends
    await until(() => existsSync(bench.path('cluster/plan/points/0001/checkpoint-a.bin')), 300_000);
    cluster.command('scontrol', 'requeue', `${first}_1`);
    cluster.command('scancel', `${first}_5`);
    expect(queue().match(/RUNNING/g)?.length ?? 0).toBeLessThanOrEqual(2);
    const twice = await bench.swathe('sweep', 'plan.yaml', '--out', 'cluster/plan', ...ON_SLURM);
    expect(twice.exit).toBe(4);
    expect(twice.error).toMatch(
      /the sweep is on the cluster already \(jobs .*\); see how it stands with --status, or end it with --cancel/,
    );
    const { out, error } = await bench.swathe('sweep', 'cluster/plan', '--status');
    expect(error).toBe('');
    expect(out).toMatch(new RegExp(`^on Slurm: jobs ${jobs}$`, 'm'));
    await until(
      () => {
        if (queue() !== '') hurry(`${first}_1`);
        return queue() === '';
      },
      900_000,
      LOOK_MS,
    );
    const statuses = rowsOf(bench, 'cluster/plan').map(({ status }) => status);
    expect(statuses.filter((status) => status === 'done')).toHaveLength(POINTS - 1);
    expect(statuses[4]).toBe('open');
    expect((bench.json('cluster/plan/points/0001/run.json').notes as string[]).join()).toContain('Resumed at step');

    // only what is missing is submitted again
    const again = await bench.swathe('sweep', 'plan.yaml', '--out', 'cluster/plan', ...ON_SLURM);
    expect(again.out).toContain(`1 of ${POINTS} cases submitted`);
    await until(() => queue() === '', 300_000, LOOK_MS);
    const local = await bench.swathe('sweep', 'plan.yaml', '--out', 'here/plan', '--quiet');
    expect(local.exit).toBe(0);
    expect(timeless(bench, 'cluster/plan')).toBe(timeless(bench, 'here/plan'));
    expect(bench.bytes('cluster/plan/overview.png').equals(bench.bytes('here/plan/overview.png'))).toBe(true);
  }, 1_800_000);

  it.skipIf(!SLOW)(
    'goes on after the end of its time, which it was warned of, and can be cancelled',
    async () => {
      bench.file('long.yaml', PLAN.replace('7 mm, 8 mm, 9 mm', '8 mm').replace('base:', 'set: {record.span: 500 s}\nbase:'));
      const { exit, out: told } = await bench.swathe('sweep', 'long.yaml', '--out', 'long/long', ...ON_SLURM, '--time', '1 min');
      expect(exit).toBe(0);
      const [job] = /jobs (\d+)/.exec(told)?.slice(1) ?? [];
      const notes = (): string[] =>
        existsSync(bench.path('long/long/points/0001/run.json')) ? (bench.json('long/long/points/0001/run.json').notes as string[]) : [];
      await until(
        () => {
          hurry(`${job}_1`);
          return notes().some((note) => note.startsWith('Resumed at step'));
        },
        900_000,
        LOOK_MS,
      );
      const { out } = await bench.swathe('sweep', 'long/long', '--cancel');
      expect(out).toMatch(/^cancelled: jobs/);
      await until(() => queue() === '', 300_000, LOOK_MS);
      expect(bench.json('long/long/points/0001/run.json').status).toBe('stopped');
      const { out: nothing } = await bench.swathe('sweep', 'long/long', '--cancel');
      expect(nothing).toBe('nothing of this sweep is on the cluster\n');
    },
    900_000,
  );

  const wrong: [string[], string][] = [
    [['--partition', 'nowhere'], '--partition nowhere: the cluster has no such partition'],
    [['--cpus', '900'], '--cpus 900: no node there has more than'],
    [['--time', 'soon'], '--time soon: not a time above zero'],
  ];
  it.each(wrong)('with %j is refused before anything is submitted', async (words, message) => {
    const { exit, error } = await bench.swathe('sweep', 'plan.yaml', '--out', 'none/plan', '--engine', 'slurm', ...words);
    expect(error).toContain(message);
    expect(exit).toBe(2);
    expect(queue()).toBe('');
  });
});
