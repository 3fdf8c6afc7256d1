import { drawAxes, drawTitle, type Plot, ROOM } from '../pictures/axes.ts';
import { Canvas, type Colour, PALE_INK } from '../pictures/canvas.ts';
import { ticks, tickText } from '../pictures/ticks.ts';
import type { ResultRow } from './results.ts';

/** What a picture of a sweep is made from. */
export interface SweepPicture {
  title: string;
  /** names of the varied columns */
  keys: readonly string[];
  rows: readonly ResultRow[];
  /** names of the answers to show */
  measures: readonly string[];
}

const PANEL = { width: 360, height: 230, gapAcross: 96, gapDown: 74, right: 30 };
/** What the line below the title needs, where panels take less. */
const TITLE_WIDTH = 700;
const POINT: Colour = [40, 96, 160];
const INTERVAL: Colour = [150, 178, 210];
const MEAN: Colour = [196, 98, 16];
/** Half the side of a point's mark, pixels. */
const MARK = 2;
/** The axes reach beyond the outermost values by this share. */
const MARGIN = 0.06;

/** The rows that have a value, with their place along one key: numbers as they are, words numbered in the order of the plan. */
interface Placed {
  at: number;
  value: number;
  low: number | null;
  high: number | null;
}

/**
 * Every measure against every varied key: a mark for each case with its 95 % interval where that is known, and a line through the means of
 * the cases that share a value of the key. What spreads at one value is what the other keys and seeds do.
 */
export function drawOverview(picture: SweepPicture): Buffer {
  const { keys, measures, rows, title } = picture;
  const width = ROOM.left + keys.length * (PANEL.width + PANEL.gapAcross) - PANEL.gapAcross + PANEL.right;
  const canvas = new Canvas(Math.max(width, TITLE_WIDTH), ROOM.top + measures.length * (PANEL.height + PANEL.gapDown));
  const shown = rows.filter(({ status }) => status === 'done').length;
  drawTitle(canvas, ROOM.left, 10, title, `${shown} of ${rows.length} cases; bars: 95 % intervals; line: mean over the other keys`);
  measures.forEach((measure, j) => {
    keys.forEach((key, k) => {
      const plot: Plot = {
        x: ROOM.left + k * (PANEL.width + PANEL.gapAcross),
        y: ROOM.top + j * (PANEL.height + PANEL.gapDown),
        width: PANEL.width,
        height: PANEL.height,
      };
      drawPanel(canvas, plot, placedAlong(picture, measure, k), key, measure, wordsOf(picture, k));
    });
  });
  return canvas.encode();
}

/** The words a key takes, in the order of the plan; undefined where all its values are numbers. */
export function wordsOf({ rows }: SweepPicture, k: number): string[] | undefined {
  return rows.every(({ values }) => typeof values[k] === 'number') ? undefined : [...new Set(rows.map(({ values }) => String(values[k])))];
}

/** Where a row stands along a key. */
export function placeOf(row: ResultRow, k: number, words: readonly string[] | undefined): number {
  return words === undefined ? (row.values[k] as number) : words.indexOf(String(row.values[k]));
}

function placedAlong(picture: SweepPicture, measure: string, k: number): Placed[] {
  const words = wordsOf(picture, k);
  return picture.rows.flatMap((row) => {
    const answer = row.answers.get(measure);
    if (answer === undefined || answer.value === null) return [];
    return [{ at: placeOf(row, k, words), value: answer.value, low: answer.low, high: answer.high }];
  });
}

function drawPanel(canvas: Canvas, plot: Plot, placed: readonly Placed[], key: string, measure: string, words: string[] | undefined): void {
  const across = extent(words === undefined ? placed.map(({ at }) => at) : [0, words.length - 1]);
  const up = extent(placed.flatMap(({ value, low, high }) => [value, low ?? value, high ?? value]));
  const column = (at: number): number => plot.x + Math.round(((at - across.from) / (across.to - across.from)) * (plot.width - 1));
  const row = (value: number): number => plot.y + Math.round((1 - (value - up.from) / (up.to - up.from)) * (plot.height - 1));
  if (placed.length === 0) canvas.text(plot.x + plot.width / 2, plot.y + plot.height / 2, 'no values', { hang: 0, colour: PALE_INK });
  for (const { at, low, high } of placed) {
    if (low === null || high === null) continue;
    canvas.fill(column(at), row(high), 1, row(low) - row(high) + 1, INTERVAL);
  }
  for (const { at, value } of placed) canvas.fill(column(at) - MARK, row(value) - MARK, 2 * MARK + 1, 2 * MARK + 1, POINT);
  const means = meansAlong(placed);
  if (words === undefined && means.length < placed.length) {
    for (let i = 1; i < means.length; i++)
      drawLine(canvas, column(means[i - 1].at), row(means[i - 1].mean), column(means[i].at), row(means[i].mean));
  }
  const acrossTicks =
    words?.map((word, at) => ({ value: at, label: word.slice(0, 12) })) ??
    ticks(across.from, across.to, 5).map((value) => ({ value, label: tickText(value) }));
  drawAxes(
    canvas,
    plot,
    { title: key, ticks: acrossTicks.map(({ value, label }) => ({ at: (value - across.from) / (across.to - across.from), label })) },
    {
      title: measure,
      ticks: ticks(up.from, up.to, 4).map((value) => ({ at: (value - up.from) / (up.to - up.from), label: tickText(value) })),
    },
  );
}

function meansAlong(placed: readonly Placed[]): { at: number; mean: number }[] {
  const groups = new Map<number, number[]>();
  for (const { at, value } of placed) groups.set(at, [...(groups.get(at) ?? []), value]);
  return [...groups]
    .map(([at, values]) => ({ at, mean: values.reduce((sum, value) => sum + value, 0) / values.length }))
    .sort((a, b) => a.at - b.at);
}

/** From the least to the greatest, with a margin; one value alone gets room on both sides. */
function extent(values: readonly number[]): { from: number; to: number } {
  const least = values.reduce((a, b) => Math.min(a, b), Number.POSITIVE_INFINITY);
  const most = values.reduce((a, b) => Math.max(a, b), Number.NEGATIVE_INFINITY);
  if (!(most >= least)) return { from: 0, to: 1 };
  const room = most > least ? MARGIN * (most - least) : Math.max(Math.abs(most) / 2, 1e-9);
  return { from: least - room, to: most + room };
}

function drawLine(canvas: Canvas, x0: number, y0: number, x1: number, y1: number): void {
  const steps = Math.max(1, Math.abs(x1 - x0), Math.abs(y1 - y0));
  for (let i = 0; i <= steps; i++) canvas.fill(x0 + ((x1 - x0) * i) / steps, y0 + ((y1 - y0) * i) / steps, 1, 2, MEAN);
}
