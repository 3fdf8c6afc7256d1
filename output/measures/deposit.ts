/**
 * Deposit: the share of each wall element that is covered, c, when a flux carries solids to it and shear above a threshold takes them off:
 *
 *     dc/dt = (1 - c) J C / m - [ |tau| > threshold ] c / T
 *
 * with the flux J, the concentration C of solids, the mass m per area of a full cover and the time T in which strong shear clears a wall.
 * Covering and clearing of first order are Langmuir's form (1918, J. Am. Chem. Soc. 40, 1361; from memory); that shear clears only above a
 * threshold, and at one rate there, is ours. Each sample stands for the time since the one before, over which the equation is solved
 * exactly.
 *
 * Two answers: the cover against time from the share asked for at the start, and the settled cover, were what was recorded to come again
 * and again: a recording is seconds long, covering takes minutes. Left out: layers and their resistance, spreading from element to
 * element, ageing, a flux that falls with the cover, and what a plane section leaves out.
 */
import type { Case, Recording } from '../../cases/index.ts';
import { type Estimate, meanOf, NO_ESTIMATE } from './estimate.ts';
import { type Felt, overElements, samplesOf } from './felt.ts';

type Deposit = NonNullable<Case['deposit']>;

/** Covered share of a wall, mean over its open elements, at each sample; empty where no element is open. */
export interface DepositMeasures {
  fromStart: Float64Array;
  settled: Float64Array;
}

/** One sample's worth of the equation, c after = keep c + gain: without and with strong shear. */
interface Step {
  /** keep = exp(-exponent) */
  exponent: number;
  keep: number;
  gain: number;
}

/** Null where the case asks for no deposit. */
export function depositOn(walls: readonly Felt[], { deposit }: Case): DepositMeasures | null {
  if (deposit === undefined) return null;
  if (walls.length === 0) return { fromStart: new Float64Array(0), settled: new Float64Array(0) };
  const { above_Pa } = deposit;
  const [quiet, strong] = stepsOf(deposit, walls[0].surface.every_s);
  const covered = (first: (magnitude_Pa: Float32Array) => number): Float64Array =>
    overElements(walls, samplesOf(walls), (sums, { magnitude_Pa }) => {
      let c = first(magnitude_Pa);
      for (let i = 0; i < sums.length; i++) {
        const { keep, gain } = magnitude_Pa[i] > above_Pa ? strong : quiet;
        c = keep * c + gain;
        sums[i] += c;
      }
    });
  return {
    fromStart: covered(() => deposit.start),
    settled: covered((magnitude_Pa) => recurring(magnitude_Pa, deposit, quiet, strong)),
  };
}

/**
 * Mean of the settled cover over time; none where the case asks for no deposit. Without an interval: the cover remembers minutes, so how it
 * varies within the seconds recorded does not tell how it would vary from one recording to the next.
 */
export function settledCover({ case: panel }: Recording, walls: readonly Felt[]): Estimate {
  const settled = depositOn(walls, panel)?.settled ?? [];
  return settled.length === 0 ? NO_ESTIMATE : { ...NO_ESTIMATE, value: meanOf(settled) };
}

/** The solution over one sample, exact for steady shear: towards rate J C / m over the sum of rates, with that sum as its rate. */
function stepsOf({ flux_m_s, solids_kg_m3, layer_kg_m2, clears_s }: Deposit, every_s: number): [Step, Step] {
  const covering_1_s = (flux_m_s * solids_kg_m3) / layer_kg_m2;
  const step = (clearing_1_s: number): Step => {
    const rate_1_s = covering_1_s + clearing_1_s;
    const exponent = rate_1_s * every_s;
    return { exponent, keep: Math.exp(-exponent), gain: exponent === 0 ? 0 : (covering_1_s / rate_1_s) * -Math.expm1(-exponent) };
  };
  return [step(0), step(1 / clears_s)];
}

/**
 * The cover that comes back after one recording: all samples together make c after = keep c + gain, so c = gain / (1 - keep); without
 * flux or strong shear nothing changes, and it is that of the start.
 */
function recurring(magnitude_Pa: Float32Array, { above_Pa, start }: Deposit, quiet: Step, strong: Step): number {
  let [exponent, gain] = [0, 0];
  for (let i = 0; i < magnitude_Pa.length; i++) {
    const step = magnitude_Pa[i] > above_Pa ? strong : quiet;
    gain = step.keep * gain + step.gain;
    exponent += step.exponent;
  }
  return exponent === 0 ? start : gain / -Math.expm1(-exponent);
}
