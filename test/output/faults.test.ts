import { execFile, spawn } from 'node:child_process';
import { existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync, truncateSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { promisify } from 'node:util';
import { afterEach, beforeEach, describe, expect, test } from 'vitest';
import type { Checkpoint } from '../../cases/index.ts';
import { type Beginning, RunFolder, type RunRecord } from '../../output/index.ts';
import { OutputError } from '../../solver/index.ts';
import { makeRecording } from './recordings.ts';

const { derived } = makeRecording();
const beginning: Beginning = { caseText: 'title: Made panel\n', title: 'Made panel', seed: 7, frames: 3, derived, version: '0.1.0' };
const checkpointAt = (step: number): Checkpoint => ({ step, solver: new Uint8Array(5000).fill(step), json: '{}', arrays: {} });
const BUILT = pathToFileURL(join(import.meta.dirname, '../../.build/output/index.js')).href;

let scratch: string;
let run: string;
beforeEach(() => {
  scratch = mkdtempSync(join(tmpdir(), 'swathe-fault-'));
  run = join(scratch, 'run');
});
afterEach(() => {
  rmSync(scratch, { recursive: true, force: true });
});

/** A stopped run with checkpoints of steps 10 (file a), 20 (file b) and so on. */
async function stoppedRun(...steps: number[]): Promise<void> {
  const folder = await RunFolder.claim(run);
  await folder.begin(beginning);
  for (const step of steps) await folder.writeCheckpoint(checkpointAt(step));
  await folder.end({ status: 'stopped' });
  await folder.release();
}

async function resumed(with_: Beginning = beginning): Promise<{ step: number | undefined; notes: string[] }> {
  const folder = await RunFolder.claim(run);
  try {
    const { checkpoint, notes } = await folder.resume(with_);
    return { step: checkpoint?.step, notes };
  } finally {
    await folder.release();
  }
}

async function refusal(of: Promise<unknown>): Promise<OutputError> {
  const error = await of.then(
    () => undefined,
    (reason: unknown) => reason,
  );
  expect(error).toBeInstanceOf(OutputError);
  return error as OutputError;
}

describe('a broken checkpoint', () => {
  const newest = () => join(run, 'checkpoint-b.bin');

  test('that was cut off gives way to the one before, and says so', async () => {
    await stoppedRun(10, 20);
    for (const size of [4000, 40, 11, 0]) {
      truncateSync(newest(), size);
      expect(await resumed()).toEqual({
        step: 10,
        notes: ['checkpoint-b.bin is broken (its checksum does not fit); going on from the previous one, step 10.'],
      });
    }
  });

  test('with a single flipped bit anywhere is found out', async () => {
    await stoppedRun(10, 20);
    const good = readFileSync(newest());
    for (const at of [0, 8, 30, 200, 3000, good.length - 1]) {
      const bad = Buffer.from(good);
      bad[at] ^= 4;
      writeFileSync(newest(), bad);
      expect((await resumed()).step).toBe(10);
    }
    writeFileSync(newest(), good);
    expect((await resumed()).step).toBe(20);
  });

  test('is the next to be overwritten, not the good one', async () => {
    await stoppedRun(10, 20);
    truncateSync(newest(), 100);
    const folder = await RunFolder.claim(run);
    await folder.resume(beginning);
    await folder.writeCheckpoint(checkpointAt(15));
    await folder.release();
    truncateSync(newest(), 100);
    expect((await resumed()).step).toBe(10);
  });

  test('without a good one beside it makes the run start over, in words and in run.json', async () => {
    await stoppedRun(10);
    truncateSync(join(run, 'checkpoint-a.bin'), 100);
    const folder = await RunFolder.claim(run);
    const { checkpoint, notes } = await folder.resume(beginning);
    expect(checkpoint).toBeUndefined();
    expect(notes).toEqual(['checkpoint-a.bin is broken (its checksum does not fit); the run starts over.']);
    await folder.end({ status: 'done' });
    await folder.release();
    expect((await RunFolder.look(run)).notes).toEqual(notes);
  });

  test('of another version is refused, with the way out', async () => {
    await stoppedRun(10);
    const error = await refusal(resumed({ ...beginning, version: '0.2.0' }));
    expect(error.message).toBe(
      `${join(run, 'checkpoint-a.bin')}: the checkpoint was made by swathe 0.1.0, this is 0.2.0, and going on would mix the two; ` +
        'start the run over, or finish it with the version that began it.',
    );
  });

  test('of another case under the record of this one is refused', async () => {
    await stoppedRun(10);
    const foreign = readFileSync(join(run, 'checkpoint-a.bin'));
    rmSync(run, { recursive: true });
    const other = { ...beginning, caseText: 'title: Other\n' };
    const folder = await RunFolder.claim(run);
    await folder.begin(other);
    await folder.release();
    writeFileSync(join(run, 'checkpoint-b.bin'), foreign);
    expect((await refusal(resumed(other))).message).toContain('was made for another case');
  });
});

describe('a folder that cannot hold the run is refused', () => {
  test('when a part of its path is a file', async () => {
    writeFileSync(join(scratch, 'file'), '');
    const error = await refusal(RunFolder.claim(join(scratch, 'file', 'run')));
    expect(error.path).toBe(join(scratch, 'file', 'run'));
    expect(error.exit).toBe(4);
    expect(error.message).toContain('(ENOTDIR): a part of the path is a file, not a folder; choose another path');
  });

  test('when nothing may be made there', async () => {
    const error = await refusal(RunFolder.claim('/proc/swathe-run'));
    expect(error.message).toMatch(/^\/proc\/swathe-run: making the folder failed \(E[A-Z]+\): .*choose another/);
    expect(error.cause).toBeInstanceOf(Error);
  });

  test('when it holds files that are not of a run, and they stay', async () => {
    mkdirSync(run);
    writeFileSync(join(run, 'case.yaml'), 'mine');
    const error = await refusal(RunFolder.claim(run));
    expect(error.message).toBe(`${run}: the folder holds other files (such as case.yaml) and no run; choose a new or an empty folder.`);
    expect(readdirSync(run)).toEqual(['case.yaml']);
  });

  test('when its run.json is not one of a run', async () => {
    mkdirSync(run);
    writeFileSync(join(run, 'run.json'), '{"scripts": {}}');
    expect((await refusal(RunFolder.claim(run))).message).toContain('not the record of a run of this version');
    writeFileSync(join(run, 'run.json'), '{"format": "swa');
    expect((await refusal(RunFolder.claim(run))).message).toContain('no JSON');
  });

  test('when one looks for a run and there is none', async () => {
    expect((await refusal(RunFolder.look(scratch))).message).toContain('no run is in this folder (no run.json)');
  });

  test('when its run is of another case or finished, and one asks to go on', async () => {
    await stoppedRun(10);
    expect((await refusal(resumed({ ...beginning, caseText: 'title: Other\n' }))).message).toContain('a run of another case');
    const folder = await RunFolder.claim(run);
    await folder.end({ status: 'done' });
    await folder.release();
    expect((await refusal(resumed())).message).toContain('a finished run');
  });

  test('when a living process writes there, at once', async () => {
    const folder = await RunFolder.claim(run);
    await folder.begin(beginning);
    const before = Date.now();
    const error = await refusal(RunFolder.claim(run));
    expect(error.message).toContain(`another process (${process.pid} on `);
    expect(Date.now() - before).toBeLessThan(1000);
    await folder.release();
  });
});

describe('after a kill', () => {
  test('the folder is free within seconds, and the run goes on from its checkpoint', async () => {
    const program = `
      import { RunFolder } from ${JSON.stringify(BUILT)};
      const folder = await RunFolder.claim(${JSON.stringify(run)});
      await folder.begin(${JSON.stringify(beginning)});
      await folder.writeCheckpoint({ step: 42, solver: new Uint8Array(9), json: '{}', arrays: {} });
      console.log('ready');
      setInterval(() => {}, 1000);`;
    const child = spawn(process.execPath, ['--input-type=module', '-e', program], { stdio: ['ignore', 'pipe', 'inherit'] });
    await new Promise((resolve) => child.stdout.once('data', resolve));
    child.kill('SIGKILL');
    await new Promise((resolve) => child.once('exit', resolve));
    expect(existsSync(join(run, 'run.lock'))).toBe(true);
    expect((await RunFolder.look(run)).status).toBe('running');

    const before = Date.now();
    expect((await resumed()).step).toBe(42);
    expect(Date.now() - before).toBeLessThan(6000);
  });

  test('files half written are swept away, and whole ones stay', async () => {
    await stoppedRun(10);
    mkdirSync(join(run, 'frames'));
    writeFileSync(join(run, 'frames', '0001.png'), 'whole');
    writeFileSync(join(run, 'frames', '0002.png.123456'), 'half');
    writeFileSync(join(run, 'run.json.99'), '{"half');
    await resumed();
    expect(readdirSync(join(run, 'frames'))).toEqual(['0001.png']);
    expect(readdirSync(run).sort()).toEqual(['case.yaml', 'checkpoint-a.bin', 'frames', 'run.json']);
  });
});

describe('a disk that fills up', () => {
  test('in the middle of replacing a file leaves the old one', async () => {
    await stoppedRun(10, 20);
    const program = `
      process.on('SIGXFSZ', () => {});
      import { RunFolder } from ${JSON.stringify(BUILT)};
      const folder = await RunFolder.claim(${JSON.stringify(run)});
      await folder.resume(${JSON.stringify(beginning)});
      await folder.writeFrame(0, Buffer.alloc(10));
      await folder.writeFrame(0, Buffer.alloc(100000));
      await folder.writeFrame(1, Buffer.alloc(10)).catch((error) => console.log('frame', error.message));
      await folder.writeCheckpoint({ step: 30, solver: new Uint8Array(8), json: '{}', arrays: {} }).catch((error) => console.log('checkpoint', error.message));
      await folder.end({ status: 'failed', error: new Error('full') });
      await folder.release();`;
    const { stdout } = await promisify(execFile)('bash', [
      '-c',
      'ulimit -f 16; exec "$0" --input-type=module -e "$1"',
      process.execPath,
      program,
    ]);
    for (const waiting of ['frame', 'checkpoint'])
      expect(stdout).toMatch(new RegExp(`^${waiting} .*0000.png: writing failed \\(EFBIG\\)`, 'm'));
    expect(JSON.parse(readFileSync(join(run, 'run.json'), 'utf8')).status).toBe('failed');
    expect(readFileSync(join(run, 'frames', '0000.png'))).toHaveLength(10);
    expect(readdirSync(join(run, 'frames'))).toEqual(['0000.png']);
  });

  test('in the middle of a checkpoint is told, the one before stays good, and no short file is left', async () => {
    await stoppedRun(10);
    // the system cuts the first write at 16 blocks of 1 KiB without an error, as a full disk does, and refuses the next
    const program = `
      process.on('SIGXFSZ', () => {});
      import { RunFolder } from ${JSON.stringify(BUILT)};
      const folder = await RunFolder.claim(${JSON.stringify(run)});
      await folder.resume(${JSON.stringify(beginning)});
      try {
        await folder.writeCheckpoint({ step: 20, solver: new Uint8Array(100000), json: '{}', arrays: {} });
      } catch (error) {
        console.log(error.name + ': ' + error.message);
        await folder.end({ status: 'failed', error });
      }
      await folder.release();`;
    const { stdout } = await promisify(execFile)('bash', [
      '-c',
      'ulimit -f 16; exec "$0" --input-type=module -e "$1"',
      process.execPath,
      program,
    ]);
    expect(stdout).toMatch(/^OutputError: .*checkpoint-b\.bin: writing failed \(EFBIG\): the file is larger than the system allows/);
    const record: RunRecord = await RunFolder.look(run);
    expect(record).toMatchObject({ status: 'failed', error: { kind: 'OutputError' } });
    expect(readdirSync(run).sort()).toEqual(['case.yaml', 'checkpoint-a.bin', 'run.json']);
    expect(await resumed()).toEqual({ step: 10, notes: [] });
  });
});
