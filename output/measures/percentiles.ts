import { NO_ESTIMATE, SIZE } from './estimate.ts';
import { overElements, samplesOf } from './felt.ts';
import { quantile } from './quantile.ts';
import type { WallMeasure } from './wallmeasure.ts';

export const PERCENTILES = [5, 25, 50, 75, 95, 99] as const;

/**
 * The |tau| that `percent` of all (element, sample) pairs do not exceed, Pa; definition in quantile.ts. The highest ones rest on few
 * passages and need long recordings.
 *
 * Its interval: the share of pairs at or below it, sample by sample, has a mean near p with an error +-h; the percentiles p - h and p + h
 * are the ends, so no density has to be estimated.
 * @see Woodruff 1952, J. Am. Stat. Assoc. 47, 635 [M]
 */
function percentile(percent: number): WallMeasure {
  const p = percent / 100;
  return {
    stem: `p${percent}_shear`,
    unit: 'Pa',
    range: SIZE,
    estimate: (walls) => {
      const sorted_Pa = walls.map((wall) => wall.sorted_Pa());
      const value = quantile(sorted_Pa, p);
      if (value === null) return NO_ESTIMATE;
      const series = overElements(walls, samplesOf(walls), (sums, { magnitude_Pa }) => {
        for (let i = 0; i < sums.length; i++) if (magnitude_Pa[i] <= value) sums[i]++;
      });
      return { value, series, shifted: (shift) => quantile(sorted_Pa, Math.min(1, Math.max(0, p + shift))) ?? Number.NaN };
    },
  };
}

export const percentiles: readonly WallMeasure[] = PERCENTILES.map(percentile);
