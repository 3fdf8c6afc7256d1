import { execFileSync, spawnSync } from 'node:child_process';
import { basename } from 'node:path';
import { describe, expect, it } from 'vitest';
import { CHECKS } from './checks/index.ts';
import { finding, isFinding, type Row, row } from './row.ts';
import { KNOWN, shortfallOf } from './shortfalls.ts';
import { csvTable, markdownTable, plainTable } from './table.ts';

const SOURCE = new URL('./validate.ts', import.meta.url);
const BUILT = `.build/test/physics/${basename(SOURCE.pathname, '.ts')}.js`;

/** First order on 10, 20 and 40 cells, 0.8 % off on the finest grid. */
const first = (gate: number, more: { at?: number; falling?: boolean } = {}): Row =>
  row({
    ...{ check: 'made', quantity: 'a, quoted', source: 'none [V]', reference: 2, gate, ...more },
    ours: [10, 20, 40].map((cells) => ({ cells, value: 2 + 0.64 / cells })),
  });

describe('the validation table', () => {
  it('works out errors, order and verdict of a row', () => {
    const { ours, order, error, verdict } = first(1);
    [3.2, 1.6, 0.8].forEach((expected, n) => {
      expect(ours[n].error).toBeCloseTo(expected, 10);
    });
    expect(order).toBeCloseTo(1, 10);
    expect(error).toBeCloseTo(0.8, 10);
    expect(verdict).toBe('pass');
    expect(first(0.7).verdict).toBe('FAIL');
    expect(first(1, { at: 20 }).verdict).toBe('FAIL');
  });

  it('fails a row whose errors must fall and do not', () => {
    const parts = { check: 'made', quantity: 'q', source: '', reference: 1, gate: 1, falling: true };
    const verdict = (...offs: number[]) => row({ ...parts, ours: offs.map((off, n) => ({ cells: 10 * (n + 1), value: 1 + off })) }).verdict;
    expect(verdict(0.002, 0.001)).toBe('pass');
    expect(verdict(0.001, 0.002)).toBe('FAIL');
  });

  it('fails what is not a number', () => {
    const nothing = [{ cells: 10, value: Number.NaN }];
    expect(row({ check: 'made', quantity: 'q', source: '', reference: 1, gate: 1, ours: nothing }).verdict).toBe('FAIL');
  });

  it('holds a published sign against an interval', () => {
    const verdict = (sign: 1 | -1, low: number, high: number) =>
      finding({ check: 'made', quantity: 'q', source: '', sign, unit: 'Pa', grid: '3 seeds', seen: { value: (low + high) / 2, low, high } })
        .verdict;
    expect([verdict(1, 0.1, 0.3), verdict(1, -0.1, 0.3), verdict(1, -0.3, -0.1)]).toEqual(['pass', "can't tell", 'FAIL']);
    expect([verdict(-1, 0.1, 0.3), verdict(-1, -0.1, 0.3), verdict(-1, -0.3, -0.1)]).toEqual(['FAIL', "can't tell", 'pass']);
    expect(verdict(1, Number.NaN, Number.NaN)).toBe('FAIL');
    expect(isFinding(first(0.7))).toBe(false);
  });

  it('stands in text, Markdown and CSV', () => {
    const rows = [first(1)];
    expect(plainTable(rows).split('\n')[1]).toContain('10: 2.064, 20: 2.032, 40: 2.016');
    expect(markdownTable(rows).split('\n')[2]).toMatch(/^\| made \| a, quoted \|.*\| 0\.8 % \| 1\.00 \| 1 % \| pass \|$/);
    const lines = csvTable(rows).trimEnd().split('\n');
    expect(lines).toHaveLength(4);
    expect(lines[3]).toMatch(/^made,"a, quoted",none \[V\],2,40,2\.016,/);
  });

  it('lists known shortfalls of checks that there are, and excuses no other', () => {
    const names = CHECKS.map(({ name }) => name);
    for (const { check } of KNOWN) expect(names).toContain(check);
    expect(shortfallOf(first(0.7))).toBeUndefined();
  });
});

describe('npm run validate', () => {
  it('runs a check by name and refuses names it does not know', () => {
    execFileSync('npx', ['tsc', '-p', 'test/physics/tsconfig.json']);
    const run = (...words: string[]) => spawnSync('node', [BUILT, ...words], { encoding: 'utf8' });
    const seen = run('taylor-green');
    expect(seen.status).toBe(0);
    expect(seen.stdout).toContain('4 of 4 gates held');
    const refused = run('no-such-check');
    expect(refused.status).toBe(2);
    expect(refused.stderr).toContain('taylor-green');
  });
});
