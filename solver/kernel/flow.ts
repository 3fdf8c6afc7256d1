// Both collisions of one row, f and g: the formulas of collide.ts, whose text explains them, in lanes along x.
// Form of the flow equation: momentum-based (Liang et al. 2018, Phys. Rev. E 97, 033309; from memory). It lives here alone.
// Reads f and g of rows y - 1, y, y + 1, z and its ghosts, mask, skim, the velocities of the last two steps; writes f and g over
// row y - 2, ux and uy, on demand phi and p (flag FIELDS) and tau (flag STRESS). Adds ux
// and gas to the sums of the sections and leaves the largest u^2 of the row in `topU2`.
import * as H from '../header';
import { address, entry, fieldRow, nx, row, stride, tauRow, zRow } from './rows';
import { tremble } from './tremble';
import { add, atLeast, atMost, div, get, largest, mad, mul, nmad, put, root, splat, sub } from './vector';

export const FIELDS: i32 = 1;
export const STRESS: i32 = 2;

export let topU2: f64 = 0;

export function collideRow<T>(y: i32, flags: i32): void {
  const size = sizeof<T>();
  const south = row(y - 1);
  const here = row(y);
  const north = row(y + 1);
  const f1 = here + stride - size;
  const f2 = south + 2 * stride;
  const f3 = here + 3 * stride + size;
  const f4 = north + 4 * stride;
  const f5 = south + 5 * stride - size;
  const f6 = south + 6 * stride + size;
  const f7 = north + 7 * stride + size;
  const f8 = north + 8 * stride - size;
  const o0 = row(y - 2);
  const o1 = o0 + stride;
  const o2 = o1 + stride;
  const o3 = o2 + stride;
  const o4 = o3 + stride;
  const o5 = o4 + stride;
  const o6 = o5 + stride;
  const o7 = o6 + stride;
  const o8 = o7 + stride;
  const g1 = f1 + 9 * stride;
  const g2 = f2 + 9 * stride;
  const g3 = f3 + 9 * stride;
  const g4 = f4 + 9 * stride;
  const g5 = f5 + 9 * stride;
  const g6 = f6 + 9 * stride;
  const g7 = f7 + 9 * stride;
  const g8 = f8 + 9 * stride;
  const r0 = o8 + stride;
  const r1 = r0 + stride;
  const r2 = r1 + stride;
  const r3 = r2 + stride;
  const r4 = r3 + stride;
  const r5 = r4 + stride;
  const r6 = r5 + stride;
  const r7 = r6 + stride;
  const r8 = r7 + stride;
  const zS = zRow(y - 1);
  const zC = zRow(y);
  const zN = zRow(y + 1);
  const mask = fieldRow(H.AT_MASK, y);
  const skim = address(H.AT_SKIM);
  const uxAt = fieldRow(H.AT_UX, y);
  const uyAt = fieldRow(H.AT_UY, y);
  const uxBefore = fieldRow(H.AT_UX_BEFORE, y);
  const uyBefore = fieldRow(H.AT_UY_BEFORE, y);
  const phiOut = fieldRow(H.AT_PHI, y);
  const pOut = fieldRow(H.AT_P, y);
  const tauOut = tauRow(y);

  const drho = entry(H.RHO_LIQUID) - entry(H.RHO_GAS);
  const omegaPhi = entry(H.OMEGA_PHI);
  const zero = splat<T>(0);
  const half = splat<T>(0.5);
  const quarter = splat<T>(0.25);
  const one = splat<T>(1);
  const third = splat<T>(1.0 / 3.0);
  const twoThirds = splat<T>(2.0 / 3.0);
  const twelfth = splat<T>(1.0 / 12.0);
  const rhoGas = splat<T>(entry(H.RHO_GAS));
  const dRho = splat<T>(drho);
  const fluidityGas = splat<T>(entry(H.FLUIDITY_GAS));
  const dFluidity = splat<T>(entry(H.FLUIDITY_LIQUID) - entry(H.FLUIDITY_GAS));
  const beta4 = splat<T>(4 * entry(H.BETA));
  const kappaSixth = splat<T>(entry(H.KAPPA) / 6);
  const driveX = entry(H.FORCE_X) + entry(H.DRIVE_FORCE);
  const driveY = entry(H.FORCE_Y);
  // the same on both, so that it falls to nothing in gas, whose momentum lies on a finer grid
  const trembleX = 2 * tremble<T>(driveX);
  const trembleY = 2 * tremble<T>(driveY);
  const forceX = splat<T>(driveX + trembleX);
  const forceY = splat<T>(driveY + trembleY);
  const heavyX = splat<T>(drho * entry(H.GRAVITY_X) + trembleX);
  const heavyY = splat<T>(drho * entry(H.GRAVITY_Y) + trembleY);
  const keepPhi = splat<T>(1 - omegaPhi);
  const slope = splat<T>(4 / entry(H.WIDTH));
  const sharp = splat<T>((1 - 0.5 * omegaPhi) / 3);
  const diffusion = splat<T>(drho * entry(H.MOBILITY));
  const damping = splat<T>(entry(H.DAMPING));
  const gasLimit = splat<T>(entry(H.GAS_LIMIT));
  const thickening = splat<T>(entry(H.GAS_THICKENING));
  const sections = address(H.AT_SECTIONS);
  const sectionGas = sections + stride;
  const sound = sections + 2 * stride;
  const skin = splat<T>(0.02);
  const three = splat<T>(3);
  const tiny = splat<T>(1e-12);
  const notDenormal = splat<T>(1e-20);
  let top = zero;
  let energy = zero;

  const end = <usize>nx * size;
  let i: usize = 0;
  do {
    // phi and its derivatives
    const z = get(zC + i);
    const zE = get(zC + i + size);
    const zW = get(zC + i - size);
    const zNorth = get(zN + i);
    const zSouth = get(zS + i);
    const zNE = get(zN + i + size);
    const zNW = get(zN + i - size);
    const zSE = get(zS + i + size);
    const zSW = get(zS + i - size);
    const slopeA = sub<T>(zNE, zSW);
    const slopeB = sub<T>(zSE, zNW);
    const phiX = mad<T>(sub<T>(zE, zW), third, mul<T>(add<T>(slopeA, slopeB), twelfth));
    const phiY = mad<T>(sub<T>(zNorth, zSouth), third, mul<T>(sub<T>(slopeA, slopeB), twelfth));
    const axes = add<T>(add<T>(zE, zW), add<T>(zNorth, zSouth));
    const corners = add<T>(add<T>(zNE, zSW), add<T>(zSE, zNW));
    const lap6 = add<T>(mul<T>(splat<T>(4), axes), nmad<T>(splat<T>(20), z, corners));
    const phi = add<T>(one, z);
    const inside = atMost<T>(atLeast<T>(phi, zero), one);
    const gas = sub<T>(one, inside);
    const well = mul<T>(inside, gas);

    // density, forces
    const rho = mad<T>(inside, dRho, rhoGas);
    const rhoX = mul<T>(dRho, phiX);
    const rhoY = mul<T>(dRho, phiY);
    const mu = sub<T>(mul<T>(mul<T>(beta4, mul<T>(phi, z)), sub<T>(phi, half)), mul<T>(kappaSixth, lap6));
    const Fx = mad<T>(mu, phiX, nmad<T>(gas, heavyX, forceX));
    const Fy = mad<T>(mu, phiY, nmad<T>(gas, heavyY, forceY));

    // moments that arrive
    const v1 = get(f1 + i);
    const v2 = get(f2 + i);
    const v3 = get(f3 + i);
    const v4 = get(f4 + i);
    const v5 = get(f5 + i);
    const v6 = get(f6 + i);
    const v7 = get(f7 + i);
    const v8 = get(f8 + i);
    const a57 = sub<T>(v5, v7);
    const a86 = sub<T>(v8, v6);
    const b57 = add<T>(v5, v7);
    const b86 = add<T>(v8, v6);
    const m10 = add<T>(sub<T>(v1, v3), add<T>(a57, a86));
    const m01 = add<T>(sub<T>(v2, v4), sub<T>(a57, a86));
    const m11 = sub<T>(b57, b86);
    const x13 = add<T>(v1, v3);
    const y24 = add<T>(v2, v4);
    const diagonals = add<T>(b57, b86);

    // one division for 1/rho, omega and 1/|grad phi|; fluid = rho / eta, thicker = added / (eta / rho)
    const fluid = mul<T>(rho, mad<T>(inside, dFluidity, fluidityGas));
    const ux1 = get(uxAt + i);
    const uy1 = get(uyAt + i);
    const earlier2 = mad<T>(ux1, ux1, mul<T>(uy1, uy1));
    const core = atLeast<T>(sub<T>(gas, skin), zero);
    const core2 = mul<T>(core, core);
    const core4 = mul<T>(core2, core2);
    const core4u2 = mul<T>(core4, earlier2);
    const thicker = mul<T>(mul<T>(thickening, fluid), mul<T>(core4u2, core4u2));
    const below = mad<T>(three, thicker, mad<T>(half, fluid, three));
    const steep = root<T>(mad<T>(phiX, phiX, mad<T>(phiY, phiY, tiny)));
    const excess = atLeast<T>(sub<T>(mul<T>(earlier2, gasLimit), one), zero);
    const holding = root<T>(mad<T>(gas, excess, one));
    const steepBelow = mul<T>(steep, below);
    const heavy = mul<T>(rho, holding);
    const all = div<T>(one, mul<T>(heavy, steepBelow));
    const lighter = mul<T>(all, steepBelow);
    const shared = mul<T>(all, heavy);
    const sharpness = mul<T>(mul<T>(slope, well), mul<T>(shared, below));
    const omega = mul<T>(fluid, mul<T>(shared, steep));

    // velocity: what arrives, damped, gas held back
    const fluidHere = get(mask + i);
    const live = mul<T>(lighter, fluidHere);
    const uxRaw = mul<T>(nmad<T>(rho, get(sound + i), mad<T>(half, Fx, m10)), live);
    const uyRaw = mul<T>(mad<T>(half, Fy, m01), live);
    const bendX = add<T>(sub<T>(uxRaw, add<T>(ux1, ux1)), get(uxBefore + i));
    const bendY = add<T>(sub<T>(uyRaw, add<T>(uy1, uy1)), get(uyBefore + i));
    const ux = nmad<T>(damping, bendX, uxRaw);
    const uy = nmad<T>(damping, bendY, uyRaw);
    put(uxBefore + i, ux1);
    put(uyBefore + i, uy1);
    put(uxAt + i, ux);
    put(uyAt + i, uy);
    const u2 = mad<T>(ux, ux, mul<T>(uy, uy));
    put(sections + i, add<T>(get(sections + i), ux));
    put(sectionGas + i, mad<T>(gas, fluidHere, get(sectionGas + i)));
    top = atLeast<T>(top, u2);
    energy = add<T>(energy, u2);

    const uxRhoX = mul<T>(ux, rhoX);
    const uyRhoY = mul<T>(uy, rhoY);
    const half00 = mul<T>(half, add<T>(uxRhoX, uyRhoY));
    const moving = add<T>(add<T>(x13, y24), diagonals);
    const p = mul<T>(splat<T>(0.6), nmad<T>(mul<T>(twoThirds, rho), u2, add<T>(moving, half00)));

    // mass flux; skimming makes liquid of gas
    const skimmed = get(skim + i);
    const rhoAfter = mad<T>(mul<T>(dRho, skimmed), gas, rho);
    const jx = mul<T>(rhoAfter, ux);
    const jy = mul<T>(rhoAfter, uy);
    const diffusing = mul<T>(diffusion, sub<T>(one, sharpness));
    const Jx = nmad<T>(diffusing, phiX, jx);
    const Jy = nmad<T>(diffusing, phiY, jy);

    // shear moments
    const keep = sub<T>(one, omega);
    const half1 = nmad<T>(half, omega, one);
    const xx = mul<T>(Jx, ux);
    const yy = mul<T>(Jy, uy);
    const eDiff = sub<T>(xx, yy);
    const e11 = mul<T>(half, mad<T>(Jx, uy, mul<T>(Jy, ux)));
    const n11 = sub<T>(m11, e11);
    const s11 = mul<T>(third, mad<T>(ux, rhoY, mul<T>(uy, rhoX)));
    const d11 = mad<T>(keep, n11, mul<T>(half1, s11));
    const sDiff = mul<T>(twoThirds, sub<T>(uxRhoX, uyRhoY));
    const dDiff = mad<T>(keep, sub<T>(sub<T>(x13, y24), eDiff), mul<T>(half1, sDiff));

    // moments that leave
    const trace = add<T>(add<T>(add<T>(p, p), add<T>(xx, yy)), mul<T>(splat<T>(4.0 / 3.0), half00));
    const difference = add<T>(eDiff, dDiff);
    const q10 = mad<T>(half, Fx, jx);
    const q01 = mad<T>(half, Fy, jy);
    const q20 = mul<T>(half, add<T>(trace, difference));
    const q02 = mul<T>(half, sub<T>(trace, difference));
    const q11 = add<T>(e11, d11);
    const k11 = nmad<T>(half, s11, d11);
    const twice11 = add<T>(k11, k11);
    const k20 = mul<T>(half, nmad<T>(half, sDiff, dDiff));
    const q21 = mad<T>(third, q01, mad<T>(ux, twice11, mul<T>(uy, k20)));
    const q12 = mad<T>(third, q10, nmad<T>(ux, k20, mul<T>(uy, twice11)));
    const q22 = mul<T>(third, add<T>(mad<T>(rhoAfter, u2, p), half00));

    put(o0 + i, sub<T>(add<T>(half00, q22), add<T>(q20, q02)));
    const evenX = mul<T>(half, sub<T>(q20, q22));
    const oddX = mul<T>(half, sub<T>(q10, q12));
    put(o1 + i, add<T>(evenX, oddX));
    put(o3 + i, sub<T>(evenX, oddX));
    const evenY = mul<T>(half, sub<T>(q02, q22));
    const oddY = mul<T>(half, sub<T>(q01, q21));
    put(o2 + i, add<T>(evenY, oddY));
    put(o4 + i, sub<T>(evenY, oddY));
    const even57 = mul<T>(quarter, add<T>(q22, q11));
    const odd57 = mul<T>(quarter, add<T>(q12, q21));
    put(o5 + i, add<T>(even57, odd57));
    put(o7 + i, sub<T>(even57, odd57));
    const even68 = mul<T>(quarter, sub<T>(q22, q11));
    const odd68 = mul<T>(quarter, sub<T>(q12, q21));
    put(o6 + i, sub<T>(even68, odd68));
    put(o8 + i, add<T>(even68, odd68));

    if (flags != 0) {
      if (flags & FIELDS) {
        put(phiOut + i, phi);
        put(pOut + i, p);
      }
      if (flags & STRESS) put(tauOut + i, div<T>(mul<T>(sub<T>(zero, half1), mad<T>(half, s11, n11)), add<T>(one, thicker)));
    }

    // the interface
    const w5 = get(g5 + i);
    const w6 = get(g6 + i);
    const w7 = get(g7 + i);
    const w8 = get(g8 + i);
    const c57 = sub<T>(w5, w7);
    const c86 = sub<T>(w8, w6);
    const j10 = add<T>(sub<T>(get(g1 + i), get(g3 + i)), add<T>(c57, c86));
    const j01 = add<T>(sub<T>(get(g2 + i), get(g4 + i)), sub<T>(c57, c86));
    const zAfter = add<T>(nmad<T>(z, skimmed, z), notDenormal);
    const phiAfter = add<T>(one, zAfter);
    const sharpen = mul<T>(sharp, sharpness);
    const vx = mul<T>(phiAfter, ux);
    const vy = mul<T>(phiAfter, uy);
    const h10 = mad<T>(sharpen, phiX, mad<T>(keepPhi, sub<T>(j10, vx), vx));
    const h01 = mad<T>(sharpen, phiY, mad<T>(keepPhi, sub<T>(j01, vy), vy));
    const zThird = mul<T>(third, zAfter);
    const vxx = mul<T>(vx, ux);
    const vyy = mul<T>(vy, uy);
    const h20 = add<T>(zThird, vxx);
    const h02 = add<T>(zThird, vyy);
    const h11 = mul<T>(vx, uy);
    const h21 = mul<T>(third, vy);
    const h12 = mul<T>(third, vx);
    const h22 = mul<T>(third, add<T>(zThird, add<T>(vxx, vyy)));
    put(r0 + i, sub<T>(add<T>(zAfter, h22), add<T>(h20, h02)));
    const gEvenX = mul<T>(half, sub<T>(h20, h22));
    const gOddX = mul<T>(half, sub<T>(h10, h12));
    put(r1 + i, add<T>(gEvenX, gOddX));
    put(r3 + i, sub<T>(gEvenX, gOddX));
    const gEvenY = mul<T>(half, sub<T>(h02, h22));
    const gOddY = mul<T>(half, sub<T>(h01, h21));
    put(r2 + i, add<T>(gEvenY, gOddY));
    put(r4 + i, sub<T>(gEvenY, gOddY));
    const gEven57 = mul<T>(quarter, add<T>(h22, h11));
    const gOdd57 = mul<T>(quarter, add<T>(h12, h21));
    put(r5 + i, add<T>(gEven57, gOdd57));
    put(r7 + i, sub<T>(gEven57, gOdd57));
    const gEven68 = mul<T>(quarter, sub<T>(h22, h11));
    const gOdd68 = mul<T>(quarter, sub<T>(h12, h21));
    put(r6 + i, sub<T>(gEven68, gOdd68));
    put(r8 + i, add<T>(gEven68, gOdd68));
    i += 16;
  } while (i < end);
  topU2 = largest<T>(top, energy);
}
