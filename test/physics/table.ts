import type { Row } from './row.ts';
import { shortfallOf } from './shortfalls.ts';

const digits = (value: Row['reference']): string => {
  if (typeof value === 'string') return value;
  if (value === 0 || !Number.isFinite(value)) return String(value);
  const size = Math.abs(value);
  return size >= 1e5 || size < 1e-3 ? value.toExponential(2) : String(Number(value.toPrecision(5)));
};

const short = (value: number): string => (Math.abs(value) >= 1e-3 ? String(Number(value.toPrecision(2))) : value.toExponential(1));

const withUnit = (value: number, unit: string): string => (unit === '' ? short(value) : `${short(value)} ${unit}`);

const HEADER = ['check', 'quantity', 'source', 'reference', 'ours on each grid', 'error', 'order', 'gate', 'verdict'];

function cells(row: Row): string[] {
  const ours = row.ours.map(({ grid, value }) => `${grid}: ${digits(value)}`).join(', ');
  const order = row.order === undefined ? '' : row.order.toFixed(2);
  const gate = row.gate === undefined ? '' : withUnit(row.gate, row.unit);
  const verdict = row.verdict === 'FAIL' && shortfallOf(row) !== undefined ? 'FAIL (known)' : row.verdict;
  return [row.check, row.quantity, row.source, digits(row.reference), ours, withUnit(row.error, row.unit), order, gate, verdict];
}

/** What is held to the last bit and therefore stands in the tests, not in a table of errors. */
const BESIDE =
  'Any number of threads, a periodic shift, and a restart after a stop or a kill give the same bits, a mirrored or turned box the same values to round-off: ' +
  'tests (threads, properties, symmetry, simulate, resume). The published table of Celik et al. 2008 is a test as well (convergence).';
const FINDINGS =
  'A finding-... row holds a published sign against our 95 % interval: its error is half that interval, FAIL means that ours has the other sign.';

/** For a terminal: columns of equal width. */
export function plainTable(rows: readonly Row[]): string {
  const lines = [HEADER, ...rows.map(cells)];
  const widths = HEADER.map((_, n) => Math.max(...lines.map((line) => line[n].length)));
  const padded = lines.map((line) =>
    line
      .map((text, n) => text.padEnd(widths[n]))
      .join('  ')
      .trimEnd(),
  );
  return [...padded, '', FINDINGS, BESIDE].join('\n');
}

/** For the README. */
export function markdownTable(rows: readonly Row[]): string {
  const line = (texts: string[]): string => `| ${texts.map((text) => text.replaceAll('|', '\\|')).join(' | ')} |`;
  return [line(HEADER), line(HEADER.map(() => '---')), ...rows.map((row) => line(cells(row))), '', FINDINGS, '', BESIDE].join('\n');
}

/** One line a grid, so that a reader needs to split no cell. */
export function csvTable(rows: readonly Row[]): string {
  const quoted = (text: string): string => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);
  const header = [
    'check',
    'quantity',
    'source',
    'reference',
    'grid',
    'value',
    'error',
    'unit',
    'order',
    'gate',
    'verdict',
    'known shortfall',
  ];
  const lines = rows.flatMap((row) =>
    row.ours.map(({ grid, value, error }) => [
      ...[row.check, row.quantity, row.source, String(row.reference), grid, String(value), String(error), row.unit],
      ...[row.order === undefined ? '' : String(row.order), row.gate === undefined ? '' : String(row.gate), row.verdict],
      row.verdict === 'FAIL' ? (shortfallOf(row) ?? '') : '',
    ]),
  );
  return `${[header, ...lines].map((line) => line.map(quoted).join(',')).join('\n')}\n`;
}
