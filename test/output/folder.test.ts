import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { csvParse } from 'd3-dsv';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { Checkpoint, Recording } from '../../cases/index.ts';
import { type Beginning, measure, RunFolder, type RunRecord } from '../../output/index.ts';
import { makeRecording } from './recordings.ts';

const recording: Recording = makeRecording({
  samples: 30,
  deposit: { flux_m_s: 1e-5, solids_kg_m3: 10, layer_kg_m2: 0.005, above_Pa: 0.5, clears_s: 0.1, start: 1 },
  shear: (side, s, e) => (side === 'left' && e === 4 ? Number.NaN : Math.sin(s + e)),
});
const beginning: Beginning = {
  caseText: 'title: Made panel\n',
  title: 'Made panel',
  seed: 7,
  frames: 3,
  derived: recording.derived,
  version: '0.1.0',
};
const checkpointAt = (step: number): Checkpoint => ({
  step,
  solver: Uint8Array.from([1, 2, 3, step % 256, 255]),
  json: JSON.stringify({ rest: 'ä "quoted"', step }),
  arrays: { rows: Float32Array.from([0.1, -2, Number.NaN]), times: Float64Array.from([1 / 3]), gas: Uint8Array.from([0, 1]) },
});

let scratch: string;
beforeEach(() => {
  scratch = mkdtempSync(join(tmpdir(), 'swathe-folder-'));
});
afterEach(() => {
  rmSync(scratch, { recursive: true, force: true });
});

const record = (path: string) => JSON.parse(readFileSync(join(path, 'run.json'), 'utf8')) as RunRecord;

describe('a run folder', () => {
  test('goes from running to done, and then lists every file it holds with its size', async () => {
    const path = join(scratch, 'deep', 'run');
    const folder = await RunFolder.claim(path);
    await folder.begin(beginning);
    expect(record(path)).toMatchObject({
      status: 'running',
      title: 'Made panel',
      seed: 7,
      frames: 3,
      versions: { swathe: '0.1.0', node: process.versions.node },
    });
    expect(readFileSync(join(path, 'case.yaml'), 'utf8')).toBe(beginning.caseText);
    await folder.writeFrame(0, Buffer.from('picture'));
    await folder.writeCheckpoint(checkpointAt(10));
    await folder.writeResults(recording, measure(recording));
    expect(record(path).status).toBe('running');
    await folder.end({ status: 'done' });
    await folder.release();

    const done = record(path);
    expect(done.status).toBe('done');
    expect(done.ended).not.toBeNull();
    const onDisk = [...readdirSync(path), 'frames/0000.png'].filter((name) => name !== 'run.json' && name !== 'frames').sort();
    expect(done.files.map((file) => file.name).sort()).toEqual(onDisk);
    for (const { name, bytes } of done.files) expect(readFileSync(join(path, name)).length).toBe(bytes);
    expect(onDisk).toEqual(
      [
        'backtransport.csv',
        'bubbles.csv',
        'case.yaml',
        'deposit.csv',
        'frames/0000.png',
        'histogram.csv',
        'histogram.png',
        'history.csv',
        'shear-map-left.png',
        'shear-map-right.png',
        'summary.json',
        'swept.csv',
        'walls.csv',
      ].sort(),
    );
  });

  test('hands back a checkpoint exactly as it was given', async () => {
    const folder = await RunFolder.claim(scratch);
    await folder.begin(beginning);
    for (const step of [10, 20, 30]) await folder.writeCheckpoint(checkpointAt(step));
    await folder.end({ status: 'stopped' });
    await folder.release();

    const again = await RunFolder.claim(scratch);
    expect(again.unfinished).toBe(true);
    expect(again.holds(beginning.caseText)).toBe(true);
    const { checkpoint, notes } = await again.resume(beginning);
    expect(checkpoint).toEqual(checkpointAt(30));
    expect(notes).toEqual([]);
    expect(record(scratch)).toMatchObject({ status: 'running', ended: null });
    expect(record(scratch).notes.join()).toContain('Resumed at step 30');
    await again.release();
  });

  test('that was stopped loses its unfinished results when it goes on, and keeps frames and checkpoints', async () => {
    const folder = await RunFolder.claim(scratch);
    await folder.begin(beginning);
    await folder.writeFrame(3, Buffer.from('picture'));
    await folder.writeCheckpoint(checkpointAt(10));
    await folder.writeResults({ ...recording, complete: false }, measure({ ...recording, complete: false }));
    await folder.end({ status: 'stopped' });
    expect(JSON.parse(readFileSync(join(scratch, 'summary.json'), 'utf8')).complete).toBe(false);
    await folder.resume(beginning);
    expect(readdirSync(scratch).sort()).toEqual(['case.yaml', 'checkpoint-a.bin', 'frames', 'run.json', 'run.lock']);
    await folder.release();
    expect(readdirSync(scratch)).not.toContain('run.lock');
  });

  test('that begins again keeps nothing of the run before', async () => {
    const folder = await RunFolder.claim(scratch);
    await folder.begin(beginning);
    await folder.writeFrame(0, Buffer.from('picture'));
    await folder.writeCheckpoint(checkpointAt(10));
    await folder.writeResults(recording, measure(recording));
    await folder.end({ status: 'failed', error: new Error('too fast') });
    expect(record(scratch).error).toEqual({ kind: 'Error', message: 'too fast' });
    await folder.begin({ ...beginning, caseText: 'title: Other\n' });
    await folder.release();
    expect(readdirSync(scratch).sort()).toEqual(['case.yaml', 'run.json']);
    expect(record(scratch)).toMatchObject({ status: 'running', error: null, files: [] });
  });

  test('adds up the time of all sittings', async () => {
    const folder = await RunFolder.claim(scratch);
    await folder.begin(beginning);
    await folder.writeCheckpoint(checkpointAt(10));
    await new Promise((resolve) => setTimeout(resolve, 60));
    await folder.end({ status: 'stopped' });
    const first_s = record(scratch).timeTaken_s;
    expect(first_s).toBeGreaterThanOrEqual(0.05);
    await folder.resume(beginning);
    await folder.end({ status: 'stopped' });
    expect(record(scratch).timeTaken_s).toBeGreaterThan(first_s);
    await folder.release();
  });

  test('shows progress in run.json, and never goes back to running after the end', async () => {
    const folder = await RunFolder.claim(scratch);
    await folder.begin(beginning);
    const progress = { step: 5, steps: 10, time_s: 0.5, holdup: 0.05, upflow_m_s: 0.1 };
    folder.progress(progress);
    await folder.end({ status: 'done' });
    await folder.release();
    expect(record(scratch)).toMatchObject({ status: 'done', progress });
  });
});

