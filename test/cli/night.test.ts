import { mkdirSync, writeFileSync } from 'node:fs';
import { afterAll, describe, expect, it } from 'vitest';
import { Bench } from './swathe.ts';
import { FINNED, rowsOf, SLOW } from './sweeps.ts';

const bench = new Bench();
bench.file('finned.yaml', FINNED);
afterAll(() => bench.remove());

/** Gap by tilt by angle as a paired plan, so that single points can be spoiled. */
const POINTS = ['7 mm', '8 mm', '9 mm'].flatMap((gap) =>
  ['0 deg', '10 deg', '20 deg', '30 deg'].flatMap((tilt) => ['0 deg', '30 deg'].map((angle) => ({ gap, tilt, angle }))),
);
/** By number: what is asked for there instead. */
const SPOILED: Record<number, Record<string, string>> = {
  3: { 'channel.gap': '3 mm' },
  8: { grid: '{across: 16, speed: 0.05 m/s}', 'channel.height': '130 mm', 'channel.return': '{upflow: 1.9 m/s}' },
  13: { grid: '{across: 280}' },
  17: { 'record.span': '500 s' },
};
/** Something else stands where the run folder of this one should be. */
const BLOCKED = 22;

describe.skipIf(!SLOW)('twenty-four points, five of which fail in five ways', () => {
  it('end in nineteen rows of results, five rows of clear errors and exit code 5', async () => {
    const column = (key: string, usual: (point: (typeof POINTS)[number]) => string): string =>
      `  - {key: ${key}, values: [${POINTS.map((point, i) => SPOILED[i + 1]?.[key] ?? usual(point)).join(', ')}]}`;
    const vary = [
      column('channel.gap', ({ gap }) => gap),
      column('channel.tilt', ({ tilt }) => tilt),
      column('fins.0.angle', ({ angle }) => angle),
      column('grid', () => '{across: 16}'),
      column('channel.height', () => '36 mm'),
      column('channel.return', () => '{loss: 1}'),
      column('record.span', () => '40 ms'),
    ];
    bench.file('plan.yaml', ['title: Five fail', 'base: finned.yaml', 'vary:', ...vary, 'combine: paired', ''].join('\n'));
    mkdirSync(bench.path('night/points'), { recursive: true });
    writeFileSync(bench.path('night/points', String(BLOCKED).padStart(4, '0')), '');
    const { exit, out, error } = await bench.swathe('sweep', 'plan.yaml', '--out', 'night', '--memory', '190 MB', '--limit', '60 s');
    expect(exit).toBe(5);
    expect(out).toContain('Five fail: 19 of 24 cases done; 5 failed, the column error of the table says why');
    const rows = rowsOf(bench, 'night');
    expect(rows.filter(({ status, mean_shear_right_Pa }) => status === 'done' && mean_shear_right_Pa !== '')).toHaveLength(19);
    const failed = rows.filter(({ status }) => status === 'failed');
    expect(failed.map(({ point, error_kind }) => [point, error_kind])).toEqual([
      ['3', 'case'],
      ['8', 'diverged'],
      ['13', 'memory'],
      ['17', 'time'],
      ['22', 'output'],
    ]);
    const clear = [
      /channel|fins|gas.*(does not|outside|wall)/,
      /the speed is/,
      /^held \d+ MB, more than the 190 MB a case may have; raise --memory/,
      /^took longer than the 1m a case may; raise --limit and give --retry/,
      /points\/0022/,
    ];
    failed.forEach((row, i) => {
      expect(row.error).toMatch(clear[i]);
      expect(row.mean_shear_right_Pa).toBe('');
      expect(error).toContain(`${String(row.point).padStart(4, '0')} FAILED, ${row.error_kind}: `);
    });
  }, 1_800_000);
});
