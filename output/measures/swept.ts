import ops from 'ndarray-ops';
import { Rests, windowMaxima } from './coverage.ts';
import { countUpTo } from './quantile.ts';
import { type Surface, series } from './surface.ts';

/**
 * Fraction swept: share of the open membrane elements where |tau| exceeds the threshold at least once in a window of time.
 * `within` is its average over all windows of the asked length that fit into the recording (they overlap), `whole` that of the one
 * window that is the whole recording. Dimensionless. null where no such window fits.
 * Left out: release and skim bands, elements under a fin, the settling time. How clean a swept element gets is not said.
 */
export interface Swept {
  /** membrane elements that count */
  elements: number;
  within: number | null;
  whole: number | null;
  /** the same for being touched by gas instead of exceeding the threshold */
  touched: { within: number | null; whole: number | null };
  /** against the threshold; columns of equal length, rising threshold, the asked one among them */
  overThreshold: { threshold_Pa: number[]; within: (number | null)[]; whole: (number | null)[] };
  /** at the asked threshold against the length of the window, from none to the whole recording; averages over all windows that fit */
  overTime: { window_s: number[]; swept: (number | null)[]; touched: (number | null)[] };
}

export interface SweptQuestion {
  above_Pa: number;
  within_s: number;
}

/** The curve over thresholds spans what bubbles exert on membranes, and then some. */
const CURVE_FROM_PA = 0.01;
const CURVE_TO_PA = 10;
const CURVE_POINTS = 40;
/** Window lengths on the curve over time. */
const TIME_POINTS = 100;

/** Samples that a window of `within_s` holds: one at least. */
export function windowSamples(within_s: number, every_s: number): number {
  return Math.max(1, Math.round(within_s / every_s));
}

/** Swept fraction of one wall. */
export function sweptFraction(surface: Surface, asked: SweptQuestion): Swept {
  const { samples, every_s } = surface;
  const elements = surface.elements.length;
  const window = windowSamples(asked.within_s, every_s);
  const exceeds = new Rests(samples);
  const underGas = new Rests(samples);
  for (let e = 0; e < elements; e++) {
    exceeds.add(series(surface.magnitude_Pa, e), asked.above_Pa);
    underGas.add(series(surface.gas, e), 0);
  }
  const swept = exceeds.hitShare();
  const touched = underGas.hitShare();

  const lengths = new Set<number>();
  for (let i = 0; i <= TIME_POINTS; i++) lengths.add(Math.round((i * samples) / TIME_POINTS));
  if (window <= samples) lengths.add(window);
  const lengthList = [...lengths].sort((a, b) => a - b);

  return {
    elements,
    within: at(swept, window),
    whole: at(swept, samples),
    touched: { within: at(touched, window), whole: at(touched, samples) },
    overThreshold: curveOverThreshold(surface, window, asked.above_Pa),
    overTime: {
      window_s: lengthList.map((w) => w * every_s),
      swept: lengthList.map((w) => at(swept, w)),
      touched: lengthList.map((w) => at(touched, w)),
    },
  };
}

/** Entry `w` of a share by window length, or null where no such window fits or no element counts. */
function at(share: Float64Array, w: number): number | null {
  if (share.length === 1 || w >= share.length || Number.isNaN(share[w])) return null;
  return share[w];
}

/** An element is swept in a window when the window's largest |tau| is above the threshold: one pass serves all thresholds. */
function curveOverThreshold(surface: Surface, window: number, asked_Pa: number): Swept['overThreshold'] {
  const { samples } = surface;
  const elements = surface.elements.length;
  const threshold_Pa = curveThresholds(asked_Pa);
  // windows (elements) whose largest |tau| is above exactly the first k thresholds; shape (thresholds + 1)
  const windows = new Float64Array(threshold_Pa.length + 1);
  const wholes = new Float64Array(threshold_Pa.length + 1);
  const queue = new Int32Array(samples);
  let lastLargest = -1;
  let lastAbove = 0;
  const count = (largest: number) => {
    if (largest !== lastLargest) {
      lastLargest = largest;
      lastAbove = countBelow(threshold_Pa, largest);
    }
    windows[lastAbove]++;
  };
  if (samples > 0) {
    for (let e = 0; e < elements; e++) {
      wholes[countBelow(threshold_Pa, ops.sup(surface.magnitude_Pa.pick(e, null)))]++;
      windowMaxima(series(surface.magnitude_Pa, e), window, queue, count);
    }
  }
  return { threshold_Pa, within: sharesAbove(windows), whole: sharesAbove(wholes) };
}

/** How many of the ascending values are < `limit`: all thresholds strictly below it. */
function countBelow(ascending: readonly number[], limit: number): number {
  const upTo = countUpTo(ascending, limit);
  return upTo > 0 && ascending[upTo - 1] === limit ? upTo - 1 : upTo;
}

/** Entry j: share of the counted things that lie above more than j thresholds; null where nothing was counted. */
function sharesAbove(counts: Float64Array): (number | null)[] {
  const all = counts.reduce((sum, n) => sum + n, 0);
  const shares: (number | null)[] = [];
  let left = all;
  for (let j = 0; j + 1 < counts.length; j++) {
    left -= counts[j];
    shares.push(all === 0 ? null : left / all);
  }
  return shares;
}

function curveThresholds(asked_Pa: number): number[] {
  const thresholds = new Set<number>([asked_Pa]);
  for (let i = 0; i < CURVE_POINTS; i++) {
    const value = CURVE_FROM_PA * (CURVE_TO_PA / CURVE_FROM_PA) ** (i / (CURVE_POINTS - 1));
    thresholds.add(Number(value.toPrecision(4)));
  }
  return [...thresholds].sort((a, b) => a - b);
}

/** Several walls of one recording as one surface: each counts by its elements. Walls without an open element count nothing. */
export function sweptTogether(walls: readonly Swept[]): Swept {
  const [first] = walls;
  const mean = (of: (wall: Swept) => number | null): number | null => {
    let sum = 0;
    let elements = 0;
    for (const wall of walls) {
      const value = of(wall);
      if (value === null) continue;
      sum += value * wall.elements;
      elements += wall.elements;
    }
    return elements === 0 ? null : sum / elements;
  };
  const column = (length: number, of: (wall: Swept, i: number) => number | null) =>
    Array.from({ length }, (_, i) => mean((wall) => of(wall, i)));
  const { threshold_Pa } = first.overThreshold;
  const { window_s } = first.overTime;
  return {
    elements: walls.reduce((sum, wall) => sum + wall.elements, 0),
    within: mean((wall) => wall.within),
    whole: mean((wall) => wall.whole),
    touched: { within: mean((wall) => wall.touched.within), whole: mean((wall) => wall.touched.whole) },
    overThreshold: {
      threshold_Pa,
      within: column(threshold_Pa.length, (wall, i) => wall.overThreshold.within[i]),
      whole: column(threshold_Pa.length, (wall, i) => wall.overThreshold.whole[i]),
    },
    overTime: {
      window_s,
      swept: column(window_s.length, (wall, i) => wall.overTime.swept[i]),
      touched: column(window_s.length, (wall, i) => wall.overTime.touched[i]),
    },
  };
}
