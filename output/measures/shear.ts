import type { Case } from '../../cases/index.ts';
import { shareAbove } from './above.ts';
import { events } from './events.ts';
import type { Felt } from './felt.ts';
import { meanShear, steadyShear } from './mean.ts';
import { PERCENTILES, percentiles } from './percentiles.ts';
import { reversal } from './reversal.ts';
import { rmsShear } from './rms.ts';
import { underGas } from './undergas.ts';

/**
 * What one wall felt, over all its open membrane elements and all samples (every pair counts the same); each number is defined in the file of
 * its measure. null where the recording is too short, or the wall too covered, to give it.
 */
export interface ShearStatistics {
  /** of |tau| */
  meanAbs_Pa: number | null;
  /** of tau with its sign, upward positive */
  mean_Pa: number | null;
  rms_Pa: number | null;
  /** of |tau|, p5 to p99 */
  percentiles_Pa: Record<`p${(typeof PERCENTILES)[number]}`, number | null>;
  /** largest |tau|; grows with the length of the recording, so it has no interval and is no headline measure */
  max_Pa: number | null;
  shareAbove: number | null;
  events_1_s: number | null;
  reversal: number | null;
  shareUnderGas: number | null;
}

export function shearStatistics(wall: Felt, asked: Case['swept']): ShearStatistics {
  const value = (measure: typeof meanShear): number | null => measure.estimate([wall], asked).value;
  return {
    meanAbs_Pa: value(meanShear),
    mean_Pa: value(steadyShear),
    rms_Pa: value(rmsShear),
    percentiles_Pa: Object.fromEntries(
      PERCENTILES.map((percent, i) => [`p${percent}`, value(percentiles[i])]),
    ) as ShearStatistics['percentiles_Pa'],
    max_Pa: wall.sorted_Pa().at(-1) ?? null,
    shareAbove: value(shareAbove),
    events_1_s: value(events),
    reversal: value(reversal),
    shareUnderGas: value(underGas),
  };
}
