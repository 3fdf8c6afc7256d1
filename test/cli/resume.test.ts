import { existsSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Bench, TINY } from './swathe.ts';

/** Long enough to be cut at several moments. */
const LONGER = TINY.replace('span: 40 ms', 'span: 250 ms');
const RUN = ['run', 'longer.yaml', '--no-frames', '--checkpoint', '0.05'];

const bench = new Bench();
let whole: Record<string, string> = {};
let took_ms = 0;

async function until(condition: () => boolean, most_ms: number): Promise<void> {
  const end = performance.now() + most_ms;
  while (!condition()) {
    if (performance.now() > end) throw new Error(`waited ${most_ms} ms in vain`);
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
}

function status(folder: string): unknown {
  return existsSync(bench.path(folder, 'run.json')) ? bench.json(folder, 'run.json').status : undefined;
}

beforeAll(async () => {
  bench.file('longer.yaml', LONGER);
  const start = performance.now();
  const { exit } = await bench.swathe(...RUN, '--out', 'whole');
  took_ms = performance.now() - start;
  expect(exit).toBe(0);
  whole = bench.tables('whole');
  expect(Object.keys(whole).length).toBeGreaterThanOrEqual(5);
});

afterAll(() => bench.remove());

describe('a run that is interrupted', () => {
  it.each([
    ['SIGINT', 130],
    ['SIGTERM', 143],
  ] as const)('by %s says how to go on, is marked stopped and goes on to the same bytes', async (signal, code) => {
    const { child, ended } = bench.start(...RUN, '--out', `by ${signal}`);
    await until(() => status(`by ${signal}`) === 'running', 20_000);
    await new Promise((resolve) => setTimeout(resolve, took_ms / 4));
    child.kill(signal);
    const { exit, error } = await ended;
    expect(exit).toBe(code);
    expect(status(`by ${signal}`)).toBe('stopped');
    const command = /^ *swathe (run .*)$/m.exec(error)?.[1] ?? '';
    expect(command).toBe(`run longer.yaml --no-frames --checkpoint 0.05 --out 'by ${signal}'`);
    const again = await bench.swathe(...RUN, '--out', `by ${signal}`);
    expect(again.error).toContain('goes on from');
    expect(again.exit).toBe(0);
    expect(status(`by ${signal}`)).toBe('done');
    expect(bench.tables(`by ${signal}`)).toEqual(whole);
  });

  it('keeps the tables so far, and its summary says that it is not complete', async () => {
    const { child, ended } = bench.start(...RUN, '--out', 'partly');
    await until(() => status('partly') === 'running', 20_000);
    await new Promise((resolve) => setTimeout(resolve, took_ms / 3));
    child.kill('SIGINT');
    await ended;
    expect(bench.read('partly/history.csv').split('\n').length).toBeGreaterThan(2);
    expect(bench.json('partly/summary.json').complete).toBe(false);
  });
});

describe('a run that is killed', () => {
  it('at any moment, several times over, goes on to the same bytes', async () => {
    let seed = 20261201;
    const random = (): number => {
      seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0;
      return seed / 2 ** 32;
    };
    let kills = 0;
    for (let round = 0; round < 6 && status('killed') !== 'done'; round++) {
      const { child, ended } = bench.start(...RUN, '--out', 'killed');
      const timer = setTimeout(() => child.kill('SIGKILL'), 150 + random() * took_ms * 0.7);
      const { signal } = await ended;
      clearTimeout(timer);
      if (signal === 'SIGKILL') kills++;
      expect(status('killed')).toBeOneOf([undefined, 'running', 'done']);
      if (status('killed') === 'running') expect(existsSync(bench.path('killed/summary.json'))).toBe(false);
    }
    expect(kills).toBeGreaterThan(0);
    const { exit } = await bench.swathe(...RUN, '--out', 'killed');
    expect(exit).toBe(0);
    expect(status('killed')).toBe('done');
    expect(bench.tables('killed')).toEqual(whole);
  });
});

describe('two runs into one folder', () => {
  it('are refused while the first one lives', async () => {
    const { child, ended } = bench.start(...RUN, '--out', 'shared');
    await until(() => status('shared') === 'running', 20_000);
    const second = await bench.swathe(...RUN, '--out', 'shared');
    child.kill('SIGINT');
    await ended;
    expect(second.exit).toBe(4);
    expect(second.error).toContain('shared');
  });
});
