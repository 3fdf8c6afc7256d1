import { byMean, SIZE } from './estimate.ts';
import { overElements, samplesOf } from './felt.ts';
import type { WallMeasure } from './wallmeasure.ts';

/**
 * Rises of |tau| above the asked threshold, per element and second of recording (first to last sample), 1/s; none below two samples. An
 * excursion that is under way at the first sample rose before. Flutter around the threshold counts each time.
 */
export const events: WallMeasure = {
  stem: 'events',
  unit: '1_s',
  range: SIZE,
  estimate: (walls, { above_Pa }) => {
    const { every_s } = walls[0].surface;
    return byMean(
      overElements(walls, samplesOf(walls) - 1, (sums, { magnitude_Pa }) => {
        for (let i = 0; i < sums.length; i++) if (magnitude_Pa[i + 1] > above_Pa && magnitude_Pa[i] <= above_Pa) sums[i] += 1 / every_s;
      }),
      SIZE,
    );
  },
};
