import { type Canvas, INK, PALE_INK, TEXT_SCALE } from './canvas.ts';
import { CAPITAL_ROWS, LETTER_ROWS } from './font.ts';

/** The part of a picture that shows data, in pixels. */
export interface Plot {
  x: number;
  y: number;
  width: number;
  height: number;
}

/** A place on an axis, 0 to 1 from its lower end, and what stands beside it. */
export interface Tick {
  at: number;
  label: string;
}

const TICK = 6;
const GAP = 6;
const HALF_LETTER = (CAPITAL_ROWS * TEXT_SCALE) / 2;

/** A frame around the plot and ticks with labels below and on the left; titles name quantity and unit. */
export function drawAxes(canvas: Canvas, plot: Plot, across: { title: string; ticks: Tick[] }, up: { title: string; ticks: Tick[] }): void {
  canvas.frame(plot.x, plot.y, plot.width, plot.height, INK);
  for (const tick of across.ticks) {
    const x = plot.x + Math.round(tick.at * (plot.width - 1));
    canvas.fill(x, plot.y + plot.height + 1, 1, TICK, INK);
    canvas.text(x, plot.y + plot.height + TICK + GAP, tick.label, { hang: 0 });
  }
  canvas.text(plot.x + plot.width / 2, plot.y + plot.height + TICK + 2 * GAP + LETTER_ROWS * TEXT_SCALE, across.title, { hang: 0 });
  for (const tick of up.ticks) {
    const y = plot.y + Math.round((1 - tick.at) * (plot.height - 1));
    canvas.fill(plot.x - TICK - 1, y, TICK, 1, INK);
    canvas.text(plot.x - TICK - GAP, y - HALF_LETTER, tick.label, { hang: 1 });
  }
  canvas.text(4, plot.y + plot.height / 2, up.title, { hang: 0, upward: true });
}

/** What the picture shows, and under it what it was made from. */
export function drawTitle(canvas: Canvas, x: number, y: number, title: string, from: string): void {
  canvas.text(x, y, title);
  canvas.text(x, y + LETTER_ROWS * TEXT_SCALE + GAP, from, { colour: PALE_INK });
}

/** Room that titles and axes need around a plot. */
export const ROOM = { top: 64, bottom: 60, left: 84 };
