import { spawnSync } from 'node:child_process';
import { existsSync, mkdirSync, readdirSync, writeFileSync } from 'node:fs';
import { parquetReadObjects } from 'hyparquet';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Bench, type Ended, MAIN } from './swathe.ts';
import { childrenOf, isAlive, PIECE, PLAN, rowsOf, timeless, until } from './sweeps.ts';

const bench = new Bench();
bench.file('piece.yaml', PIECE);
bench.file('plan.yaml', PLAN);
afterAll(() => bench.remove());

describe('a sweep from end to end', () => {
  let ended: Ended;
  beforeAll(async () => {
    ended = await bench.swathe('sweep', 'plan.yaml', '--out', 'one/plan');
  });

  it('runs every case into a run folder of its own and says how each ended', () => {
    expect(ended.exit).toBe(0);
    for (let point = 1; point <= 6; point++) {
      expect(ended.error).toMatch(
        new RegExp(`^000${point} done in .* \\(channel.gap . mm, channel.tilt .* deg, seed 1\\)\\. done \\d`, 'm'),
      );
      expect(bench.json(`one/plan/points/000${point}/run.json`).status).toBe('done');
      expect(existsSync(bench.path(`one/plan/points/000${point}/frames`))).toBe(false);
    }
    expect(ended.out).toContain('Brackenfold, gap by tilt: 6 of 6 cases done\ntable: one/plan/results.csv');
    expect(ended.out).toContain('not for design');
  });

  it('writes one row a case in the order of the plan, with the answers of its summary and their intervals', () => {
    const rows = rowsOf(bench, 'one/plan');
    expect(rows.map((row) => [row.point, row['channel.gap_m'], row['channel.tilt_deg'], row.seed, row.status])).toEqual([
      ['1', '0.007', '0', '1', 'done'],
      ['2', '0.007', '20', '1', 'done'],
      ['3', '0.008', '0', '1', 'done'],
      ['4', '0.008', '20', '1', 'done'],
      ['5', '0.009', '0', '1', 'done'],
      ['6', '0.009', '20', '1', 'done'],
    ]);
    rows.forEach((row, i) => {
      const { answers } = bench.json(`one/plan/points/000${i + 1}/summary.json`) as {
        answers: Record<string, Record<'value' | 'low' | 'high', number | null>>;
      };
      expect(Object.keys(answers).length).toBeGreaterThan(20);
      for (const [name, { value, low, high }] of Object.entries(answers)) {
        const cells = [row[name], row[`low_${name}`], row[`high_${name}`]];
        expect(cells).toEqual([value, low, high].map((number) => (number === null ? '' : String(Number(number.toPrecision(7))))));
      }
      const record = bench.json(`one/plan/points/000${i + 1}/run.json`);
      expect(row.case_sha256).toBe(record.case_sha256);
      expect(row.version).toBe((record.versions as { swathe: string }).swathe);
    });
    expect(new Set(rows.map(({ mean_shear_right_Pa }) => mean_shear_right_Pa)).size).toBe(6);
  });

  it('writes the same as Parquet, numbers as numbers', async () => {
    const bytes = Buffer.from(bench.bytes('one/plan/results.parquet'));
    const file = bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength) as ArrayBuffer;
    const objects = await parquetReadObjects({ file });
    const rows = rowsOf(bench, 'one/plan');
    expect(objects).toHaveLength(6);
    expect(objects.map((object) => object.point)).toEqual([1n, 2n, 3n, 4n, 5n, 6n]);
    objects.forEach((object, i) => {
      expect(Object.keys(object)).toEqual(Object.keys(rows[i]));
      for (const [name, cell] of Object.entries(object)) {
        const text = cell === null ? '' : typeof cell === 'number' ? String(Number(cell.toPrecision(7))) : String(cell);
        expect(text, name).toBe(rows[i][name]);
      }
    });
  });

  it('does nothing the second time, and tells its standing from another shell', async () => {
    const before = bench.json('one/plan/points/0003/run.json').updated;
    const again = await bench.swathe('sweep', 'plan.yaml', '--out', 'one/plan');
    expect(again.exit).toBe(0);
    expect(again.error).toBe('6 of 6 cases have ended already\n');
    expect(bench.json('one/plan/points/0003/run.json').updated).toBe(before);
    const { out } = await bench.swathe('sweep', 'one/plan', '--status');
    expect(out).toBe('Brackenfold, gap by tilt: 6 cases, done 6, failed 0, running 0, waiting 0\n100 % of the work\n');
  });

  it('gives the same table one case at a time', async () => {
    const { exit } = await bench.swathe('sweep', 'plan.yaml', '--out', 'two/plan', '--at-once', '1', '--quiet');
    expect(exit).toBe(0);
    expect(timeless(bench, 'two/plan')).toBe(timeless(bench, 'one/plan'));
  });

  it('takes over what a sweep beside it has computed', async () => {
    bench.file('wider.yaml', PLAN.replace('8 mm, 9 mm', '9 mm, 10 mm').replace('title:', 'title: Wider,'));
    const { exit, error } = await bench.swathe('sweep', 'wider.yaml', '--out', 'one/wider');
    expect(exit).toBe(0);
    expect(error.match(/^000\d taken over/gm)?.sort()).toEqual([
      '0001 taken over',
      '0002 taken over',
      '0003 taken over',
      '0004 taken over',
    ]);
    expect(error.match(/^000\d done in/gm)).toHaveLength(2);
    const [wider, plan] = ['one/wider', 'one/plan'].map((folder) => rowsOf(bench, folder).map(({ point, ...rest }) => rest));
    expect(wider.slice(0, 4)).toEqual([plan[0], plan[1], plan[4], plan[5]]);
  });
});

