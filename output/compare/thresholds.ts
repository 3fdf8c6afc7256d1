import { drawAxes, drawTitle, type Plot, ROOM } from '../pictures/axes.ts';
import { Canvas, INK } from '../pictures/canvas.ts';
import { ticks, tickText } from '../pictures/ticks.ts';
import type { Comparison } from './comparison.ts';
import { drawLegend, drawLine, LEGEND_WIDTH, seriesColours } from './series.ts';

const WIDTH = 560;
const HEIGHT = 420;
/** Thresholds beyond which every curve is below this are not worth a place on the axis. */
const LEAST_SHARE = 2e-3;

/** Share of all membrane walls swept within the asked time, against the threshold: a curve per geometry, the mean of its runs. */
export function drawThresholds({ ranking, swept }: Comparison): Buffer {
  const canvas = new Canvas(ROOM.left + WIDTH + LEGEND_WIDTH, ROOM.top + HEIGHT + ROOM.bottom);
  const plot: Plot = { x: ROOM.left, y: ROOM.top, width: WIDTH, height: HEIGHT };
  drawTitle(
    canvas,
    plot.x,
    10,
    'Share swept against the threshold',
    `all membrane walls, within ${tickText(swept.within_s)} s, mean of the runs`,
  );
  const points = ranking.flatMap(({ curve }) => curve).filter((point) => point.threshold_Pa > 0);
  const from_Pa = Math.min(swept.above_Pa, ...points.map((point) => point.threshold_Pa));
  const seen = points.filter((point) => point.swept >= LEAST_SHARE).map((point) => point.threshold_Pa);
  const to_Pa = Math.max(2 * from_Pa, 1.6 * swept.above_Pa, ...seen.map((threshold_Pa) => 1.3 * threshold_Pa));
  const decades = Math.max(1e-9, Math.log10(to_Pa / from_Pa));
  const column = (threshold_Pa: number): number => plot.x + (Math.log10(threshold_Pa / from_Pa) / decades) * (plot.width - 1);
  const row = (share: number): number => plot.y + (1 - share) * (plot.height - 1);
  for (let y = 0; y < plot.height; y += 8) canvas.fill(Math.round(column(swept.above_Pa)), plot.y + y, 1, 4, INK);
  const colours = seriesColours(ranking.length);
  ranking.forEach(({ curve }, i) => {
    const shown = curve.filter((point) => point.threshold_Pa > 0 && point.threshold_Pa <= to_Pa && Number.isFinite(point.swept));
    for (let p = 1; p < shown.length; p++) {
      const [a, b] = [shown[p - 1], shown[p]];
      drawLine(canvas, [column(a.threshold_Pa), row(a.swept)], [column(b.threshold_Pa), row(b.swept)], colours[i], 2.5);
    }
  });
  const names = ranking.map(({ name }) => name);
  drawLegend(canvas, plot, names, colours);
  const powers = Array.from({ length: 12 }, (_, i) => 10 ** (i - 6)).flatMap((power) => [power, 2 * power, 5 * power]);
  drawAxes(
    canvas,
    plot,
    {
      title: 'threshold of |wall shear| (Pa)',
      ticks: powers
        .filter((value) => value >= from_Pa * 0.999 && value <= to_Pa * 1.001)
        .map((value) => ({ at: Math.log10(value / from_Pa) / decades, label: tickText(value) })),
    },
    { title: 'swept (%)', ticks: ticks(0, 1, 5).map((share) => ({ at: share, label: tickText(100 * share) })) },
  );
  return canvas.encode();
}
