import { byMean, SHARE } from './estimate.ts';
import { overElements, samplesOf } from './felt.ts';
import type { WallMeasure } from './wallmeasure.ts';

/** Share of (element, sample) pairs with |tau| above the asked threshold (strictly). Does not say whether always the same elements have it. */
export const shareAbove: WallMeasure = {
  stem: 'share_above',
  unit: '',
  range: SHARE,
  estimate: (walls, { above_Pa }) =>
    byMean(
      overElements(walls, samplesOf(walls), (sums, { magnitude_Pa }) => {
        for (let i = 0; i < sums.length; i++) if (magnitude_Pa[i] > above_Pa) sums[i]++;
      }),
      SHARE,
    ),
};
