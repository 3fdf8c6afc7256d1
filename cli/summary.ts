import type { Measures, Sureness } from '../output/index.ts';
import { percent, plain } from './numbers.ts';

type Answers = Map<string, Measures['answers'][number]>;

/** The answers of a run on a page: what each wall felt, what the channel did, how sure that is, what to bear in mind. */
export function summaryPage(measures: Measures): string {
  const { above_Pa, within_s } = measures.swept;
  const answers: Answers = new Map(measures.answers.map((answer) => [answer.name, answer]));
  const sides = (['left', 'right'] as const).map((side) => [side, `${side}${measures.walls[side].membrane ? '' : ' (plain)'}`]);
  const both = measures.walls.left.membrane && measures.walls.right.membrane;
  const rows = (both ? [...sides, ['together', 'together']] : sides).map(([place, head]) => [
    head,
    sure(answers, `swept_${place}`),
    sure(answers, `touched_${place}`),
    sure(answers, `mean_shear_${place}_Pa`),
    sure(answers, `p95_shear_${place}_Pa`),
    sure(answers, `under_gas_${place}`),
  ]);
  const heads = ['wall', 'swept', 'gas touched', 'mean shear', '95th percentile', 'time under gas'];
  return [
    `swept: share of the wall above ${plain(above_Pa)} Pa at least once within ${plain(within_s)} s`,
    table([heads, ...rows]),
    `channel: hold-up ${sure(answers, 'holdup')}, upflow ${sure(answers, 'upflow_m_s')} (means after settling; hold-up: share of gas)`,
    'in brackets: 95 % interval, ? where this recording cannot tell it',
    ...besides(answers, measures),
    basisLine(measures),
    ...measures.notes.map((note) => `note: ${note}`),
  ].join('\n');
}

/** How sure measures are against what is asked: `swept_left within 7.1 % (5 % asked)`. */
export function sureLine(found: readonly Sureness[]): string {
  return found.map(({ name, within, reached }) => `${name} within ${percent(reached, 2)} (${percent(within, 2)} asked)`).join(', ');
}

/** A value with the ends of its interval, all in its unit; shares in percent. */
function sure(answers: Answers, name: string): string {
  const { value = null, low = null, high = null } = answers.get(name) ?? {};
  const unit = name.endsWith('_Pa') ? ' Pa' : name.endsWith('_m_s') ? ' m/s' : ' %';
  const scale = unit === ' %' ? 100 : 1;
  if (value === null) return '-';
  const ends = low === null || high === null ? '?' : `${plain(scale * low)} to ${plain(scale * high)}`;
  return `${plain(scale * value)} (${ends})${unit}`;
}

function basisLine({ basis: { passages, independent }, recorded }: Measures): string {
  const held_s = recorded.samples * recorded.every_s;
  const worth = independent.together === null ? '' : `, worth about ${Math.round(independent.together)} independent moments`;
  const ended = { span: '', sure: '; sure enough to end there', atMost: '; the most that was asked', stopped: '' }[recorded.ended];
  const bubbles = `${passages.together} ${passages.together === 1 ? 'bubble' : 'bubbles'} passing (left ${passages.left}, right ${passages.right})`;
  return [`rests on ${plain(held_s)} s with ${bubbles}${worth}${ended}`, ...recorded.until.map((one) => sureLine([one]))].join('\n');
}

/** 1 m3/(m2 s) in L/(m2 h), as the trade counts a flux. */
const LITRES = 3.6e6;

/** What follows from the shear of the membrane walls together: back-transport, and the deposit where it is asked for. */
function besides(answers: Answers, { backTransport }: Measures): string[] {
  const found: string[] = [];
  const { worst } = backTransport.together;
  if (worst !== null) {
    const [diameter_um, flux] = [2e6 * worst.radius_m, LITRES * worst.total_m_s];
    found.push(
      `back-transport: a flux of up to ${plain(flux)} L/(m2 h) is sustained for particles of ${plain(diameter_um)} um, the worst size; an estimate`,
    );
  }
  const cover = answers.get('settled_cover_together')?.value ?? null;
  if (cover !== null) found.push(`deposit: covers ${percent(cover)} of the membranes once settled, by a model`);
  return found;
}

/** Columns with two spaces between, the first to the left, the others to the right. */
export function table(rows: string[][]): string {
  const widths = rows[0].map((_, column) => Math.max(...rows.map((row) => row[column].length)));
  return rows.map((row) => row.map((cell, i) => (i === 0 ? cell.padEnd(widths[i]) : cell.padStart(widths[i]))).join('  ')).join('\n');
}
