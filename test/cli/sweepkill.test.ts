import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Bench } from './swathe.ts';
import { childrenOf, FINNED, PIECE, PLAN, PLAN24, rowsOf, SLOW, timeless, until } from './sweeps.ts';

/** Kills of the sweep and of its runs. */
const KILLS = SLOW ? 10 : 3;
const POINTS = SLOW ? 24 : 6;

const bench = new Bench();
bench.file('piece.yaml', PIECE);
bench.file('finned.yaml', FINNED);
bench.file('plan.yaml', (SLOW ? PLAN24 : PLAN).replace('base:', 'set: {record.span: 120 ms}\nbase:'));
afterAll(() => bench.remove());

let whole = '';
let took_ms = 0;
beforeAll(async () => {
  const start = performance.now();
  const { exit } = await bench.swathe('sweep', 'plan.yaml', '--out', 'whole/plan', '--quiet');
  took_ms = performance.now() - start;
  expect(exit).toBe(0);
  whole = timeless(bench, 'whole/plan');
}, 600_000);

describe('a sweep that is killed, and whose runs are killed', () => {
  it('at random moments, time and again, ends in the same table', async () => {
    // Numerical Recipes' quick generator: moments are random, and the same ones in every test
    let seed = 20261201;
    const random = (): number => {
      seed = (Math.imul(seed, 1664525) + 1013904223) >>> 0;
      return seed / 2 ** 32;
    };
    const words = ['sweep', 'plan.yaml', '--out', 'killed/plan', '--checkpoint', '0.05', '--quiet'];
    let kills = 0;
    let killedRuns = 0;
    for (let round = 0; round < 4 * KILLS && kills < KILLS; round++) {
      const { child, ended } = bench.start(...words);
      await until(() => childrenOf(bench, 'killed/plan', POINTS).length > 0 || child.exitCode !== null);
      const pause = (most_ms: number) => Promise.race([ended, new Promise((resolve) => setTimeout(resolve, random() * most_ms))]);
      await pause((0.5 * took_ms) / KILLS);
      const runs = childrenOf(bench, 'killed/plan', POINTS);
      if (runs.length > 0) {
        process.kill(runs[Math.floor(random() * runs.length)], 'SIGKILL');
        killedRuns++;
      }
      await pause((0.5 * took_ms) / KILLS);
      child.kill('SIGKILL');
      if ((await ended).signal === 'SIGKILL') kills++;
    }
    expect(kills).toBeGreaterThan(0);
    expect(killedRuns).toBeGreaterThan(0);
    const { exit, error } = await bench.swathe(...words);
    expect(error).toBe('');
    expect(exit).toBe(0);
    expect(rowsOf(bench, 'killed/plan')).toHaveLength(POINTS);
    expect(timeless(bench, 'killed/plan')).toBe(whole);
  }, 1_800_000);
});
