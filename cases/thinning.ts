/** Liquids that thin under shear: eta = K rate^(n - 1) + yield stress / rate. SI. */
import type { Rheology } from './case.ts';

/** Shear rate whose apparent viscosity stands for the liquid in Reynolds and Morton numbers, 1/s: that of scoured walls. */
export const TYPICAL_RATE_1_s = 100;

/**
 * Activated sludge: K = exp(2 M^0.41) mPa s^n, n = 1 - 0.23 M^0.37, M the suspended solids in g/L.
 * Reviews call such fits not very trustworthy (Ratkovich et al. 2013, Water Res. 47, 463).
 * @see Rosenberger, Kubin & Kraume 2002, Eng. Life Sci. 2, 269 (from memory)
 */
export function sludge(solids_kg_m3: number): { consistency_Pa_sn: number; index: number } {
  return { consistency_Pa_sn: 1e-3 * Math.exp(2 * solids_kg_m3 ** 0.41), index: 1 - 0.23 * solids_kg_m3 ** 0.37 };
}

/** Never thinner than `least_Pa_s`, the water it is made of. */
export function apparentViscosity_Pa_s({ consistency_Pa_sn, index, yieldStress_Pa, least_Pa_s }: Rheology, rate_1_s: number): number {
  return Math.max(consistency_Pa_sn * rate_1_s ** (index - 1) + yieldStress_Pa / rate_1_s, least_Pa_s);
}

/** Shear rate below which the liquid would be thicker than `most_Pa_s`; 0 where it never is. By bisection of its logarithm. */
export function rateOf_1_s(rheology: Rheology, most_Pa_s: number): number {
  let [low, high] = [1e-6, 1e6];
  if (apparentViscosity_Pa_s(rheology, low) <= most_Pa_s) return 0;
  for (let n = 0; n < 60; n++) {
    const middle = Math.sqrt(low * high);
    if (apparentViscosity_Pa_s(rheology, middle) > most_Pa_s) low = middle;
    else high = middle;
  }
  return high;
}

/** Said wherever sludge is computed from its solids alone. */
export const SLUDGE_CAUTION =
  'viscosity of sludge from its solids alone (Rosenberger, Kubin & Kraume 2002), with the density and surface tension of water: reviews call such ' +
  'fits not very trustworthy (Ratkovich et al. 2013). Measure it and give consistency, index and yield stress with kind: thinning';
