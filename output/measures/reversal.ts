import { byMean, meanOf, NO_ESTIMATE, SHARE } from './estimate.ts';
import { overElements, samplesOf } from './felt.ts';
import type { WallMeasure } from './wallmeasure.ts';

/**
 * 1 - A / B, A = sum over elements |mean in time of tau|, B = sum over elements (mean in time of |tau|): 0 where no element ever changes
 * sign, 1 where each is pulled back and forth alike; none in still water. A short recording holds too few passages for the means of single
 * elements to settle and shows too little reversal; the interval does not know of that.
 *
 * Its interval is that of the linearised ratio, whose series is 1 - A/B + (A/B b(t) - a(t)) / B, a(t) the sum of tau with the sign of its
 * element's mean, b(t) that of |tau|, both means over time being A and B.
 * @see Cochran 1977, Sampling Techniques, chapter 6 (ratio estimates) [M]
 */
export const reversal: WallMeasure = {
  stem: 'reversal',
  unit: '',
  range: SHARE,
  estimate: (walls) => {
    const steady = overElements(walls, samplesOf(walls), (sums, { shear_Pa }) => {
      let sum = 0;
      for (let i = 0; i < sums.length; i++) sum += shear_Pa[i];
      const sign = Math.sign(sum);
      for (let i = 0; i < sums.length; i++) sums[i] += sign * shear_Pa[i];
    });
    const size = overElements(walls, samplesOf(walls), (sums, { magnitude_Pa }) => {
      for (let i = 0; i < sums.length; i++) sums[i] += magnitude_Pa[i];
    });
    const A = meanOf(steady);
    const B = meanOf(size);
    if (!(B > 0)) return NO_ESTIMATE;
    return byMean(
      size.map((b, i) => 1 - A / B + ((A / B) * b - steady[i]) / B),
      SHARE,
    );
  },
};
