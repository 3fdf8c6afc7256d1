/**
 * Liquids whose viscosity falls with the shear rate: eta = K rate^(n - 1) + tauYield / rate, bounded by `least` and `most`. The upper bound is
 * what makes a yield stress computable: below the rate at which the law would exceed it, the liquid creeps as a Newtonian one.
 *
 *   with gas     eta on the faces between cells; rate = sqrt(2 S:S), S = sym grad m, before the first step and after every `EVERY` steps
 *   liquid alone omega in each cell; rate = 3 omega N/rho, N the size of the second moments off equilibrium, in every `EVERY`-th step: no
 *                neighbours are asked
 *
 * The steps at which that is done are decided by no call, and what moves is then a fraction of a cell further on. At a given stress it is one
 * step of the iteration rate <- stress / eta(rate), whose errors shrink by 1 - n or more each time; so it settles.
 *
 * Both implementations read one table over rate^2, straight between its entries, STEPS of them to a doubling.
 */
import type { Fluid, Setup } from './setup.ts';

/** steps between two updates of the viscosity */
export const EVERY = 8;
/** entries per doubling of rate^2; the error of a straight line between them is below 4e-5 of eta for n of 0.3 and more */
const STEPS = 64;
/** exponents of 2 that the table spans; slower and faster than that eta is that of the ends */
const LOWEST = -60;
const HIGHEST = 4;

/** Most kinematic viscosity in a box with gas, whose viscous force is explicit; neighbours overshoot beyond 1/6. */
export const NU_LIMIT = 0.16;

/** eta at a shear rate, both in lattice units; never more than an explicit viscous force bears. */
function apparentViscosity({ density, viscosity, rheology }: Fluid, rate: number): number {
  if (rheology === undefined) return viscosity;
  const { consistency, index, yieldStress, least } = rheology;
  return Math.min(Math.max(consistency * rate ** (index - 1) + yieldStress / rate, least), (rheology.most ?? NU_LIMIT) * density);
}

/**
 * eta of a box with gas, omega = 1/(3 eta/rho + 1/2) of one without, over rate^2: entry i stands for
 * 2^floor(i / STEPS + LOWEST) (1 + (i mod STEPS) / STEPS). Empty for a liquid that keeps its viscosity.
 */
export function rheologyTable({ liquid, gas }: Setup): Float64Array {
  const entries = liquid.rheology === undefined ? 0 : (HIGHEST - LOWEST) * STEPS + 1;
  return Float64Array.from({ length: entries }, (_, i) => {
    const square = 2 ** (LOWEST + Math.floor(i / STEPS)) * (1 + (i % STEPS) / STEPS);
    const eta = apparentViscosity(liquid, Math.sqrt(square));
    return gas ? eta : 1 / ((3 * eta) / liquid.density + 0.5);
  });
}

/** What a table holds at rate^2. */
export function lookUp(table: Float64Array, square: number): number {
  const within = Math.min(Math.max(square, 2 ** LOWEST), 2 ** HIGHEST * (1 - 2 ** -40));
  const exponent = Math.floor(Math.log2(within));
  const at = (exponent - LOWEST + within / 2 ** exponent - 1) * STEPS;
  const i = Math.floor(at);
  return table[i] + (at - i) * (table[i + 1] - table[i]);
}
