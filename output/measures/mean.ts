import { ANY, byMean, SIZE } from './estimate.ts';
import { overElements, samplesOf } from './felt.ts';
import type { WallMeasure } from './wallmeasure.ts';

/** Mean of |tau| over all (element, sample) pairs, Pa: what the wall feels on average, whichever way. Says nothing of how it varies. */
export const meanShear: WallMeasure = {
  stem: 'mean_shear',
  unit: 'Pa',
  range: SIZE,
  estimate: (walls) =>
    byMean(
      overElements(walls, samplesOf(walls), (sums, { magnitude_Pa }) => {
        for (let i = 0; i < sums.length; i++) sums[i] += magnitude_Pa[i];
      }),
      SIZE,
    ),
};

/** Mean of tau with its sign over all (element, sample) pairs, Pa, upward positive: the steady pull. Back and forth cancel. */
export const steadyShear: WallMeasure = {
  stem: 'steady_shear',
  unit: 'Pa',
  range: ANY,
  estimate: (walls) =>
    byMean(
      overElements(walls, samplesOf(walls), (sums, { shear_Pa }) => {
        for (let i = 0; i < sums.length; i++) sums[i] += shear_Pa[i];
      }),
      ANY,
    ),
};
