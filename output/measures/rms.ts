import { meanOf, NO_ESTIMATE, SIZE } from './estimate.ts';
import { overElements, samplesOf } from './felt.ts';
import type { WallMeasure } from './wallmeasure.ts';

/** sqrt(mean of tau^2) over all (element, sample) pairs, Pa: strong passages count more than in the mean. */
export const rmsShear: WallMeasure = {
  stem: 'rms_shear',
  unit: 'Pa',
  range: SIZE,
  estimate: (walls) => {
    const series = overElements(walls, samplesOf(walls), (sums, { shear_Pa }) => {
      for (let i = 0; i < sums.length; i++) sums[i] += shear_Pa[i] * shear_Pa[i];
    });
    if (series.length === 0) return NO_ESTIMATE;
    return { value: Math.sqrt(meanOf(series)), series, range: SIZE, at: Math.sqrt };
  },
};
