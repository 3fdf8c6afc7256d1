import { existsSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Bench, TINY } from './swathe.ts';

/** Long enough to be cut at several moments. */
const LONGER = TINY.replace('span: 40 ms', 'span: 500 ms');
const RUN = ['run', 'longer.yaml', '--frames', '4', '--checkpoint', '0.05'];

const bench = new Bench();
let whole: Record<string, string> = {};
let frames: Buffer[] = [];
let took_ms = 0;

async function until(condition: () => boolean, most_ms = 60_000): Promise<void> {
  const end = performance.now() + most_ms;
  while (!condition()) {
    if (performance.now() > end) throw new Error(`waited ${most_ms} ms in vain`);
    await new Promise((resolve) => setTimeout(resolve, 5));
  }
}

function status(folder: string): unknown {
  return existsSync(bench.path(folder, 'run.json')) ? bench.json(folder, 'run.json').status : undefined;
}

/** Something is there to go on from. */
function hasCheckpoint(folder: string): boolean {
  return existsSync(bench.path(folder, 'checkpoint-a.bin'));
}

function expectSameAsWhole(folder: string): void {
  expect(status(folder)).toBe('done');
  expect(bench.tables(folder)).toEqual(whole);
  expect(bench.frames(folder)).toEqual(frames);
}

beforeAll(async () => {
  bench.file('longer.yaml', LONGER);
  const start = performance.now();
  const { exit, error } = await bench.swathe(...RUN, '--out', 'whole');
  took_ms = performance.now() - start;
  expect(error).not.toContain('swathe:');
  expect(exit).toBe(0);
  whole = bench.tables('whole');
  frames = bench.frames('whole');
  expect(Object.keys(whole).length).toBeGreaterThanOrEqual(5);
  expect(frames).toHaveLength(4);
});

afterAll(() => bench.remove());

describe('a run that is interrupted', () => {
  it.each([
    ['SIGINT', 130],
    ['SIGTERM', 143],
  ] as const)('by %s finishes its files, says how to go on, and goes on to the same bytes', async (signal, code) => {
    const folder = `by ${signal}`;
    const { child, ended } = bench.start(...RUN, '--out', folder);
    await until(() => hasCheckpoint(folder));
    child.kill(signal);
    const { exit, error } = await ended;
    expect(exit).toBe(code);
    expect(status(folder)).toBe('stopped');
    expect(bench.json(folder, 'summary.json').complete).toBe(false);
    expect(bench.read(folder, 'history.csv').split('\n').length).toBeGreaterThan(2);
    const command = /^ *swathe (run .*)$/m.exec(error)?.[1] ?? error;
    expect(command).toBe(`run longer.yaml --frames 4 --checkpoint 0.05 --out '${folder}'`);

    // how many pictures was settled at the beginning
    const again = await bench.swathe('run', 'longer.yaml', '--out', folder);
    expect(again.error).toMatch(/goes on from 0\.\d+ s/);
    expect(again.error).toContain('frames: 4, as the run was begun with');
    expect(again.exit).toBe(0);
    expectSameAsWhole(folder);
  });

  it('twice ends at once', async () => {
    const { child, ended, printed } = bench.start(...RUN, '--out', 'twice');
    await until(() => hasCheckpoint('twice'));
    child.kill('SIGINT');
    await until(() => printed().includes('once more ends at once'));
    await new Promise((resolve) => setTimeout(resolve, 250));
    child.kill('SIGINT');
    expect((await ended).exit).toBe(130);
    expect(status('twice')).toBeOneOf(['running', 'stopped']);
  });
});

describe('a run that is killed', () => {
  it('at any moment, several times over, goes on to the same bytes', async () => {
    // Numerical Recipes' quick generator: moments are random, and the same ones in every test
    let seed = 20261201;
    const random = (): number => {
      seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0;
      return seed / 2 ** 32;
    };
    let kills = 0;
    for (let round = 0; round < 4 && status('killed') !== 'done'; round++) {
      const { child, ended } = bench.start(...RUN, '--out', 'killed');
      // the first round surely leaves something to go on from
      if (round === 0) await until(() => hasCheckpoint('killed'));
      else await Promise.race([ended, new Promise((resolve) => setTimeout(resolve, 100 + random() * took_ms))]);
      child.kill('SIGKILL');
      if ((await ended).signal === 'SIGKILL') kills++;
      expect(status('killed')).toBeOneOf(['running', 'done']);
      if (status('killed') === 'running' && existsSync(bench.path('killed/summary.json'))) {
        // cut while the results were being written: whole, but not yet called done
        expect(bench.json('killed/summary.json').complete).toBe(true);
      }
    }
    expect(kills).toBeGreaterThan(0);
    const { exit } = await bench.swathe(...RUN, '--out', 'killed');
    expect(exit).toBe(0);
    expectSameAsWhole('killed');
  });
});

describe('two runs into one folder', () => {
  it('are refused while the first one lives, and the first one is not disturbed', async () => {
    // far longer than the test
    const { child, ended } = bench.start(...RUN, '--set', 'record.span=100 s', '--out', 'shared');
    await until(() => hasCheckpoint('shared'));
    const second = await bench.swathe(...RUN, '--set', 'record.span=100 s', '--out', 'shared');
    expect(second.error).toMatch(/shared: another process \(\d+ on .*\) is writing there/);
    expect(second.exit).toBe(4);
    child.kill('SIGINT');
    expect((await ended).exit).toBe(130);
  });
});
