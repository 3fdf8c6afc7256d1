import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parquetReadObjects } from 'hyparquet';
import { afterAll, describe, expect, it } from 'vitest';
import { type ResultRow, resultsCsv, resultsParquet } from '../../output/sweep/results.ts';

/** Rows as a long night leaves them: most done, with numbers of all sizes, some failed with messages that a table must quote. */
const KEYS = ['channel.gap_m', 'channel.membranes'];
const MESSAGES = ['fins: leave "no" way, past 3 mm', 'zwei\nZeilen; µm, °C', ' kept blanks ', ''];
const ROWS: ResultRow[] = Array.from({ length: 2000 }, (_, i): ResultRow => {
  const failed = i % 7 === 3;
  const value = (i % 2 === 0 ? 1 : -1) * 1.234567 * 10 ** ((i % 61) - 30);
  return {
    point: i + 1,
    values: [0.006 + i * 1e-6, i % 3 === 0 ? '[left]' : '[left, right]'],
    seed: 1 + (i % 5),
    status: failed ? 'failed' : 'done',
    error: failed ? { kind: 'diverged', message: MESSAGES[i % 4] } : undefined,
    answers: failed
      ? new Map()
      : new Map([
          ['mean_shear_right_Pa', { value, low: i % 11 === 0 ? null : value - Math.abs(value) / 8, high: i % 11 === 0 ? null : value }],
        ]),
    timeTaken_s: failed ? null : i / 8,
    version: '0.1.0',
    case_sha256: 'ab'.repeat(32),
  };
});

const folder = mkdtempSync(join(tmpdir(), 'swathe-results-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

/** A cell of the CSV file as text: seven figures of a number, nothing for none. */
const figure = (cell: unknown): string => {
  if (cell === null || cell === undefined) return '';
  return typeof cell === 'number' ? String(Number(cell.toPrecision(7))) : String(cell);
};

/** What the columns of a row hold, by name. */
const expected = ({ point, values, seed, status, error, answers, timeTaken_s, version, case_sha256 }: ResultRow) => {
  const answer = answers.get('mean_shear_right_Pa');
  return {
    point,
    [KEYS[0]]: values[0],
    [KEYS[1]]: values[1],
    seed,
    status,
    mean_shear_right_Pa: answer?.value ?? null,
    low_mean_shear_right_Pa: answer?.low ?? null,
    high_mean_shear_right_Pa: answer?.high ?? null,
    error_kind: error?.kind ?? null,
    error: error?.message ?? null,
    timeTaken_s,
    version,
    case_sha256,
  };
};

describe('a table of two thousand rows', () => {
  const noPython = spawnSync('python3', ['--version']).status !== 0;
  it.skipIf(noPython)(`is read by the csv module of Python as it was written${noPython ? ' (left out: needs python3)' : ''}`, () => {
    const file = join(folder, 'results.csv');
    writeFileSync(file, resultsCsv(KEYS, ROWS));
    const program = 'import csv, json, sys; print(json.dumps(list(csv.DictReader(open(sys.argv[1], newline="", encoding="utf-8")))))';
    const read = JSON.parse(execFileSync('python3', ['-c', program, file], { encoding: 'utf8', maxBuffer: 1e8 })) as object[];
    expect(read).toHaveLength(2000);
    ROWS.forEach((row, i) => {
      expect(read[i]).toEqual(Object.fromEntries(Object.entries(expected(row)).map(([name, cell]) => [name, figure(cell)])));
    });
  });

  it('is read from Parquet with every number in full', async () => {
    const bytes = resultsParquet(KEYS, ROWS);
    const file = bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength) as ArrayBuffer;
    const read = await parquetReadObjects({ file });
    expect(read).toHaveLength(2000);
    ROWS.forEach((row, i) => {
      expect(read[i]).toEqual({ ...expected(row), point: BigInt(row.point), seed: BigInt(row.seed) });
    });
  });
});
