import type { Measures } from '../output/index.ts';
import { percent, plain } from './numbers.ts';

/** The answers of a run on a page: what each wall felt, what the channel did, what to bear in mind. */
export function summaryPage(measures: Measures): string {
  const { above_Pa, within_s } = measures.swept;
  const sides = ['left', 'right'] as const;
  const rows = sides.map((side) => {
    const { membrane, swept, shear } = measures.walls[side];
    return [
      `${side}${membrane ? '' : ' (plain)'}`,
      percent(swept.within),
      percent(swept.touched.within),
      `${plain(shear.meanAbs_Pa)} Pa`,
      `${plain(shear.percentiles_Pa.p95)} Pa`,
      percent(shear.shareUnderGas),
    ];
  });
  const heads = ['wall', 'swept', 'gas touched', 'mean |tau|', '95th perc.', 'time under gas'];
  return [
    `swept: share of the wall above ${plain(above_Pa)} Pa at least once within ${plain(within_s)} s`,
    table([heads, ...rows]),
    `channel: hold-up ${percent(measures.loop.holdup)}, upflow ${plain(measures.loop.upflow_m_s)} m/s (means after settling)`,
    ...measures.notes.map((note) => `note: ${note}`),
  ].join('\n');
}

/** Columns with two spaces between, the first to the left, the others to the right. */
export function table(rows: string[][]): string {
  const widths = rows[0].map((_, column) => Math.max(...rows.map((row) => row[column].length)));
  return rows.map((row) => row.map((cell, i) => (i === 0 ? cell.padEnd(widths[i]) : cell.padStart(widths[i]))).join('  ')).join('\n');
}
