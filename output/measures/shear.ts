import ops from 'ndarray-ops';
import { exceedance } from './exceedance.ts';
import { quantile } from './quantile.ts';
import { type Surface, series } from './surface.ts';

/**
 * What one wall felt, over all its open membrane elements and all samples (every pair counts the same).
 * A number is null where the recording is too short, or the wall too covered, to give it.
 * Left out: release and skim bands, elements under a fin, the settling time; and what a plane section leaves out.
 */
export interface ShearStatistics {
  /** mean of |tau| */
  meanAbs_Pa: number | null;
  /** mean of tau with its sign, upward positive */
  mean_Pa: number | null;
  /** sqrt(mean of tau^2) */
  rms_Pa: number | null;
  /** of |tau| */
  percentiles_Pa: Record<Percentile, number | null>;
  /** largest |tau| */
  max_Pa: number | null;
  /** share of (element, sample) pairs with |tau| above the threshold */
  shareAbove: number | null;
  /** rises of |tau| above the threshold, per element and second of recording (first to last sample); null below two samples */
  events_1_s: number | null;
  /** 1 - sum over elements |mean in time of tau| / sum over elements (mean in time of |tau|): 0 never changes sign, 1 back and forth alike */
  reversal: number | null;
  /** share of (element, sample) pairs under gas */
  shareUnderGas: number | null;
}

type Percentile = (typeof PERCENTILES)[number];
const PERCENTILES = ['p5', 'p25', 'p50', 'p75', 'p95', 'p99'] as const;

/**
 * @param threshold_Pa what counts as above
 * @param sorted_Pa all |tau| of the surface, ascending
 */
export function shearStatistics(surface: Surface, threshold_Pa: number, sorted_Pa: Float32Array): ShearStatistics {
  const open = surface.elements.length;
  const pairs = open * surface.samples;
  const percentiles_Pa = Object.fromEntries(PERCENTILES.map((p) => [p, quantile(sorted_Pa, Number(p.slice(1)) / 100)])) as Record<
    Percentile,
    number | null
  >;
  if (pairs === 0) {
    return {
      meanAbs_Pa: null,
      mean_Pa: null,
      rms_Pa: null,
      percentiles_Pa,
      max_Pa: null,
      shareAbove: null,
      events_1_s: null,
      reversal: null,
      shareUnderGas: null,
    };
  }

  let above = 0;
  let rises = 0;
  let steadySum = 0; // sum over elements of |sum in time of tau|
  for (let e = 0; e < open; e++) {
    const felt = exceedance(series(surface.magnitude_Pa, e), threshold_Pa);
    above += felt.above;
    rises += felt.rises;
    steadySum += Math.abs(ops.sum(surface.shear_Pa.pick(e, null)));
  }
  const absSum = ops.norm1(surface.shear_Pa);
  const watched_s = (surface.samples - 1) * surface.every_s;
  return {
    meanAbs_Pa: absSum / pairs,
    mean_Pa: ops.sum(surface.shear_Pa) / pairs,
    rms_Pa: Math.sqrt(ops.norm2squared(surface.shear_Pa) / pairs),
    percentiles_Pa,
    max_Pa: ops.sup(surface.magnitude_Pa),
    shareAbove: above / pairs,
    events_1_s: watched_s > 0 ? rises / (open * watched_s) : null,
    reversal: absSum > 0 ? 1 - steadySum / absSum : null,
    shareUnderGas: ops.sum(surface.gas) / pairs,
  };
}
