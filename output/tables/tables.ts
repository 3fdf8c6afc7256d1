import type { Recording } from '../../cases/index.ts';
import { PLACES } from '../measures/felt.ts';
import type { Measures } from '../measures/measures.ts';
import type { Swept } from '../measures/swept.ts';
import { type Cell, csv } from './table.ts';

/** Every table of a run folder by file name. Empty cells: not to be had (under a fin, recording too short). */
export function tables(recording: Recording, measures: Measures): Partial<Record<TableName, string>> {
  return {
    'walls.csv': walls(measures),
    'histogram.csv': histogram(measures),
    'swept.csv': swept(measures),
    'history.csv': history(recording),
    ...(recording.case.fins.length === 0 ? {} : { 'fins.csv': fins(recording) }),
    'bubbles.csv': bubbles(recording),
    'backtransport.csv': backTransport(measures),
    ...(recording.case.deposit === undefined ? {} : { 'deposit.csv': deposit(recording, measures) }),
  };
}

export type TableName =
  | 'walls.csv'
  | 'histogram.csv'
  | 'swept.csv'
  | 'history.csv'
  | 'fins.csv'
  | 'bubbles.csv'
  | 'backtransport.csv'
  | 'deposit.csv';

/** One row per wall element over the whole height, left wall first, upward; `in_membrane` 1: counts in the measures. */
function walls(measures: Measures): string {
  const header =
    'wall,x_m,in_membrane,under_fin,mean_abs_Pa,mean_Pa,rms_Pa,p95_Pa,max_Pa,share_above,events_1_s,reversal,share_under_gas'.split(',');
  return csv(
    header,
    measures.elements.map((row) => [
      row.wall,
      row.x_m,
      row.inMembrane,
      row.underFin,
      row.meanAbs_Pa,
      row.mean_Pa,
      row.rms_Pa,
      row.p95_Pa,
      row.max_Pa,
      row.shareAbove,
      row.events_1_s,
      row.reversal,
      row.shareUnderGas,
    ]),
  );
}

/** One row per wall and bin of |wall shear|; the last bin has no upper end. */
function histogram(measures: Measures): string {
  const rows: Cell[][] = [];
  for (const side of ['left', 'right'] as const) {
    for (const bin of measures.walls[side].histogram.bins) rows.push([side, bin.from_Pa, bin.to_Pa, bin.share, bin.density_1_Pa]);
  }
  return csv(['wall', 'from_Pa', 'to_Pa', 'share', 'density_1_Pa'], rows);
}

/**
 * Long form. kind=threshold: swept in a window of `window_s` against the threshold, and again for the window that is the whole recording.
 * kind=time: swept and touched at the asked threshold against the length of the window. wall=together: all membrane walls.
 */
function swept(measures: Measures): string {
  const rows: Cell[][] = [];
  const whole_s = measures.recorded.samples * measures.recorded.every_s;
  const { above_Pa, within_s } = measures.swept;
  const add = (wall: string, of: Swept) => {
    const { overThreshold, overTime } = of;
    overThreshold.threshold_Pa.forEach((threshold_Pa, i) => {
      rows.push(['threshold', wall, threshold_Pa, within_s, overThreshold.within[i], null]);
    });
    overThreshold.threshold_Pa.forEach((threshold_Pa, i) => {
      rows.push(['threshold', wall, threshold_Pa, whole_s, overThreshold.whole[i], null]);
    });
    overTime.window_s.forEach((window_s, i) => {
      rows.push(['time', wall, above_Pa, window_s, overTime.swept[i], overTime.touched[i]]);
    });
  };
  add('left', measures.walls.left.swept);
  add('right', measures.walls.right.swept);
  add('together', measures.together);
  return csv(['kind', 'wall', 'threshold_Pa', 'window_s', 'swept', 'touched'], rows);
}

function history(recording: Recording): string {
  const { time_s, holdup, upflow_m_s, released_m2, skimmed_m2, present_m2 } = recording.history;
  return csv(
    ['time_s', 'holdup', 'upflow_m_s', 'released_m2', 'skimmed_m2', 'present_m2'],
    time_s.map((time, i) => [time, holdup[i], upflow_m_s[i], released_m2[i], skimmed_m2[i], present_m2[i]]),
  );
}

/** One row per sample and fin, numbered as the case lists them: force per metre of width, upward and to the right positive. */
function fins({ case: { fins: outlines }, times_s, fins: { along_N_m, across_N_m } }: Recording): string {
  return csv(
    ['time_s', 'fin', 'force_along_N_m', 'force_across_N_m'],
    Array.from(along_N_m, (along, i) => [
      times_s[Math.floor(i / outlines.length)] ?? null,
      (i % outlines.length) + 1,
      along,
      across_N_m[i] ?? null,
    ]),
  );
}

function bubbles(recording: Recording): string {
  return csv(
    ['time_s', 'bubble', 'area_m2', 'x_m', 'y_m', 'ux_m_s', 'uy_m_s'],
    recording.bubbles.map((row) => [row.time_s, row.bubble, row.area_m2, row.x_m, row.y_m, row.ux_m_s, row.uy_m_s]),
  );
}

/** One row per wall (and the membrane walls together) and radius: fluxes sustained by each mechanism, an estimate. */
function backTransport({ backTransport: of }: Measures): string {
  return csv(
    ['wall', 'radius_m', 'brownian_m_s', 'shear_induced_m_s', 'inertial_lift_m_s', 'total_m_s'],
    PLACES.flatMap((place) =>
      of[place].sizes.map((size) => [
        place,
        size.radius_m,
        size.brownian_m_s,
        size.shearInduced_m_s,
        size.inertialLift_m_s,
        size.total_m_s,
      ]),
    ),
  );
}

/** One row per wall (and the membrane walls together) and sample: covered from the asked start, and once settled. */
function deposit({ times_s }: Recording, { deposit: of }: Measures): string {
  return csv(
    ['wall', 'time_s', 'covered', 'covered_settled'],
    PLACES.flatMap((place) =>
      Array.from(of[place]?.fromStart ?? [], (covered, i) => [place, times_s[i], covered, of[place]?.settled[i] ?? null]),
    ),
  );
}