describe('a sweep on a terminal', () => {
  const noTerminal = spawnSync('script', ['--version']).status !== 0;
  it.skipIf(noTerminal)(`draws its bars anew below each line that stays${noTerminal ? ' (left out: needs script)' : ''}`, () => {
    const command = `stty cols 70; ${process.execPath} ${MAIN} sweep plan.yaml --out drawn/plan`;
    const env = { ...process.env, TERM: 'xterm', NO_COLOR: '1' };
    const drawn = spawnSync('script', ['-qec', command, '/dev/null'], { cwd: bench.folder, env, encoding: 'utf8' });
    expect(drawn.status).toBe(0);
    const text = drawn.stdout.replaceAll('\x1b', '^');
    // up to where the cursor goes back to the topmost bar
    const frames = text.split(/\^\[\d+A/);
    const said = frames.filter((frame) => frame.includes('done in'));
    expect(said.join('').match(/\^\[J\^\[\?7h\d{4} done in .* of 6.*\^\[\?7l\r\n/g)).toHaveLength(6);
    for (const frame of said) expect(frame.slice(frame.lastIndexOf('done in'))).toMatch(/\n.* \d+ % {2}done \d, failed 0, running \d of 6/);
    // nothing is told of the time left before anything is known
    expect(frames.slice(0, 3).join('')).not.toContain('left');
    // the bars are gone in the end, and the cursor is back
    expect(text).toMatch(/\^\[\?25h[^░█]*6 of 6 cases done\r\n/);
  });
});

describe('a plan that is only listed', () => {
  it('prints the points and the expected time, and makes no folder', async () => {
    const { exit, out } = await bench.swathe('sweep', 'plan.yaml', '--list', '--at-once', '2', '--out', 'none');
    expect(exit).toBe(0);
    expect(out).toMatch(
      /^Brackenfold, gap by tilt: 6 cases\npoint +channel\.gap +channel\.tilt +seed +1e9 updates\n1 +7 mm +0 deg +1 +0\.00/,
    );
    expect(out).toMatch(/^expected: about .* with 2 at a time here, at .* million cell updates a second each/m);
    expect(existsSync(bench.path('none'))).toBe(false);
  });
});

describe('a sweep with cases that fail', () => {
  it('records each with its kind and message, finishes the others and ends with exit code 5', async () => {
    bench.file(
      'bad.yaml',
      `title: Some fail
base: piece.yaml
vary:
  - key: channel.gap
    values: [8 mm, 3 mm, 8 mm, 8 mm, 8 mm, 8 mm, 7 mm]
  - key: grid
    values: [{across: 16}, {across: 16}, {across: 16, speed: 0.05 m/s}, {across: 250}, {across: 16}, {across: 17}, {across: 16}]
  - key: channel.height
    values: [36 mm, 36 mm, 130 mm, 36 mm, 36 mm, 36 mm, 36 mm]
  - key: record.span
    values: [40 ms, 40 ms, 40 ms, 40 ms, 500 s, 40 ms, 40 ms]
  - key: channel.return
    values: [{loss: 1}, {loss: 1}, {upflow: 1.9 m/s}, {loss: 1}, {loss: 1}, {loss: 1}, {loss: 1}]
combine: paired
`,
    );
    mkdirSync(bench.path('bad/points'), { recursive: true });
    // something else stands where the sixth run folder should be
    writeFileSync(bench.path('bad/points/0006'), '');
    const { exit, error, out } = await bench.swathe('sweep', 'bad.yaml', '--out', 'bad', '--memory', '170 MB', '--limit', '15 s');
    expect(exit).toBe(5);
    expect(out).toContain('Some fail: 2 of 7 cases done; 5 failed, the column error of the table says why');
    const rows = rowsOf(bench, 'bad');
    expect(rows.map(({ status, error_kind }) => error_kind || status)).toEqual([
      'done',
      'case',
      'diverged',
      'memory',
      'time',
      'output',
      'done',
    ]);
    expect(rows[1].error).toContain('gas.bubble.diameter: does not fit into the gap');
    expect(rows[2].error).toMatch(/the speed is/);
    expect(rows[3].error).toMatch(/^held \d+ MB, more than the 170 MB a case may have; raise --memory/);
    expect(rows[4].error).toMatch(/^took longer than the 15s a case may; raise --limit and give --retry/);
    expect(rows[5].error).toContain('points/0006');
    for (const row of rows.filter(({ status }) => status === 'failed')) {
      expect(row.mean_shear_right_Pa).toBe('');
      expect(row.case_sha256).toMatch(/^[0-9a-f]{64}$/);
      expect(error).toContain(`000${row.point} FAILED, ${row.error_kind}: `);
    }
    // the one that ran out of time can go on from where it was
    expect(bench.json('bad/points/0005/run.json').status).toBe('stopped');
  });

  it('tries again only what may pass, until it is asked to try all', async () => {
    const { exit, error } = await bench.swathe('sweep', 'bad', '--memory', '170 MB', '--limit', '15 s');
    expect(exit).toBe(5);
    expect(error.match(/^\d{4} FAILED, \w+/gm)).toEqual(['0006 FAILED, output']);
    const { out } = await bench.swathe('sweep', 'bad', '--status');
    expect(out).toContain('7 cases, done 2, failed 5, running 0, waiting 0');
    expect(out).toMatch(/^failed 0004 memory: held/m);
    const all = await bench.swathe('sweep', 'bad', '--retry', '--limit', '16 s');
    expect(all.exit).toBe(5);
    const kinds = rowsOf(bench, 'bad').map(({ status, error_kind }) => error_kind || status);
    expect(kinds[3]).not.toBe('memory');
    expect(kinds.filter((_, i) => i !== 3)).toEqual(['done', 'case', 'diverged', 'time', 'output', 'done']);
  });
});

describe('a sweep that is stopped', () => {
  it('by Ctrl-C ends its runs with checkpoints, and goes on to the same table', async () => {
    bench.file('long.yaml', PLAN.replace('base:', 'set: {record.span: 200 ms}\nbase:'));
    const { exit } = await bench.swathe('sweep', 'long.yaml', '--out', 'whole/long', '--quiet');
    expect(exit).toBe(0);
    const { child, ended } = bench.start('sweep', 'long.yaml', '--out', 'cut/long', '--checkpoint', '0.05');
    await until(() => childrenOf(bench, 'cut/long', 6).length > 0 && existsSync(bench.path('cut/long/points/0001/checkpoint-a.bin')));
    const running = childrenOf(bench, 'cut/long', 6);
    child.kill('SIGINT');
    const stopped = await ended;
    expect(stopped.exit).toBe(130);
    expect(stopped.error).toContain('stopping: running cases write their checkpoints');
    expect(running.filter(isAlive)).toEqual([]);
    expect(rowsOf(bench, 'cut/long').some(({ status }) => status === 'open')).toBe(true);
    const again = await bench.swathe('sweep', 'long.yaml', '--out', 'cut/long', '--quiet');
    expect(again.exit).toBe(0);
    expect(timeless(bench, 'cut/long')).toBe(timeless(bench, 'whole/long'));
  });

  it('because the disk is nearly full says so and loses nothing', async () => {
    const words = ['sweep', 'plan.yaml', '--out', 'full/plan'];
    const { exit, error } = await bench.swathe(...words, '--keep-free', '900000 GB');
    expect(exit).toBe(4);
    expect(error).toMatch(/full\/plan: the disk has .* left, less than the 900000 GB to be kept free; .*give the same command to go on/);
    expect(rowsOf(bench, 'full/plan').map(({ status }) => status)).toEqual(Array(6).fill('open'));
  });

  it('is driven by one process at a time', async () => {
    const { child, ended } = bench.start('sweep', 'long.yaml', '--out', 'held/long');
    await until(() => childrenOf(bench, 'held/long', 6).length > 0);
    const second = await bench.swathe('sweep', 'long.yaml', '--out', 'held/long');
    expect(second.error).toMatch(/held\/long: another process \(\d+ on .*\) is writing there/);
    expect(second.exit).toBe(4);
    const { out } = await bench.swathe('sweep', 'held/long', '--status');
    expect(out).toMatch(/^driven by process \d+ on /m);
    child.kill('SIGINT');
    expect((await ended).exit).toBe(130);
  });
});

describe('a sweep that cannot begin', () => {
  const wrong: [string[], number, string][] = [
    [['sweep'], 2, 'sweep needs a plan'],
    [['sweep', 'nowhere.yaml'], 2, 'nowhere.yaml: no such file'],
    [['sweep', 'tilted-panel'], 2, 'tilted-panel is a single case, a plan names it as its base'],
    [['sweep', '.'], 2, '. is a folder without a sweep in it'],
    [['sweep', 'piece.yaml'], 2, 'piece.yaml:1:1: base: is missing'],
    [['sweep', 'plan.yaml', '--limit', 'soon'], 2, '--limit soon: not a time above zero'],
    [['sweep', 'plan.yaml', '--memory', '2'], 2, '--memory 2: not a size above zero'],
    [['sweep', 'plan.yaml', '--at-once', '0'], 2, '--at-once 0: not a whole number from 1 to 1000'],
    [['sweep', 'plan.yaml', '--frames', '1'], 2, '--frames 1'],
    [['sweep', 'plan.yaml', '--lst'], 2, 'did you mean --list?'],
  ];
  it.each(wrong)('%j ends with exit code %i', async (words, code, message) => {
    const { exit, error } = await bench.swathe(...words);
    expect(error).toContain(message);
    expect(error).not.toMatch(/\n\s+at /);
    expect(exit).toBe(code);
  });

  it('in the folder of another plan leaves that alone', async () => {
    bench.file('other.yaml', PLAN.replace('20 deg, step', '10 deg, step').replace('step: 20', 'step: 10'));
    const before = readdirSync(bench.path('full/plan'));
    const { exit, error } = await bench.swathe('sweep', 'other.yaml', '--out', 'full/plan');
    expect(error).toContain('holds a sweep of another plan; it was kept');
    expect(exit).toBe(4);
    expect(readdirSync(bench.path('full/plan'))).toEqual(before);
  });
});
