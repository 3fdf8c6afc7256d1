import { drawAxes, drawTitle, type Plot, ROOM } from '../pictures/axes.ts';
import { drawBar } from '../pictures/bar.ts';
import { Canvas, type Colour, PALE_INK } from '../pictures/canvas.ts';
import { colourAt, SPEED_MAP } from '../pictures/colours.ts';
import { tickText } from '../pictures/ticks.ts';
import { placeOf, type SweepPicture, wordsOf } from './overview.ts';

const PANEL = { width: 420, height: 340, legend: 270, gapDown: 74 };
const MISSING: Colour = [225, 228, 232];
/** Most labels on an axis: fields may be many. */
const LABELS = 6;

/**
 * Two varied keys as a map of each measure: one field a pair of values, coloured by the mean over seeds; grey where no case was finished.
 * Fields stand side by side whatever the distance of their values, which the axes name.
 */
export function drawMap(picture: SweepPicture): Buffer {
  const { measures, keys, title } = picture;
  const canvas = new Canvas(ROOM.left + PANEL.width + PANEL.legend, ROOM.top + measures.length * (PANEL.height + PANEL.gapDown));
  drawTitle(canvas, ROOM.left, 10, title, 'mean over seeds; grey: no finished case');
  const across = fieldsOf(picture, 0);
  const up = fieldsOf(picture, 1);
  measures.forEach((measure, j) => {
    const plot: Plot = { x: ROOM.left, y: ROOM.top + j * (PANEL.height + PANEL.gapDown), width: PANEL.width, height: PANEL.height };
    drawFields(canvas, plot, picture, measure, across, up);
    drawAxes(canvas, plot, { title: keys[0], ticks: labels(across) }, { title: keys[1], ticks: labels(up) });
  });
  return canvas.encode();
}

/** The values of a key in rising order (words: in the order of the plan), and the field of each. */
interface Fields {
  values: number[];
  words: string[] | undefined;
}

function fieldsOf(picture: SweepPicture, k: number): Fields {
  const words = wordsOf(picture, k);
  const values = [...new Set(picture.rows.map((row) => placeOf(row, k, words)))].sort((a, b) => a - b);
  return { values, words };
}

function labels({ values, words }: Fields): { at: number; label: string }[] {
  const every = Math.ceil(values.length / LABELS);
  return values
    .map((value, i) => ({ at: (i + 0.5) / values.length, label: words?.[value].slice(0, 12) ?? tickText(value) }))
    .filter((_, i) => i % every === 0);
}

function drawFields(canvas: Canvas, plot: Plot, picture: SweepPicture, measure: string, across: Fields, up: Fields): void {
  const sums = new Map<string, { sum: number; count: number }>();
  for (const row of picture.rows) {
    const value = row.answers.get(measure)?.value;
    if (value === undefined || value === null) continue;
    const field = `${across.values.indexOf(placeOf(row, 0, across.words))} ${up.values.indexOf(placeOf(row, 1, up.words))}`;
    const { sum, count } = sums.get(field) ?? { sum: 0, count: 0 };
    sums.set(field, { sum: sum + value, count: count + 1 });
  }
  const means = [...sums.values()].map(({ sum, count }) => sum / count);
  const from = Math.min(...means);
  const to = Math.max(...means);
  for (let i = 0; i < across.values.length; i++) {
    for (let j = 0; j < up.values.length; j++) {
      const found = sums.get(`${i} ${j}`);
      const share = found === undefined || to === from ? 0.5 : (found.sum / found.count - from) / (to - from);
      const left = Math.round((i * plot.width) / across.values.length);
      const top = Math.round(((up.values.length - 1 - j) * plot.height) / up.values.length);
      const right = Math.round(((i + 1) * plot.width) / across.values.length);
      const bottom = Math.round(((up.values.length - j) * plot.height) / up.values.length);
      canvas.fill(plot.x + left, plot.y + top, right - left, bottom - top, found === undefined ? MISSING : colourAt(SPEED_MAP, share));
    }
  }
  if (to > from) drawBar(canvas, { x: plot.x + plot.width + 20, y: plot.y, height: plot.height, map: SPEED_MAP, from, to, title: measure });
  else canvas.text(plot.x + plot.width + 20, plot.y, measure, { colour: PALE_INK });
}
