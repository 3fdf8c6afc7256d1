import { parquetWriteBuffer } from 'hyparquet-writer';
import type { Answer } from '../measures/answers.ts';
import { csv } from '../tables/table.ts';

/** One case of a sweep. */
export interface ResultRow {
  point: number;
  /** one per varied key: a number in the column's unit, else text */
  values: readonly (number | string)[];
  seed: number;
  status: 'done' | 'failed' | 'open';
  /** kind and message of a failed one */
  error: { kind: string; message: string } | undefined;
  /** by name; empty unless done */
  answers: ReadonlyMap<string, Answer>;
  timeTaken_s: number | null;
  version: string | null;
  case_sha256: string | null;
}

/** A named column: all its cells are numbers, or all are text; null for none. */
interface Column {
  name: string;
  type: 'DOUBLE' | 'INT64' | 'STRING';
  cells: (number | string | null)[];
}

/**
 * The rows as columns: point, the varied keys, seed, status, then of every answer its value and, with `low_` and `high_` before its name, the
 * ends of its 95 % interval, so that every name still ends in its unit.
 */
function columns(keys: readonly string[], rows: readonly ResultRow[]): Column[] {
  const names = [...new Set(rows.flatMap(({ answers }) => [...answers.keys()]))];
  const numbers = (name: string, cell: (row: ResultRow) => number | null, type: 'DOUBLE' | 'INT64' = 'DOUBLE'): Column => ({
    name,
    type,
    cells: rows.map(cell),
  });
  const texts = (name: string, cell: (row: ResultRow) => string | null): Column => ({ name, type: 'STRING', cells: rows.map(cell) });
  return [
    numbers('point', ({ point }) => point, 'INT64'),
    ...keys.map((key, k) => {
      const all = rows.every(({ values }) => typeof values[k] === 'number');
      return all ? numbers(key, ({ values }) => values[k] as number) : texts(key, ({ values }) => String(values[k]));
    }),
    numbers('seed', ({ seed }) => seed, 'INT64'),
    texts('status', ({ status }) => status),
    ...names.flatMap((name) => [
      numbers(name, ({ answers }) => answers.get(name)?.value ?? null),
      numbers(`low_${name}`, ({ answers }) => answers.get(name)?.low ?? null),
      numbers(`high_${name}`, ({ answers }) => answers.get(name)?.high ?? null),
    ]),
    texts('error_kind', ({ error }) => error?.kind ?? null),
    texts('error', ({ error }) => error?.message ?? null),
    numbers('timeTaken_s', ({ timeTaken_s }) => timeTaken_s),
    texts('version', ({ version }) => version),
    texts('case_sha256', ({ case_sha256 }) => case_sha256),
  ];
}

/** results.csv: one row a case, in the order of the plan. */
export function resultsCsv(keys: readonly string[], rows: readonly ResultRow[]): string {
  const table = columns(keys, rows);
  return csv(
    table.map(({ name }) => name),
    rows.map((_, i) => table.map(({ cells }) => cells[i])),
  );
}

/** The same columns as Parquet: numbers as doubles in full precision, point and seed as integers, the rest as text. */
export function resultsParquet(keys: readonly string[], rows: readonly ResultRow[]): Buffer {
  const columnData = columns(keys, rows).map(({ name, type, cells }) => ({
    name,
    type,
    nullable: true,
    data: type === 'INT64' ? cells.map((cell) => BigInt(cell ?? 0)) : cells,
  }));
  return Buffer.from(parquetWriteBuffer({ columnData }));
}
