import { rgb } from 'd3-color';
import { interpolateViridis } from 'd3-scale-chromatic';
import type { Plot } from '../pictures/axes.ts';
import type { Canvas, Colour } from '../pictures/canvas.ts';

/** Room that {@link drawLegend} needs on the right of a plot. */
export const LEGEND_WIDTH = 360;
const LEGEND_LINE = 26;
const LONGEST_NAME = 30;
/** Of a point. */
export const RADIUS = 5;

/** Colours of geometries in the order of the ranking: apart in lightness too, readable with any colour vision. */
export function seriesColours(count: number): Colour[] {
  return Array.from({ length: count }, (_, i): Colour => {
    const { r, g, b } = rgb(interpolateViridis(count === 1 ? 0.3 : (0.85 * i) / (count - 1)));
    return [r, g, b];
  });
}

/** A line between two points, `thick` pixels wide, with soft edges. */
export function drawLine(
  canvas: Canvas,
  from: readonly [number, number],
  to: readonly [number, number],
  colour: Colour,
  thick: number,
): void {
  const [x0, y0] = from;
  const along = [to[0] - x0, to[1] - y0];
  const length2 = along[0] ** 2 + along[1] ** 2;
  const reach = thick / 2 + 1;
  for (let y = Math.floor(Math.min(y0, to[1]) - reach); y <= Math.max(y0, to[1]) + reach; y++) {
    for (let x = Math.floor(Math.min(x0, to[0]) - reach); x <= Math.max(x0, to[0]) + reach; x++) {
      const share = length2 === 0 ? 0 : Math.min(1, Math.max(0, ((x - x0) * along[0] + (y - y0) * along[1]) / length2));
      const distance = Math.hypot(x - x0 - share * along[0], y - y0 - share * along[1]);
      canvas.blend(x, y, colour, thick / 2 + 0.5 - distance);
    }
  }
}

/** A filled disc with a soft edge. */
export function drawDisc(canvas: Canvas, x: number, y: number, radius: number, colour: Colour): void {
  drawLine(canvas, [x, y], [x, y], colour, 2 * radius);
}

/** Names beside the plot, each with the point of its colour; returns the height of the next line. */
export function drawLegend(canvas: Canvas, plot: Plot, names: readonly string[], colours: readonly Colour[]): number {
  names.forEach((name, i) => {
    const y = plot.y + 8 + i * LEGEND_LINE;
    drawDisc(canvas, plot.x + plot.width + 28, y + 6, RADIUS, colours[i]);
    canvas.text(plot.x + plot.width + 44, y, name.length > LONGEST_NAME ? `${name.slice(0, LONGEST_NAME - 3)}...` : name);
  });
  return plot.y + 16 + names.length * LEGEND_LINE;
}
