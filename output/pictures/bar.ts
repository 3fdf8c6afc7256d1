import { type Canvas, INK, TEXT_SCALE } from './canvas.ts';
import { type ColourMap, colourAt } from './colours.ts';
import { CAPITAL_ROWS } from './font.ts';
import { ticks, tickText } from './ticks.ts';

/** An upright colour bar. The tips show that larger values exist and get the colour of the end. */
export interface Bar {
  x: number;
  y: number;
  height: number;
  map: ColourMap;
  from: number;
  to: number;
  /** quantity and unit */
  title: string;
  openBelow?: boolean;
  /** picture pixels to the font pixel; everything but the height grows with it */
  textScale?: number;
}

/** In font pixels. */
const BAR_WIDTH = 8;
const TIP = 5;
const TITLE_ROOM = 14;

/** Draws the bar with its title above and ticks on its right; takes some 40 font pixels in width or the title's. */
export function drawBar(canvas: Canvas, bar: Bar): void {
  const { x, map, from, to, textScale: scale = TEXT_SCALE } = bar;
  const width = BAR_WIDTH * scale;
  const tip = TIP * scale;
  canvas.text(x, bar.y, bar.title, { scale });
  const top = bar.y + TITLE_ROOM * scale + tip;
  const height = bar.height - TITLE_ROOM * scale - 2 * tip;
  for (let row = 0; row < height; row++) {
    canvas.fill(x, top + row, width, 1, colourAt(map, 1 - row / (height - 1)));
  }
  for (let row = 0; row < tip; row++) {
    const inset = Math.round((row + 1) * (width / 2 / tip));
    canvas.fill(x + inset, top - 1 - row, width - 2 * inset, 1, colourAt(map, 1));
    if (bar.openBelow) canvas.fill(x + inset, top + height + row, width - 2 * inset, 1, colourAt(map, 0));
  }
  for (const value of ticks(from, to, 5)) {
    const row = top + Math.round((1 - (value - from) / (to - from)) * (height - 1));
    canvas.fill(x + width, row, 2 * scale, Math.ceil(scale / 2), INK);
    // apart from the tick, which would read as a minus
    canvas.text(x + width + 6 * scale, row - Math.round((CAPITAL_ROWS * scale) / 2), tickText(value), { scale });
  }
}
