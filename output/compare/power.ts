import { rangeOf } from '../measures/answers.ts';
import { drawAxes, drawTitle, type Plot, ROOM } from '../pictures/axes.ts';
import { Canvas, PALE_INK } from '../pictures/canvas.ts';
import { ticks, tickText } from '../pictures/ticks.ts';
import type { Comparison, Ranked } from './comparison.ts';
import { drawDisc, drawLegend, drawLine, LEGEND_WIDTH, RADIUS, seriesColours } from './series.ts';

const WIDTH = 560;
const HEIGHT = 420;
/** Half the width of the caps of an interval bar. */
const CAP = 7;
/** Points with the same power stand so far apart beside it. */
const APART = 22;
/** Powers closer than this, relative, are the same. */
const SAME = 1e-3;

/** The asked measure against the air power per membrane area: a point and an interval bar per geometry. */
export function drawPower({ by, ranking }: Comparison): Buffer {
  const canvas = new Canvas(ROOM.left + WIDTH + LEGEND_WIDTH, ROOM.top + HEIGHT + ROOM.bottom);
  const plot: Plot = { x: ROOM.left, y: ROOM.top, width: WIDTH, height: HEIGHT };
  const share = rangeOf(by).most === 1;
  const scale = share ? 100 : 1;
  drawTitle(canvas, plot.x, 10, `${by} against the power of the air`, 'bars: 95 % intervals; equal powers stand side by side');
  const shown = ranking.filter(({ asked }) => asked !== undefined);
  const ends = shown.flatMap(({ asked }) => [asked?.value, asked?.low, asked?.high]).filter((end) => typeof end === 'number');
  const extent = extentOf(ends);
  const most_W_m2 = 1.2 * Math.max(1e-3, ...shown.map((one) => one.airPower_W_m2));
  const row = (value: number): number => plot.y + plot.height - 1 - ((value - extent.from) / (extent.to - extent.from)) * (plot.height - 1);
  drawAxes(
    canvas,
    plot,
    {
      title: 'air power per membrane area (W/m2)',
      ticks: ticks(0, most_W_m2, 6).map((power) => ({ at: power / most_W_m2, label: tickText(power) })),
    },
    {
      title: share ? `${by} (%)` : by,
      ticks: ticks(scale * extent.from, scale * extent.to, 6).map((value) => ({
        at: (value / scale - extent.from) / (extent.to - extent.from),
        label: tickText(value),
      })),
    },
  );
  const colours = seriesColours(ranking.length);
  ranking.forEach((one, i) => {
    const { asked, airPower_W_m2 } = one;
    if (asked === undefined) return;
    const x = Math.round(plot.x + (airPower_W_m2 / most_W_m2) * (plot.width - 1) + aside(shown, one));
    if (asked.low !== null && asked.high !== null) {
      const [low, high] = [row(asked.low), row(asked.high)];
      drawLine(canvas, [x, low], [x, high], colours[i], 2);
      for (const y of [low, high]) drawLine(canvas, [x - CAP, y], [x + CAP, y], colours[i], 2);
    }
    drawDisc(canvas, x, row(asked.value), RADIUS, colours[i]);
  });
  const names = ranking.map(({ name }) => name);
  const below = drawLegend(canvas, plot, names, colours);
  const runs = ranking.map(({ seeds }) => seeds.length);
  const told = Math.min(...runs) === Math.max(...runs) ? `${runs[0]}` : `${Math.min(...runs)} to ${Math.max(...runs)}`;
  canvas.text(plot.x + plot.width + 22, below, `${told} ${told === '1' ? 'run' : 'runs'} each`, { colour: PALE_INK });
  return canvas.encode();
}

/** Room above and below what is to be seen; from zero where that is not far. */
function extentOf(values: readonly number[]): { from: number; to: number } {
  if (values.length === 0) return { from: 0, to: 1 };
  const least = Math.min(...values);
  const most = Math.max(...values);
  const room = 0.12 * (most - least || Math.abs(most) || 1);
  const from = least >= 0 && least < 0.5 * most ? 0 : least - room;
  return { from, to: most + room };
}

/** Pixels to the side, so that bars of geometries with the same power do not hide one another. */
function aside(shown: readonly Ranked[], one: Ranked): number {
  const beside = shown.filter(({ airPower_W_m2 }) => Math.abs(airPower_W_m2 - one.airPower_W_m2) <= SAME * one.airPower_W_m2);
  return APART * (beside.indexOf(one) - (beside.length - 1) / 2);
}
