/**
 * Both collisions of one cell, in raw moments. The form of the flow equation lives in `collideFlow` alone (and in
 * kernel/flow.ts): momentum-based, Liang, Xu, Chen, Wang, Chai & Shi 2018, Phys. Rev. E 97, 033309 (from memory).
 *
 * Equilibrium moments: e00 = 0, e10 = rho ux, e20 = p + Jx ux, e11 = (Jx uy + Jy ux)/2, e21 = CS2 rho uy, e22 = CS2 (p + rho u^2).
 * Sources: zeroth u.grad rho, first F, second CS2 (u.grad rho I + u grad rho + grad rho u).
 * The two shear moments relax with omega = 1/(eta/(rho CS2) + 1/2); all others go to their equilibrium.
 *
 * What keeps it stable where bubbles pinch off, merge and meet fins (figures in DEVELOPERS.md):
 * - J is the mass flux of the interface equation, J = rho u - drho M (1 - theta/|grad phi|) grad phi, so that mass and
 *   momentum move together;
 * - phi is clipped to 0..1 where rho, eta, theta and the buoyancy are made from it;
 * - fast gas is thicker, nu + A (0.98 - phi)^8 u^4: the jets of a pinch-off would pass the lattice's sound speed, and break up at
 *   the size of a cell before that; the wall stress is read without it;
 * - gas that was faster than the limit c is held back, u / sqrt(1 + (1 - phi) (u^2/c^2 - 1)): a safety net, which takes momentum
 *   and would take a seventh of the buoyancy without the line above;
 * - velocities that change sign in every step lose 4 damping of themselves per step (a second difference in time, which
 *   leaves steady acceleration alone).
 */
import type { Box } from './box.ts';
import { CS2 } from './constants.ts';

/** One cell on its way through a collision: populations in and out, what the stages hand on. */
export interface Cell {
  /** in: what arrives; out: what leaves */
  f: Float64Array;
  /** the same, less w */
  g: Float64Array;
  phi: number;
  phiX: number;
  phiY: number;
  lapPhi: number;
  driveX: number;
  /** what sound damping takes from ux */
  soundX: number;
  /** share of the gas skimmed in this step */
  skim: number;
  ux: number;
  uy: number;
  /** velocity one and two steps ago */
  ux1: number;
  uy1: number;
  ux2: number;
  uy2: number;
  p: number;
  /** theta/|grad phi| = (4/W) phi (1 - phi)/|grad phi|: 1 where the interface has its shape */
  sharpness: number;
  /** viscous shear stress eta (dux/dy + duy/dx) */
  tauXY: number;
}

export const newCell = (): Cell => ({
  f: new Float64Array(9),
  g: new Float64Array(9),
  ...{ phi: 1, phiX: 0, phiY: 0, lapPhi: 0, driveX: 0, soundX: 0, skim: 0 },
  ...{ ux: 0, uy: 0, ux1: 0, uy1: 0, ux2: 0, uy2: 0, p: 0, sharpness: 0, tauXY: 0 },
});

/** gas that is not thickened: the liquid's side of an interface, and powers that would underflow there */
const SKIN = 0.02;

const clip = (phi: number): number => Math.min(Math.max(phi, 0), 1);

