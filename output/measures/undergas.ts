import { byMean, SHARE } from './estimate.ts';
import { overElements, samplesOf } from './felt.ts';
import type { WallMeasure } from './wallmeasure.ts';

/** Share of (element, sample) pairs under gas: phi below 1/2 in the cell at the wall. A film thinner than that cell counts as gas. */
export const underGas: WallMeasure = {
  stem: 'under_gas',
  unit: '',
  range: SHARE,
  estimate: (walls) =>
    byMean(
      overElements(walls, samplesOf(walls), (sums, { gas }) => {
        for (let i = 0; i < sums.length; i++) sums[i] += gas[i];
      }),
      SHARE,
    ),
};
