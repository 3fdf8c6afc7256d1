import type { Recording, WallSide } from '../../cases/index.ts';
import type { Bin } from '../measures/histogram.ts';
import type { Measures } from '../measures/measures.ts';
import { drawAxes, drawTitle, type Plot, ROOM } from './axes.ts';
import { Canvas, type Colour, INK, PALE_INK } from './canvas.ts';
import { ticks, tickText } from './ticks.ts';

const WIDTH = 760;
const PANEL_HEIGHT = 250;
/** Between the two walls' panels. */
const GAP = 34;
const RIGHT = 30;
/** Below and above the threshold; told apart by lightness too. */
const BELOW: Colour = [120, 144, 172];
const ABOVE: Colour = [196, 98, 16];
/** Bins with less are not worth a place on the axis. */
const LEAST_SHARE = 5e-4;
/** The axis reaches so many times as high as the highest bin: the names stand above it. */
const HEADROOM = 1.35;

/**
 * Both walls' histograms of |wall shear| as a PNG: share of elements and samples in each bin, ten bins to the decade; what lies above the
 * asked threshold in another colour. Counted over the membrane heights, fins left out.
 */
export function drawHistogram(recording: Recording, measures: Measures): Buffer {
  const sides = ['left', 'right'] as const;
  const bins = sides.flatMap((side) =>
    measures.walls[side].histogram.bins.filter(isDrawn).filter((bin) => (bin.share ?? 0) >= LEAST_SHARE),
  );
  const from_Pa = 10 ** Math.floor(Math.log10(Math.min(0.1, measures.swept.above_Pa, ...bins.map((bin) => bin.from_Pa))) + 1e-6);
  const to_Pa = 10 ** Math.ceil(Math.log10(Math.max(1, measures.swept.above_Pa, ...bins.map((bin) => bin.to_Pa))) - 1e-6);
  const highest = Math.max(0.01, ...bins.map((bin) => bin.share ?? 0));
  const canvas = new Canvas(ROOM.left + WIDTH + RIGHT, ROOM.top + 2 * PANEL_HEIGHT + GAP + ROOM.bottom);
  drawTitle(canvas, ROOM.left, 10, 'How often the walls felt which shear', recording.case.title);
  sides.forEach((side, i) => {
    const plot: Plot = { x: ROOM.left, y: ROOM.top + i * (PANEL_HEIGHT + GAP), width: WIDTH, height: PANEL_HEIGHT };
    drawPanel(canvas, plot, side, measures, { from_Pa, to_Pa, highest: highest * HEADROOM }, i === 1);
  });
  return canvas.encode();
}

interface Extent {
  from_Pa: number;
  to_Pa: number;
  /** share at the top */
  highest: number;
}

function drawPanel(canvas: Canvas, plot: Plot, side: WallSide, measures: Measures, extent: Extent, labelled: boolean): void {
  const wall = measures.walls[side];
  const { above_Pa } = measures.swept;
  const decades = Math.log10(extent.to_Pa / extent.from_Pa);
  const at = (shear_Pa: number) => Math.log10(shear_Pa / extent.from_Pa) / decades;
  const column = (shear_Pa: number) => plot.x + Math.round(Math.min(1, Math.max(0, at(shear_Pa))) * plot.width);
  for (const bin of wall.histogram.bins.filter(isDrawn)) {
    const height = Math.round(((bin.share ?? 0) / extent.highest) * plot.height);
    const left = column(bin.from_Pa);
    const right = column(bin.to_Pa);
    const part = Math.min(right, Math.max(left, column(above_Pa)));
    canvas.fill(left, plot.y + plot.height - height, part - left, height, BELOW);
    canvas.fill(part, plot.y + plot.height - height, right - part, height, ABOVE);
  }
  for (let y = 0; y < plot.height; y += 8) canvas.fill(column(above_Pa), plot.y + y, 1, 4, INK);
  const name = `${side} wall${wall.membrane ? '' : ' (no membrane)'}`;
  canvas.text(plot.x + 10, plot.y + 10, name);
  const { shareAbove, meanAbs_Pa } = wall.shear;
  const told = shareAbove === null || meanAbs_Pa === null ? 'not recorded' : `mean ${meanAbs_Pa.toPrecision(3)} Pa`;
  canvas.text(plot.x + 10, plot.y + 34, told, { colour: PALE_INK });
  if (shareAbove !== null) {
    canvas.text(plot.x + plot.width - 10, plot.y + 10, `${(shareAbove * 100).toPrecision(3)} % above ${tickText(above_Pa)} Pa`, {
      hang: 1,
      colour: ABOVE,
    });
  }
  const powers = Array.from({ length: Math.round(decades) + 1 }, (_, i) => extent.from_Pa * 10 ** i);
  drawAxes(
    canvas,
    plot,
    labelled ? { title: '|wall shear| (Pa)', ticks: powers.map((p) => ({ at: at(p), label: tickText(p) })) } : { title: '', ticks: [] },
    {
      title: 'share (%)',
      ticks: ticks(0, extent.highest, 4).map((share) => ({ at: share / extent.highest, label: tickText(share * 100) })),
    },
  );
}

/** A bin with two ends above zero has a width on a logarithmic axis. */
function isDrawn(bin: Bin): boolean {
  return bin.from_Pa > 0 && Number.isFinite(bin.to_Pa);
}
