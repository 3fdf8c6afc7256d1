/**
 * The collisions of one cell, in raw moments.
 *
 * One phase, `collideLiquid`: momentum-based. Equilibrium moments e00 = 0, e10 = rho ux, e20 = p + rho ux^2, e11 = rho ux uy,
 * e21 = CS2 rho uy, e22 = CS2 (p + rho u^2); the two shear moments relax with omega = 1/(eta/(rho CS2) + 1/2), all others go to
 * their equilibrium; half the force before, half after.
 *
 * With gas, `collideVelocity`: the populations carry the velocity u and s = 3 p/rhoLiquid, and no density at all. They stream velocity
 * at the density of the liquid and with a small uniform viscosity nu0; forces.ts makes up for what differs from that.
 * Equilibrium: moments of a product of two 1-D distributions, 1, u, CS2 + u^2 in each axis, with s for the 1 of the zeroth and
 * P/rhoLiquid for its share of the second; the shear moments relax with 1/(3 nu0 + 1/2), in the frame of the flow. Gas faster
 * than the limit c is held back, u / sqrt(1 + (1 - phi) (u^2/c^2 - 1)): a safety net for the jets of a pinch-off.
 */
import type { Box } from './box.ts';
import { CS2 } from './constants.ts';
import { share } from './forces.ts';
import { lookUp } from './rheology.ts';

/** One cell on its way through a collision: populations in and out, what the stages hand on. */
export interface Cell {
  /** in: what arrives; out: what leaves */
  f: Float64Array;
  /** the same, less w */
  g: Float64Array;
  phi: number;
  phiX: number;
  phiY: number;
  /** force per volume; with gas: what the velocity gains */
  Fx: number;
  Fy: number;
  /** what sound damping takes from ux */
  soundX: number;
  /** skimmed share of this step */
  skim: number;
  ux: number;
  uy: number;
  p: number;
  /** p with what damps sound, in the second moments */
  P: number;
  /** theta/|grad phi| = (4/W) phi (1 - phi)/|grad phi|: 1 where the interface has its shape */
  sharpness: number;
  /** of a box without gas: what its shear moments relax with */
  omega: number;
  /** viscous shear stress eta (dux/dy + duy/dx) */
  tauXY: number;
}

export const newCell = (): Cell => ({
  f: new Float64Array(9),
  g: new Float64Array(9),
  ...{ phi: 1, phiX: 0, phiY: 0, Fx: 0, Fy: 0, soundX: 0, skim: 0 },
  ...{ ux: 0, uy: 0, p: 0, P: 0, sharpness: 0, tauXY: 0, omega: 0 },
});

/** First moment of what arrives. */
export const firstMoment = (f: ArrayLike<number>): [number, number] => [
  f[1] - f[3] + f[5] - f[6] - f[7] + f[8],
  f[2] - f[4] + f[5] + f[6] - f[7] - f[8],
];

/**
 * Flow collision of a box without gas: reads f, F, soundX, omega; writes f, ux, uy, p, tauXY.
 * @param renewed omega over rate^2: writes omega too, for the steps to come
 */
export function collideLiquid(box: Box, cell: Cell, renewed?: Float64Array): void {
  const { f, Fx, Fy, omega } = cell;
  const rho = box.rhoLiquid;
  const [m10, m01] = firstMoment(f);
  const diagonals = f[5] + f[6] + f[7] + f[8];
  const m20 = f[1] + f[3] + diagonals;
  const m02 = f[2] + f[4] + diagonals;
  const m11 = f[5] - f[6] + f[7] - f[8];
  const ux = (m10 + 0.5 * Fx) / rho - cell.soundX;
  const uy = (m01 + 0.5 * Fy) / rho;
  const u2 = ux * ux + uy * uy;
  const p = 0.6 * (m20 + m02 - diagonals - (2 / 3) * rho * u2);
  const [exx, eyy, e11] = [rho * ux * ux, rho * uy * uy, rho * ux * uy];
  const n11 = m11 - e11;
  const n20 = m20 - m02 - (exx - eyy);
  if (renewed) cell.omega = lookUp(renewed, ((3 * omega) / rho) ** 2 * (n11 * n11 + 0.25 * n20 * n20));
  const d20 = 0.5 * (1 - omega) * n20;
  const d11 = (1 - omega) * n11;
  cell.tauXY = -(1 - 0.5 * omega) * n11;
  const q10 = rho * ux + 0.5 * Fx;
  const q01 = rho * uy + 0.5 * Fy;
  const q21 = CS2 * q01 + 2 * ux * d11 + uy * d20;
  const q12 = CS2 * q10 + 2 * uy * d11 - ux * d20;
  fromMoments(f, 0, q10, q01, p + exx + d20, p + eyy - d20, e11 + d11, q21, q12, CS2 * (p + rho * u2));
  cell.ux = ux;
  cell.uy = uy;
  cell.p = p;
}

