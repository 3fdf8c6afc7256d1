import ops from 'ndarray-ops';
import type { Recording, WallSide } from '../../cases/index.ts';
import { exceedance } from './exceedance.ts';
import { ascending } from './order.ts';
import { quantile } from './quantile.ts';
import { type Surface, series } from './surface.ts';

/**
 * What a single wall element felt, over all samples; the whole height, bands included.
 * Every measured column is null under a fin, and where the recording holds no (for `events_1_s`: fewer than two) samples.
 */
export interface ElementRow {
  wall: WallSide;
  x_m: number;
  /** counts in the measures: outside the release and skim bands, on a wall with a membrane, not under a fin */
  inMembrane: boolean;
  underFin: boolean;
  meanAbs_Pa: number | null;
  mean_Pa: number | null;
  rms_Pa: number | null;
  p95_Pa: number | null;
  max_Pa: number | null;
  shareAbove: number | null;
  events_1_s: number | null;
  /** 1 - |mean tau| / mean |tau| */
  reversal: number | null;
  shareUnderGas: number | null;
}

/**
 * One row per element of a wall, upward.
 * @param surface the whole wall
 */
export function elementRows(recording: Recording, surface: Surface): ElementRow[] {
  const { membrane, x_m } = recording;
  const { samples, side } = surface;
  const threshold_Pa = recording.case.swept.above_Pa;
  const watched_s = (samples - 1) * surface.every_s;
  const rows: ElementRow[] = Array.from(x_m, (x) => ({
    wall: side,
    x_m: x,
    inMembrane: false,
    underFin: true,
    meanAbs_Pa: null,
    mean_Pa: null,
    rms_Pa: null,
    p95_Pa: null,
    max_Pa: null,
    shareAbove: null,
    events_1_s: null,
    reversal: null,
    shareUnderGas: null,
  }));
  surface.elements.forEach((element, e) => {
    const row = rows[element];
    row.underFin = false;
    row.inMembrane = surface.membrane && element >= membrane.first && element < membrane.end;
    if (samples === 0) return;
    const shear = surface.shear_Pa.pick(e, null);
    const sum = ops.sum(shear);
    const absSum = ops.norm1(shear);
    const magnitudes = series(surface.magnitude_Pa, e);
    const felt = exceedance(magnitudes, threshold_Pa);
    row.meanAbs_Pa = absSum / samples;
    row.mean_Pa = sum / samples;
    row.rms_Pa = Math.sqrt(ops.norm2squared(shear) / samples);
    row.p95_Pa = quantile([ascending(magnitudes)], 0.95);
    row.max_Pa = ops.norminf(shear);
    row.shareAbove = felt.above / samples;
    row.events_1_s = watched_s > 0 ? felt.rises / watched_s : null;
    row.reversal = absSum > 0 ? 1 - Math.abs(sum) / absSum : null;
    row.shareUnderGas = ops.sum(surface.gas.pick(e, null)) / samples;
  });
  return rows;
}
