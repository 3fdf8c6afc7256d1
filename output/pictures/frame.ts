import type { Case, Derived, Snapshot } from '../../cases/index.ts';
import { drawBar } from './bar.ts';
import { Canvas, FIN, INK, PALE_INK, TEXT_SCALE } from './canvas.ts';
import { SPEED_MAP } from './colours.ts';
import { CAPITAL_ROWS, textWidth } from './font.ts';
import { drawStrip, type Placing, type Point, place, WALL_PIXELS, wallKey } from './strip.ts';
import { roundBelow, tickText } from './ticks.ts';

/** How a frame is drawn. All frames of one run drawn with the same style have the same size and colours. */
export interface FrameStyle {
  case: Case;
  derived: Derived;
  /** the channel as it leans; false draws it upright. Leaning by default where the case has a tilt */
  asTilted?: boolean;
  /** whole pixels to the cell; by default so many that the channel is some 1800 pixels long, 6 at most */
  scale?: number;
  /** speed at the end of the colour bar; faster cells get its colour. Twice the case's `grid.speed` by default: jets between bubbles pass it */
  speedTop_m_s?: number;
}

const LONGEST_PIXELS = 1800;
const LARGEST_SCALE = 6;
const MARGIN = 16;
/** A picture taller than this gets larger letters, for it is looked at from farther. */
const TALL_PIXELS = 1500;
const TALL_TEXT_SCALE = 3;
/** In font pixels: between the channel and the legend, the legend's width and its lines. */
const GUTTER = 14;
const LEGEND_WIDTH = 75;
const LINE = 13;
const BAR_HEIGHT = 115;
const SCALE_BAR = 65;
const BAND_LABELS = ['release', 'skim'] as const;

/**
 * Draws states of one channel as PNGs: speed as colour, bubbles as light shapes with a dark edge, fins, walls, the ends of the release and
 * skim bands as dashed lines; beside it time, colour bar and a scale bar. A positive tilt leans to the left: the right wall faces down.
 * All are drawn on one canvas, for new memory each time takes as long as the channel itself.
 */
export function framePainter(style: FrameStyle): (snapshot: Snapshot) => Buffer {
  let canvas: Canvas | undefined;
  return (snapshot) => {
    canvas = drawFrame(snapshot, style, canvas);
    return canvas.encode();
  };
}

/** @param used canvas of a frame drawn before, with the same style */
function drawFrame(snapshot: Snapshot, style: FrameStyle, used: Canvas | undefined): Canvas {
  const { derived } = style;
  const { membranes, tilt_rad } = style.case.channel;
  const { nx, ny } = snapshot;
  const scale = style.scale ?? Math.max(1, Math.min(LARGEST_SCALE, Math.floor(LONGEST_PIXELS / nx)));
  const lean_rad = (style.asTilted ?? true) ? tilt_rad : 0;
  const text = nx * scale > TALL_PIXELS ? TALL_TEXT_SCALE : TEXT_SCALE;
  const key = [...wallKey(membranes), ...(snapshot.solid.includes(1) ? [{ colour: FIN, name: 'fin' }] : [])];
  const legendHeight = text * (LINE * (4.5 + key.length + (lean_rad === 0 ? 0 : 1)) + BAR_HEIGHT);

  const layout = arrange(nx, ny, scale, lean_rad, legendHeight, text);
  const canvas = used ?? new Canvas(layout.width, layout.height);
  canvas.clear();
  const bands = [derived.release.to_m / derived.dx_m, derived.skim.from_m / derived.dx_m];
  const speedTop_m_s = style.speedTop_m_s ?? 2 * style.case.grid.speed_m_s;
  drawStrip(canvas, snapshot, layout.placing, { membranes, speedTop_m_s, lines: bands });

  // band names hang on the side of the channel that has no legend
  bands.forEach((along, i) => {
    const side = layout.legendRight ? -WALL_PIXELS - 6 : ny * scale + WALL_PIXELS + 6;
    const at = place(layout.placing, along, side / scale);
    const top = Math.round(at.y - (CAPITAL_ROWS * text) / 2);
    canvas.text(Math.round(at.x), top, BAND_LABELS[i], { hang: layout.legendRight ? 1 : -1, colour: PALE_INK, scale: text });
  });

  const { x } = layout.legend;
  let { y } = layout.legend;
  canvas.text(x, y, `t = ${snapshot.time_s.toFixed(3)} s`, { scale: text });
  y += LINE * text;
  if (lean_rad !== 0) {
    canvas.text(x, y, `tilt ${tickText(Number(((lean_rad * 180) / Math.PI).toFixed(1)))}°`, { scale: text });
    y += LINE * text;
  }
  y += 4 * text;
  drawBar(canvas, { x, y, height: BAR_HEIGHT * text, map: SPEED_MAP, from: 0, to: speedTop_m_s, title: 'speed (m/s)', textScale: text });
  y += (BAR_HEIGHT + LINE / 2) * text;

  const pixelsPerMetre = scale / derived.dx_m;
  const bar_m = roundBelow((SCALE_BAR * text) / pixelsPerMetre);
  const barPixels = Math.round(bar_m * pixelsPerMetre);
  canvas.fill(x, y + 2.5 * text, barPixels, 1.5 * text, INK);
  canvas.fill(x, y, text, 6.5 * text, INK);
  canvas.fill(x + barPixels - text, y, text, 6.5 * text, INK);
  canvas.text(x, y + 10 * text, `${tickText(bar_m * 1000)} mm`, { scale: text });
  y += 2 * LINE * text;

  for (const entry of key) {
    canvas.fill(x, y, 11 * text, CAPITAL_ROWS * text, entry.colour);
    canvas.text(x + 15 * text, y, entry.name, { scale: text });
    y += LINE * text;
  }
  return canvas;
}