/** Flow collision of a box with gas: reads f, F, soundX, p, P; writes f, ux, uy. */
export function collideVelocity(box: Box, cell: Cell): void {
  const { f, Fx, Fy } = cell;
  const [mx, my] = firstMoment(f);
  const gas = 1 - share(cell.phi);
  const [fastX, fastY] = [mx + Fx - cell.soundX, my + Fy];
  const held = 1 / Math.sqrt(1 + gas * Math.max((fastX * fastX + fastY * fastY) * box.gasLimit - 1, 0));
  const [u, v] = [fastX * held, fastY * held];
  const keep = 1 - 1 / (box.nu0 / CS2 + 0.5);
  const d11 = keep * (f[5] - f[6] + f[7] - f[8] - mx * my);
  const d20 = 0.5 * keep * (f[1] + f[3] - f[2] - f[4] - (mx * mx - my * my));
  velocityMoments(f, (3 * cell.p) / box.rhoLiquid, cell.P / box.rhoLiquid, u, v, d20, d11);
  cell.ux = (fastX - 0.5 * Fx) * held;
  cell.uy = (fastY - 0.5 * Fy) * held;
}

/**
 * Populations with the zeroth moment s, the pressure share P of the second and the velocity u, v, off equilibrium by d20 (and
 * -d20 in the other axis) and d11. What moves with the flow makes the higher moments.
 */
export function velocityMoments(f: Float64Array, s: number, P: number, u: number, v: number, d20: number, d11: number): void {
  const [uu, vv] = [u * u, v * v];
  const d21 = 2 * u * d11 + v * d20;
  const d12 = 2 * v * d11 - u * d20;
  const d22 = 2 * v * d21 - vv * d20 + 2 * u * d12 - 4 * u * v * d11 + uu * d20;
  const q22 = CS2 * (P + uu + vv) + uu * vv + d22;
  fromMoments(f, s, u, v, P + uu + d20, P + vv - d20, u * v + d11, v * (CS2 + uu) + d21, u * (CS2 + vv) + d12, q22);
}

/** Interface collision: reads g, phi, its gradient, sharpness, skim, ux, uy; writes g. All g are less w. */
export function collideInterface(box: Box, cell: Cell): void {
  const { g, phiX, phiY, ux, uy } = cell;
  const z = (cell.phi - 1) * (1 - cell.skim);
  const phi = 1 + z;
  const j10 = g[1] - g[3] + g[5] - g[6] - g[7] + g[8];
  const j01 = g[2] - g[4] + g[5] + g[6] - g[7] - g[8];
  const sharpen = (1 - 0.5 * box.omegaPhi) * CS2 * cell.sharpness;
  const vx = phi * ux;
  const vy = phi * uy;
  const q10 = vx + (1 - box.omegaPhi) * (j10 - vx) + sharpen * phiX;
  const q01 = vy + (1 - box.omegaPhi) * (j01 - vy) + sharpen * phiY;
  const q22 = CS2 * (CS2 * z + vx * ux + vy * uy);
  fromMoments(g, z, q10, q01, CS2 * z + vx * ux, CS2 * z + vy * uy, vx * uy, CS2 * q01, CS2 * q10, q22);
}

/** The nine populations from the nine raw moments. */
export function fromMoments(
  f: Float64Array,
  q00: number,
  q10: number,
  q01: number,
  q20: number,
  q02: number,
  q11: number,
  q21: number,
  q12: number,
  q22: number,
): void {
  f[0] = q00 - q20 - q02 + q22;
  f[1] = 0.5 * (q20 - q22 + q10 - q12);
  f[3] = 0.5 * (q20 - q22 - q10 + q12);
  f[2] = 0.5 * (q02 - q22 + q01 - q21);
  f[4] = 0.5 * (q02 - q22 - q01 + q21);
  const even = 0.25 * (q22 + q11);
  const odd = 0.25 * (q22 - q11);
  const along = 0.25 * (q12 + q21);
  const against = 0.25 * (q12 - q21);
  f[5] = even + along;
  f[7] = even - along;
  f[6] = odd - against;
  f[8] = odd + against;
}
