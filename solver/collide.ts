/**
 * Both collisions of one cell, in raw moments. The form of the flow equation lives in `collideFlow` alone (and in
 * kernel/flow.ts): momentum-based, Liang, Xu, Chen, Wang, Chai & Shi 2018, Phys. Rev. E 97, 033309 (from memory).
 *
 * Equilibrium moments: e00 = 0, e10 = rho ux, e20 = p + rho ux^2, e11 = rho ux uy, e21 = rho CS2 uy, e22 = CS2 (p + rho u^2).
 * Sources: zeroth u.grad rho, first F, second CS2 (u.grad rho I + u grad rho + grad rho u).
 * The two shear moments relax with omega = 1/(eta/(rho CS2) + 1/2); all others go to their equilibrium.
 */
import type { Box } from './box.ts';
import { CS2 } from './constants.ts';

/** One cell on its way through a collision: populations in and out, what the stages hand on. */
export interface Cell {
  f: Float64Array;
  g: Float64Array;
  phi: number;
  phiX: number;
  phiY: number;
  lapPhi: number;
  driveX: number;
  skim: number;
  ux: number;
  uy: number;
  p: number;
  /** viscous shear stress eta (dux/dy + duy/dx) */
  tauXY: number;
}

export const newCell = (): Cell => ({
  f: new Float64Array(9),
  g: new Float64Array(9),
  phi: 1,
  phiX: 0,
  phiY: 0,
  lapPhi: 0,
  driveX: 0,
  skim: 0,
  ux: 0,
  uy: 0,
  p: 0,
  tauXY: 0,
});

/** Flow collision: reads f, phi and its derivatives; writes f, ux, uy, p, tauXY. */
export function collideFlow(box: Box, cell: Cell): void {
  const { f, phi, phiX, phiY } = cell;
  const dRho = box.rhoLiquid - box.rhoGas;
  const rho = box.rhoGas + phi * dRho;
  const rhoBefore = rho - dRho * (1 - phi) * cell.skim;
  const rhoX = dRho * phiX;
  const rhoY = dRho * phiY;
  const eta = 1 / (box.fluidityGas + phi * (box.fluidityLiquid - box.fluidityGas));

  const mu = 4 * box.beta * phi * (phi - 1) * (phi - 0.5) - box.kappa * cell.lapPhi;
  const Fx = mu * phiX + (rho - box.rhoLiquid) * box.gravityX + box.forceX + cell.driveX;
  const Fy = mu * phiY + (rho - box.rhoLiquid) * box.gravityY + box.forceY;

  const m10 = f[1] - f[3] + f[5] - f[6] - f[7] + f[8];
  const m01 = f[2] - f[4] + f[5] + f[6] - f[7] - f[8];
  const diagonals = f[5] + f[6] + f[7] + f[8];
  const m20 = f[1] + f[3] + diagonals;
  const m02 = f[2] + f[4] + diagonals;
  const m11 = f[5] - f[6] + f[7] - f[8];

  const ux = (m10 + 0.5 * Fx) / rhoBefore;
  const uy = (m01 + 0.5 * Fy) / rhoBefore;
  const uGradRho = ux * rhoX + uy * rhoY;
  const moving = m20 + m02 - diagonals;
  const p = 0.6 * (moving + 0.5 * uGradRho - (2 / 3) * rho * (ux * ux + uy * uy));

  // shear moments: relaxed
  const omega = 1 / (eta / (rho * CS2) + 0.5);
  const e20_02 = rho * (ux * ux - uy * uy);
  const e11 = rho * ux * uy;
  const s20_02 = 2 * CS2 * (ux * rhoX - uy * rhoY);
  const s11 = CS2 * (ux * rhoY + uy * rhoX);
  const d20_02 = (1 - omega) * (m20 - m02 - e20_02) + (1 - 0.5 * omega) * s20_02;
  const d11 = (1 - omega) * (m11 - e11) + (1 - 0.5 * omega) * s11;
  cell.tauXY = -(1 - 0.5 * omega) * (m11 - e11 + 0.5 * s11);

  // the others: equilibrium and half the source
  const dTrace = 2 * CS2 * uGradRho;
  const q00 = 0.5 * uGradRho;
  const q10 = rho * ux + 0.5 * Fx;
  const q01 = rho * uy + 0.5 * Fy;
  const d20 = 0.5 * (dTrace + d20_02);
  const d02 = 0.5 * (dTrace - d20_02);
  const q20 = p + rho * ux * ux + d20;
  const q02 = p + rho * uy * uy + d02;
  const q11 = e11 + d11;
  const q21 = CS2 * q01 + 2 * ux * d11 + uy * d20;
  const q12 = CS2 * q10 + 2 * uy * d11 + ux * d02;
  const q22 = CS2 * (p + rho * (ux * ux + uy * uy));
  fromMoments(f, q00, q10, q01, q20, q02, q11, q21, q12, q22);
  cell.ux = ux;
  cell.uy = uy;
  cell.p = p;
}

/** Interface collision: reads g, phi, its gradient, ux, uy; writes g (less w/2). */
export function collideInterface(box: Box, cell: Cell): void {
  const { g, phi, phiX, phiY, ux, uy } = cell;
  const j10 = g[1] - g[3] + g[5] - g[6] - g[7] + g[8];
  const j01 = g[2] - g[4] + g[5] + g[6] - g[7] - g[8];
  const steepness = Math.sqrt(phiX * phiX + phiY * phiY + 1e-12);
  const sharpen = ((1 - 0.5 * box.omegaPhi) * CS2 * 4 * phi * (1 - phi)) / (box.W * steepness);
  const q10 = phi * ux + (1 - box.omegaPhi) * (j10 - phi * ux) + sharpen * phiX;
  const q01 = phi * uy + (1 - box.omegaPhi) * (j01 - phi * uy) + sharpen * phiY;
  const less = phi - 0.5;
  const q20 = CS2 * less + phi * ux * ux;
  const q02 = CS2 * less + phi * uy * uy;
  const q22 = CS2 * (CS2 * less + phi * (ux * ux + uy * uy));
  fromMoments(g, less, q10, q01, q20, q02, phi * ux * uy, CS2 * q01, CS2 * q10, q22);
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
