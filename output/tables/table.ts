import { csvFormatRows } from 'd3-dsv';

/** A table ready to be written: header names end in their SI unit, dimensionless ones have none. */
export type Cell = string | number | boolean | null;

/**
 * Comma-separated text with a header line and a line end after every row. Numbers carry seven significant digits, as much as
 * the computation holds; null, NaN and infinities become empty cells; yes and no are 1 and 0.
 */
export function csv(header: readonly string[], rows: readonly (readonly Cell[])[]): string {
  return `${csvFormatRows([[...header], ...rows.map((row) => row.map(cellText))])}\n`;
}

function cellText(cell: Cell): string {
  if (cell === null) return '';
  if (typeof cell === 'boolean') return cell ? '1' : '0';
  if (typeof cell === 'string') return cell;
  return Number.isFinite(cell) ? String(Number(cell.toPrecision(7))) : '';
}