/** Flow collision: reads f, phi and its derivatives, earlier velocities; writes f, ux, uy, p, sharpness, tauXY. */
export function collideFlow(box: Box, cell: Cell): void {
  const { f, phi, phiX, phiY } = cell;
  const dRho = box.rhoLiquid - box.rhoGas;
  const inside = clip(phi);
  const gas = 1 - inside;
  const rho = box.rhoGas + inside * dRho;
  const rhoX = dRho * phiX;
  const rhoY = dRho * phiY;
  const eta = 1 / (box.fluidityGas + inside * (box.fluidityLiquid - box.fluidityGas));
  cell.sharpness = ((4 / box.W) * inside * gas) / Math.sqrt(phiX * phiX + phiY * phiY + 1e-12);

  const mu = 4 * box.beta * phi * (phi - 1) * (phi - 0.5) - box.kappa * cell.lapPhi;
  const Fx = mu * phiX - dRho * gas * box.gravityX + box.forceX + cell.driveX;
  const Fy = mu * phiY - dRho * gas * box.gravityY + box.forceY;

  const m10 = f[1] - f[3] + f[5] - f[6] - f[7] + f[8];
  const m01 = f[2] - f[4] + f[5] + f[6] - f[7] - f[8];
  const diagonals = f[5] + f[6] + f[7] + f[8];
  const m20 = f[1] + f[3] + diagonals;
  const m02 = f[2] + f[4] + diagonals;
  const m11 = f[5] - f[6] + f[7] - f[8];

  const earlier2 = cell.ux1 ** 2 + cell.uy1 ** 2;
  const held = 1 / Math.sqrt(1 + gas * Math.max(earlier2 * box.gasLimit - 1, 0));
  let ux = ((m10 + 0.5 * Fx) / rho - cell.soundX) * held;
  let uy = ((m01 + 0.5 * Fy) / rho) * held;
  if (box.twoPhase) {
    ux -= box.damping * (ux - 2 * cell.ux1 + cell.ux2);
    uy -= box.damping * (uy - 2 * cell.uy1 + cell.uy2);
  }
  const u2 = ux * ux + uy * uy;
  const uGradRho = ux * rhoX + uy * rhoY;
  const p = 0.6 * (m20 + m02 - diagonals + 0.5 * uGradRho - (2 / 3) * rho * u2);

  // skimming makes liquid of gas: u and p stay, momentum grows
  const rhoAfter = rho + dRho * cell.skim * gas;
  const jx = rhoAfter * ux;
  const jy = rhoAfter * uy;
  const diffusing = box.mobility * dRho * (1 - cell.sharpness);
  const Jx = jx - diffusing * phiX;
  const Jy = jy - diffusing * phiY;

  // shear moments: relaxed
  const nu = eta / rho;
  const added = box.gasThickening * Math.max(gas - SKIN, 0) ** 8 * earlier2 * earlier2;
  const omega = 1 / ((nu + added) / CS2 + 0.5);
  const eDiff = Jx * ux - Jy * uy;
  const e11 = 0.5 * (Jx * uy + Jy * ux);
  const sDiff = 2 * CS2 * (ux * rhoX - uy * rhoY);
  const s11 = CS2 * (ux * rhoY + uy * rhoX);
  const dDiff = (1 - omega) * (m20 - m02 - eDiff) + (1 - 0.5 * omega) * sDiff;
  const d11 = (1 - omega) * (m11 - e11) + (1 - 0.5 * omega) * s11;
  cell.tauXY = (-(1 - 0.5 * omega) * (m11 - e11 + 0.5 * s11) * nu) / (nu + added);

  // the others: equilibrium and half the source; third moments follow those of the shear that moves with the flow
  const half00 = 0.5 * uGradRho;
  const trace = 2 * p + Jx * ux + Jy * uy + 4 * CS2 * half00;
  const q10 = jx + 0.5 * Fx;
  const q01 = jy + 0.5 * Fy;
  const q20 = 0.5 * (trace + eDiff + dDiff);
  const q02 = 0.5 * (trace - eDiff - dDiff);
  const k11 = d11 - 0.5 * s11;
  const k20 = 0.5 * (dDiff - 0.5 * sDiff);
  const q21 = CS2 * q01 + 2 * ux * k11 + uy * k20;
  const q12 = CS2 * q10 + 2 * uy * k11 - ux * k20;
  const q22 = CS2 * (p + rhoAfter * u2 + half00);
  fromMoments(f, half00, q10, q01, q20, q02, e11 + d11, q21, q12, q22);
  cell.ux = ux;
  cell.uy = uy;
  cell.p = p;
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
  fromMoments(g, z, q10, q01, CS2 * z + vx * ux, CS2 * z + vy * uy, vx * uy, CS2 * vy, CS2 * vx, q22);
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
