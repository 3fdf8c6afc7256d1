import type { Case } from '../../cases/index.ts';
import type { Estimate, Range } from './estimate.ts';
import type { Felt } from './felt.ts';

/**
 * One headline measure of a wall, or of all membrane walls as one surface, over their open elements. Left out of all of them: release and
 * skim bands, elements under a fin, the settling time, and what a plane section leaves out.
 */
export interface WallMeasure {
  /** its name is `stem_place` or `stem_place_unit` */
  stem: string;
  /** SI unit as names spell it; empty for a share */
  unit: '' | 'Pa' | '1_s';
  range: Range;
  /** @param walls one at least, of one recording */
  estimate(walls: readonly Felt[], asked: Case['swept']): Estimate;
}
