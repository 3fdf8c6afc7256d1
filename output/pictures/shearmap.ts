import type { Recording, WallSide } from '../../cases/index.ts';
import { drawAxes, drawTitle, type Plot, ROOM } from './axes.ts';
import { drawBar } from './bar.ts';
import { Canvas, FIN, INK, PALE_INK, PAPER, TEXT_SCALE } from './canvas.ts';
import { colourAt, mix, SIGNED_MAP } from './colours.ts';
import { LETTER_ROWS } from './font.ts';
import { roundAbove, ticks, tickText } from './ticks.ts';

export interface ShearMapStyle {
  /** shear at the ends of the colour bar, > 0; by default {@link shearLimit} of both walls, so that their maps compare */
  limit_Pa?: number;
}

const PLOT_WIDTH = 960;
const PLOT_HEIGHT = 640;
const LEGEND_WIDTH = 170;
/** How far the bands fade, 1: wholly. */
const FADE = 0.65;
/** Share of |tau| that the colour bar holds without saturating, before it is rounded up. */
const SHOWN_SHARE = 0.99;
/** Values looked at for the limit; more would not change its first digit. */
const LOOKED_AT = 200_000;

/**
 * What one wall felt as a PNG: time across, height up, colour the signed wall shear in Pa, upward positive. A pixel shows the mean of the
 * samples and elements it covers. Release and skim bands, which no measure counts, are faded and named; elements under a fin are grey.
 */
export function drawShearMap(recording: Recording, side: WallSide, style: ShearMapStyle = {}): Buffer {
  const { case: panel, derived, times_s, membrane } = recording;
  const limit_Pa = style.limit_Pa ?? shearLimit(recording);
  const canvas = new Canvas(ROOM.left + PLOT_WIDTH + LEGEND_WIDTH, ROOM.top + PLOT_HEIGHT + ROOM.bottom);
  const plot: Plot = { x: ROOM.left, y: ROOM.top, width: PLOT_WIDTH, height: PLOT_HEIGHT };
  const carries = panel.channel.membranes.includes(side) ? 'membrane' : 'no membrane';
  drawTitle(canvas, plot.x, 10, `Wall shear, ${side} wall (${carries})`, panel.title);

  const elements = recording.x_m.length;
  const samples = times_s.length;
  if (samples === 0)
    canvas.text(plot.x + plot.width / 2, plot.y + plot.height / 2, 'no wall samples recorded', { hang: 0, colour: PALE_INK });
  else fillPlot(canvas, plot, recording, side, limit_Pa);

  labelBand(canvas, plot, 'release', 0, membrane.first / elements);
  labelBand(canvas, plot, 'skim', membrane.end / elements, 1);

  const every_s = derived.sampleEvery * derived.dt_s;
  const from_s = samples === 0 ? 0 : times_s[0] - every_s;
  const to_s = samples === 0 ? 1 : times_s[samples - 1];
  const height_mm = elements * derived.dx_m * 1000;
  drawAxes(
    canvas,
    plot,
    { title: 'time (s)', ticks: ticks(from_s, to_s, 8).map((t) => ({ at: (t - from_s) / (to_s - from_s), label: tickText(t) })) },
    { title: 'height (mm)', ticks: ticks(0, height_mm, 8).map((h) => ({ at: h / height_mm, label: tickText(h) })) },
  );
  const barX = plot.x + plot.width + 26;
  const bar = { x: barX, y: plot.y, height: plot.height - 90, map: SIGNED_MAP, from: -limit_Pa, to: limit_Pa };
  drawBar(canvas, { ...bar, title: 'shear (Pa)', openBelow: true });
  canvas.text(barX, plot.y + plot.height - 74, 'positive: upward', { colour: PALE_INK });
  if (recording.walls[side].shear_Pa.some(Number.isNaN)) {
    canvas.fill(barX, plot.y + plot.height - 39, 22, 12, FIN);
    canvas.text(barX + 30, plot.y + plot.height - 40, 'under a fin');
  }
  return canvas.encode();
}

function fillPlot(canvas: Canvas, plot: Plot, recording: Recording, side: WallSide, limit_Pa: number): void {
  const { membrane } = recording;
  const { shear_Pa } = recording.walls[side];
  const elements = recording.x_m.length;
  const samples = recording.times_s.length;
  for (let up = 0; up < plot.height; up++) {
    const fromElement = Math.floor((up * elements) / plot.height);
    const toElement = Math.max(fromElement + 1, Math.floor(((up + 1) * elements) / plot.height));
    const middle = (fromElement + toElement - 1) / 2;
    const faded = middle < membrane.first || middle >= membrane.end;
    for (let column = 0; column < plot.width; column++) {
      const fromSample = Math.floor((column * samples) / plot.width);
      const toSample = Math.max(fromSample + 1, Math.floor(((column + 1) * samples) / plot.width));
      let sum = 0;
      let count = 0;
      for (let s = fromSample; s < toSample; s++) {
        for (let e = fromElement; e < toElement; e++) {
          const tau_Pa = shear_Pa[s * elements + e];
          if (Number.isNaN(tau_Pa)) continue;
          sum += tau_Pa;
          count++;
        }
      }
      const colour = count === 0 ? FIN : colourAt(SIGNED_MAP, 0.5 + (0.5 * sum) / count / limit_Pa);
      canvas.set(plot.x + column, plot.y + plot.height - 1 - up, faded ? mix(colour, PAPER, FADE) : colour);
    }
  }
}

/** Names a band between two heights (0 to 1) and draws the line that parts it from the membrane. */
function labelBand(canvas: Canvas, plot: Plot, name: string, from: number, to: number): void {
  if (to <= from) return;
  const top = plot.y + Math.round((1 - to) * plot.height);
  const bottom = plot.y + Math.round((1 - from) * plot.height);
  const line = from === 0 ? top : bottom;
  for (let x = 0; x < plot.width; x += 10) canvas.fill(plot.x + x, line, 5, 1, PALE_INK);
  const letters = LETTER_ROWS * TEXT_SCALE;
  if (bottom - top > letters + 6) canvas.text(plot.x + 8, Math.round((top + bottom - letters) / 2) + 2, name, { colour: INK });
}

/** A round shear that 99 % of |tau| on the membrane heights of both walls stay below; 1 where nothing was felt. */
export function shearLimit(recording: Recording): number {
  const { membrane } = recording;
  const elements = recording.x_m.length;
  const samples = recording.times_s.length;
  const width = membrane.end - membrane.first;
  const step = Math.max(1, Math.floor((2 * samples * width) / LOOKED_AT));
  const magnitudes = new Float64Array(2 * Math.ceil((samples * width) / step));
  let count = 0;
  for (const side of ['left', 'right'] as const) {
    const { shear_Pa } = recording.walls[side];
    for (let k = 0; k < samples * width; k += step) {
      const tau_Pa = shear_Pa[Math.floor(k / width) * elements + membrane.first + (k % width)];
      if (Number.isFinite(tau_Pa)) magnitudes[count++] = Math.abs(tau_Pa);
    }
  }
  const sorted = magnitudes.subarray(0, count).sort();
  const high_Pa = count === 0 ? 0 : sorted[Math.floor(SHOWN_SHARE * (count - 1))];
  return high_Pa > 0 ? roundAbove(high_Pa) : 1;
}
