/**
 * Liquids whose viscosity falls with the shear rate, in a box with gas: eta = K rate^(n - 1) + tauYield / rate, bounded by `least` and `most`.
 * rate = sqrt(2 S:S) on the faces between cells, S = sym grad m. It is worked out anew before the first step and after every
 * `EVERY` steps, at step numbers that no call decides: what moves is then a fraction of a cell further on. At a given stress the
 * delay is the iteration rate <- stress / eta(rate), whose errors shrink by 1 - n each time; so it settles.
 *
 * Both implementations read eta from one table over rate^2, straight between its entries, STEPS of them to a doubling.
 */
import type { Fluid } from './setup.ts';

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

/** eta over rate^2: entry i stands for 2^floor(i / STEPS + LOWEST) (1 + (i mod STEPS) / STEPS). */
export function viscosityTable(liquid: Fluid): Float64Array {
  const entries = (HIGHEST - LOWEST) * STEPS + 1;
  return Float64Array.from({ length: entries }, (_, i) => {
    const square = 2 ** (LOWEST + Math.floor(i / STEPS)) * (1 + (i % STEPS) / STEPS);
    return apparentViscosity(liquid, Math.sqrt(square));
  });
}

/** eta of a table at rate^2. */
export function lookUp(table: Float64Array, square: number): number {
  const within = Math.min(Math.max(square, 2 ** LOWEST), 2 ** HIGHEST * (1 - 2 ** -40));
  const exponent = Math.floor(Math.log2(within));
  const at = (exponent - LOWEST + within / 2 ** exponent - 1) * STEPS;
  const i = Math.floor(at);
  return table[i] + (at - i) * (table[i + 1] - table[i]);
}
