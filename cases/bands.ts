/** How long a step is, how long a run, and which ends of the channel serve to let gas in and take it out. */
import type { Case } from './case.ts';
import { fitting_m } from './gas.ts';
import { WIDEST_DRAW } from './mixture.ts';

/** Lattice velocity at which `grid.speed` stands (it held at 0.02 and below). */
const LATTICE_SPEED = 0.02;

/** Speed a bubble is taken to enter the skim band with, and e-foldings of its gas on the way through. */
const SKIM_SPEED_m_s = 0.5;
const SKIM_FOLDS = 6;

/** Largest share of the gas one step takes: more is a shock to the pressure. */
const SKIM_MOST = 0.02;

type Sized = Pick<Case, 'channel' | 'gas' | 'grid'>;

/** Cell size, cells along (the height rounded to whole cells) and time step. */
export function gridOf({ channel, grid }: Pick<Case, 'channel' | 'grid'>): { nx: number; ny: number; dx_m: number; dt_s: number } {
  const dx_m = channel.gap_m / grid.across;
  return { nx: Math.round(channel.height_m / dx_m), ny: grid.across, dx_m, dt_s: (LATTICE_SPEED / grid.speed_m_s) * dx_m };
}

/** Steps of settling and recording, whole numbers of samples; `span` is the most that is recorded, `least` the least. */
export function stepsOf({ record, ...sized }: Pick<Case, 'channel' | 'grid' | 'record'>): {
  sampleEvery: number;
  settle: number;
  least: number;
  span: number;
} {
  const { dt_s } = gridOf(sized);
  const sampleEvery = Math.max(1, Math.round(record.every_s / dt_s));
  const whole = (time_s: number): number => sampleEvery * Math.ceil(time_s / (sampleEvery * dt_s) - 1e-9);
  const recorded = (time_s: number): number => Math.max(sampleEvery, whole(time_s));
  return {
    sampleEvery,
    settle: whole(record.settle_s),
    least: recorded(record.span_s),
    span: recorded(record.until?.atMost_s ?? record.span_s),
  };
}

/** Diameter of the largest bubble that is let in: two standard deviations above the mean of its kind, two cells clear of either wall. */
export function largestBubble_m({ channel, gas, grid }: Sized): number {
  const largest_m = Math.max(...gas.bubble.kinds.map(({ diameter_m, spread }) => diameter_m * (1 + WIDEST_DRAW * spread)));
  return Math.min(largest_m, fitting_m({ channel, grid }));
}

/**
 * Release band at the bottom: a tenth of the height, and one and a half of the largest bubble at least; empty without supply.
 * Skim band at the top: the gap or a tenth of the height, whichever is longer, and long enough for {@link skimRates}.
 */
export function bandsOf(sized: Sized): { release: { from_m: number; to_m: number }; skim: { from_m: number; to_m: number } } {
  const { channel, gas } = sized;
  const { nx, dx_m, dt_s } = gridOf(sized);
  const height_m = nx * dx_m;
  const shortest_m = (2 * SKIM_FOLDS * SKIM_SPEED_m_s * dt_s) / SKIM_MOST;
  const skim_m = Math.max(channel.gap_m, 0.1 * height_m, shortest_m);
  const release_m = gas.supply_m_s === 0 ? 0 : Math.max(0.1 * height_m, 1.5 * largestBubble_m(sized));
  return { release: { from_m: 0, to_m: release_m }, skim: { from_m: height_m - skim_m, to_m: height_m } };
}

/**
 * Share of the gas taken out in one step, per x: most sin^2(pi s), s from 0 to 1 through the band, so that the rate has no
 * edge; a bubble passing at {@link SKIM_SPEED_m_s} keeps exp(-{@link SKIM_FOLDS}) of its gas.
 */
export function skimRates(sized: Sized): Float64Array {
  const { nx, dx_m, dt_s } = gridOf(sized);
  const { skim } = bandsOf(sized);
  const length_m = skim.to_m - skim.from_m;
  const most = (2 * SKIM_FOLDS * SKIM_SPEED_m_s * dt_s) / length_m;
  return Float64Array.from({ length: nx }, (_, x) => {
    const s = ((x + 0.5) * dx_m - skim.from_m) / length_m;
    return s <= 0 ? 0 : most * Math.sin(Math.PI * s) ** 2;
  });
}

/** Cells and steps of a run, without laying it out. */
export function workOf(panel: Pick<Case, 'channel' | 'grid' | 'record'>): { cells: number; steps: number } {
  const { nx, ny } = gridOf(panel);
  const { settle, span } = stepsOf(panel);
  return { cells: nx * ny, steps: settle + span };
}