interface Layout {
  width: number;
  height: number;
  placing: Placing;
  legend: Point;
  legendRight: boolean;
}

/** Puts the legend into the empty upper corner that the lean leaves, and the band names on the other side. */
function arrange(nx: number, ny: number, scale: number, lean_rad: number, legendHeight: number, text: number): Layout {
  const labels = Math.max(...BAND_LABELS.map(textWidth)) * text + 10;
  const legendWidth = LEGEND_WIDTH * text;
  const gutter = GUTTER * text;
  const wall = WALL_PIXELS / scale;
  const placing: Placing = { originX: 0, originY: 0, scale, tilt_rad: lean_rad };
  const legendRight = lean_rad >= 0;
  // the side of the channel that faces the legend, from its top to its foot, and the other one
  const near = legendRight ? ny + wall : -wall;
  const far = legendRight ? -wall : ny + wall;
  const top = place(placing, nx, near);
  const foot = place(placing, 0, near);
  const corners = [top, foot, place(placing, nx, far), place(placing, 0, far)];
  const minX = Math.min(...corners.map((c) => c.x));
  const maxX = Math.max(...corners.map((c) => c.x));
  const minY = Math.min(...corners.map((c) => c.y));
  const maxY = Math.max(...corners.map((c) => c.y));

  // at the lower end of the legend the leaning side has come nearest
  const depth = Math.min(minY + legendHeight, foot.y);
  const nearest = depth <= top.y ? top.x : top.x + ((depth - top.y) / (foot.y - top.y)) * (foot.x - top.x);
  const height = Math.ceil(Math.max(maxY - minY, legendHeight)) + 2 * MARGIN;
  placing.originY = MARGIN - minY;
  if (legendRight) {
    placing.originX = MARGIN + labels - minX;
    const legendX = Math.ceil(nearest + placing.originX) + gutter;
    const width = Math.ceil(Math.max(maxX + placing.originX, legendX + legendWidth)) + MARGIN;
    return { width, height, placing, legend: { x: legendX, y: MARGIN }, legendRight };
  }
  // mirrored: the channel moves right until the legend fits
  placing.originX = Math.max(MARGIN - minX, MARGIN + legendWidth + gutter - nearest);
  const width = Math.ceil(maxX + placing.originX + labels) + MARGIN;
  const legendX = Math.max(MARGIN, Math.floor(nearest + placing.originX) - gutter - legendWidth);
  return { width, height, placing, legend: { x: legendX, y: MARGIN }, legendRight };
}
