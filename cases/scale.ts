import type { Setup } from '../solver/setup.ts';
import type { Case } from './case.ts';

/** Sizes and numbers that follow from a case; all the conversion factors there are. */
export interface Derived {
  nx: number;
  ny: number;
  dx_m: number;
  dt_s: number;
  /** steps of settling and recording together; steps between wall samples */
  steps: number;
  sampleEvery: number;
  tauLiquid: number;
  tauGas: number;
  densityRatio: number;
  /** of the release diameter and the expected rise speed */
  Re: number;
  Eo: number;
  Mo: number;
  bubblesPerSecond: number;
  gasVelocity_m_s: number;
  cellsPerBubble: number;
  /** SI value of one lattice unit */
  unit: { velocity_m_s: number; stress_Pa: number; area_m2: number };
  /** along the channel */
  release: { from_m: number; to_m: number };
  skim: { from_m: number; to_m: number };
}

/** The lattice box of a case and the numbers that go with it. */
export declare function layOut(panel: Case): { setup: Setup; derived: Derived };