describe('the tables of a run folder', () => {
  let table: (name: string) => Record<string, string>[];
  beforeEach(async () => {
    const folder = await RunFolder.claim(scratch);
    await folder.begin(beginning);
    await folder.writeResults(recording, measure(recording));
    await folder.release();
    table = (name) => [...csvParse(readFileSync(join(scratch, name), 'utf8'))];
  });

  test('walls.csv has a row for every element of both walls, and empty cells under a fin', () => {
    const rows = table('walls.csv');
    expect(rows).toHaveLength(20);
    expect(Object.keys(rows[0])).toEqual(
      'wall x_m in_membrane under_fin mean_abs_Pa mean_Pa rms_Pa p95_Pa max_Pa share_above events_1_s reversal share_under_gas'.split(' '),
    );
    expect(rows[4]).toMatchObject({ wall: 'left', x_m: '0.0009', in_membrane: '0', under_fin: '1', mean_abs_Pa: '', share_under_gas: '' });
    expect(rows[5]).toMatchObject({ in_membrane: '1', under_fin: '0', share_under_gas: '0' });
    const expected = Array.from({ length: 30 }, (_, s) => Math.abs(Math.sin(s + 5))).reduce((a, b) => a + b) / 30;
    expect(Number(rows[5].mean_abs_Pa)).toBeCloseTo(expected, 6);
  });

  test('swept.csv holds both curves for each wall and both together, and the asked point', () => {
    const rows = table('swept.csv');
    expect(new Set(rows.map((row) => row.wall))).toEqual(new Set(['left', 'right', 'together']));
    const asked = rows.filter(
      (row) => row.kind === 'threshold' && row.wall === 'right' && row.threshold_Pa === '0.5' && row.window_s === '0.05',
    );
    expect(asked).toHaveLength(1);
    expect(Number(asked[0].swept)).toBeCloseTo(measure(recording).walls.right.swept.within ?? Number.NaN, 6);
    const inTime = rows.filter((row) => row.kind === 'time' && row.wall === 'right');
    expect(inTime[0]).toMatchObject({ window_s: '0', swept: '0', touched: '0' });
    expect(inTime.at(-1)?.window_s).toBe('0.3');
  });

  test('histogram.csv adds up to one for each wall', () => {
    for (const wall of ['left', 'right']) {
      const shares = table('histogram.csv')
        .filter((row) => row.wall === wall)
        .map((row) => Number(row.share));
      expect(shares.reduce((a, b) => a + b)).toBeCloseTo(1, 5);
    }
  });

  test('history.csv and bubbles.csv hold the rows of the recording', () => {
    expect(table('history.csv')[1]).toEqual({
      time_s: '0.5',
      holdup: '0.05',
      upflow_m_s: '0.1',
      released_m2: '0.00002',
      skimmed_m2: '0.00001',
      present_m2: '0.00001',
    });
    expect(table('bubbles.csv')).toEqual([
      { time_s: '0.5', bubble: '3', area_m2: '0.00001', x_m: '0.01', y_m: '0.004', ux_m_s: '0.25', uy_m_s: '-0.01' },
    ]);
  });

  test('fins.csv holds a row for every sample and fin, and the summary the mean on each; without fins there is none', async () => {
    expect(readdirSync(scratch)).not.toContain('fins.csv');
    const made = makeRecording({ samples: 2 });
    const fins: Recording['case']['fins'] = [1e-3, 2e-3].map((at) => [
      [at, at],
      [at + 5e-4, at],
      [at, at + 5e-4],
    ]);
    const finned: Recording = {
      ...made,
      case: { ...made.case, fins },
      fins: { along_N_m: Float64Array.of(1, 2, 3, 4), across_N_m: Float64Array.of(-1, -2, -3, -4) },
    };
    const path = join(scratch, 'finned');
    const folder = await RunFolder.claim(path);
    await folder.begin(beginning);
    await folder.writeResults(finned, measure(finned));
    await folder.release();
    expect(csvParse(readFileSync(join(path, 'fins.csv'), 'utf8')).map((row) => Object.values(row))).toEqual([
      ['1.01', '1', '1', '-1'],
      ['1.01', '2', '2', '-2'],
      ['1.02', '1', '3', '-3'],
      ['1.02', '2', '4', '-4'],
    ]);
    expect(JSON.parse(readFileSync(join(path, 'summary.json'), 'utf8')).fins).toEqual([
      { fin: 1, force_along_N_m: 2, force_across_N_m: -2 },
      { fin: 2, force_along_N_m: 3, force_across_N_m: -3 },
    ]);
  });

  test('backtransport.csv and deposit.csv hold a block for each wall and one for both', () => {
    const { backTransport, deposit } = measure(recording);
    const sizes = table('backtransport.csv');
    expect(sizes).toHaveLength(3 * 41);
    const size = backTransport.right.sizes[20];
    expect(sizes[41 + 20].wall).toBe('right');
    expect(Number(sizes[41 + 20].radius_m)).toBe(1e-6);
    expect(Number(sizes[41 + 20].total_m_s) / size.total_m_s).toBeCloseTo(1, 6);
    const covers = table('deposit.csv');
    expect(covers).toHaveLength(3 * 30);
    expect(Number(covers[2 * 30 + 29].covered)).toBeCloseTo(deposit.together?.fromStart[29] ?? Number.NaN, 6);
    expect(Number(covers[30].time_s)).toBe(1.01);
    expect(Number(covers[30].covered_settled)).toBeCloseTo(deposit.right?.settled[0] ?? Number.NaN, 6);
  });

  test('summary.json says the answers, what they leave out and the cautions', () => {
    const summary = JSON.parse(readFileSync(join(scratch, 'summary.json'), 'utf8'));
    const measures = measure(recording);
    expect(summary.walls.right.swept.within).toBe(measures.walls.right.swept.within);
    expect(summary.walls.left.elements).toEqual({ open: 7, underFin: 1 });
    expect(summary.loop).toMatchObject({ released_m2: 2e-5, balanceError: 0 });
    expect(summary.backTransport).toMatchObject({ length_m: 1, wallToBulk: 60, worst: { right: measures.backTransport.right.worst } });
    expect(summary.backTransport.kind).toContain('estimate');
    expect(summary.deposit).toMatchObject({ above_Pa: 0.5, right: { atEnd: measures.deposit.right?.fromStart.at(-1) } });
    expect(summary.cautions.join(' ')).toMatch(/Compressed air.*local codes/s);
    expect(summary.leftOut.join(' ')).toContain('Plane section');
  });
});
