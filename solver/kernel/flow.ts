// Force and both collisions of one row of a box with gas: the formulas of forces.ts and collide.ts, whose texts explain them, in
// lanes along x. Reads what arrive.ts and pressure.ts left, with ghosts; writes f and g of the row in place, on demand (flag FIELDS)
// phi, ux and uy. Tiles of liquid alone: liquid.ts.
import * as H from '../header';
import { FIELDS } from './bulk';
import { send } from './populations';
import { address, entry, fieldRow, row, stride, zRow } from './rows';
import { tremble } from './tremble';
import { add, atLeast, atMost, div, get, mad, max, mul, nmad, noneBelow, PURE, put, root, share, splat, sub, total } from './vector';

const COUPLING: f64 = 0.25;

/** sum of ux of the last call */
export let flux: f64 = 0;

/** eta at the face between two cells */
@inline function thickness<T>(z: v128, other: v128, gas: v128, more: v128): v128 {
  return div<T>(splat<T>(1), mad<T>(share<T>(mul<T>(splat<T>(0.5), add<T>(z, other))), more, gas));
}

/** the same beside a liquid of viscosity `liquid` */
@inline function thicknessBeside<T>(z: v128, other: v128, gas: v128, liquid: v128): v128 {
  const wet = share<T>(mul<T>(splat<T>(0.5), add<T>(z, other)));
  return div<T>(liquid, mad<T>(mul<T>(sub<T>(splat<T>(1), wet), gas), liquid, wet));
}

/** share of one face in the coupling: weight times (3 (P' - P) - (P'' - P behind)) */
@inline function part<T>(weight: v128, beyond: v128, own: v128, far: v128, behind: v128): v128 {
  return mul<T>(weight, sub<T>(mul<T>(splat<T>(3), sub<T>(beyond, own)), sub<T>(far, behind)));
}

/**
 * Everything, from byte `start` to byte `end` of row y; returns the larger of `top` and the largest u^2, lane by lane. `Thins` an integer
 * type: eta of the liquid is that of thin.ts, in a compiled path of its own, so that others pay nothing.
 */
export function collide<T, Thins>(y: i32, flags: i32, start: usize, end: usize, top: v128): v128 {
  const size = sizeof<T>();
  const o0 = row(y);
  const r0 = o0 + 9 * stride;
  const zC = zRow(y);
  const zS = zC - stride;
  const zN = zC + stride;
  const mxC = fieldRow(H.AT_MX, y);
  const mxS = mxC - stride;
  const mxN = mxC + stride;
  const myC = fieldRow(H.AT_MY, y);
  const myS = myC - stride;
  const myN = myC + stride;
  const PC = fieldRow(H.AT_PRESSURE, y);
  const PS = PC - stride;
  const PN = PC + stride;
  const lightC = fieldRow(H.AT_LIGHT, y);
  const openC = fieldRow(H.AT_OPEN, y);
  const etaXC = isInteger<Thins>() ? fieldRow(H.AT_ETA_X, y) : 0;
  const etaYC = isInteger<Thins>() ? fieldRow(H.AT_ETA_Y, y) : 0;
  const pC = fieldRow(H.AT_P, y);
  const n20C = fieldRow(H.AT_N20, y);
  const n11C = fieldRow(H.AT_N11, y);
  const j10C = fieldRow(H.AT_J10, y);
  const j01C = fieldRow(H.AT_J01, y);
  const mask = fieldRow(H.AT_MASK, y);
  const skim = address(H.AT_SKIM);
  const uxAt = fieldRow(H.AT_UX, y);
  const uyAt = fieldRow(H.AT_UY, y);
  const phiOut = fieldRow(H.AT_PHI, y);
  const sound = address(H.AT_SECTIONS) + 2 * stride;

  const rhoLiquid = entry(H.RHO_LIQUID);
  const drho = rhoLiquid - entry(H.RHO_GAS);
  const omegaPhi = entry(H.OMEGA_PHI);
  const zero = splat<T>(0);
  const half = splat<T>(0.5);
  const quarter = splat<T>(0.25);
  const one = splat<T>(1);
  const two = splat<T>(2);
  const third = splat<T>(1.0 / 3.0);
  const twelfth = splat<T>(1.0 / 12.0);
  const fluidityGas = splat<T>(entry(H.FLUIDITY_GAS));
  const dFluidity = splat<T>(entry(H.FLUIDITY_LIQUID) - entry(H.FLUIDITY_GAS));
  const bend = splat<T>(entry(H.BEND));
  const bent = splat<T>(2 * entry(H.KAPPA) * entry(H.BEND));
  const kappaSixth = splat<T>(entry(H.KAPPA) / 6);
  const driveX = entry(H.FORCE_X) + entry(H.DRIVE_FORCE);
  const driveY = entry(H.FORCE_Y);
  // the same on both, so that it falls to nothing in gas
  const trembleX = rhoLiquid * tremble<T>(driveX);
  const trembleY = rhoLiquid * tremble<T>(driveY);
  const forceX = splat<T>(driveX + trembleX);
  const forceY = splat<T>(driveY + trembleY);
  const heavyX = splat<T>(drho * entry(H.GRAVITY_X) + trembleX);
  const heavyY = splat<T>(drho * entry(H.GRAVITY_Y) + trembleY);
  const liquidLight = splat<T>(1 / rhoLiquid);
  const toSum = splat<T>(3 / rhoLiquid);
  const nuLiquid = splat<T>(1 / (rhoLiquid * entry(H.FLUIDITY_LIQUID)));
  const pure = splat<T>(-PURE);
  const nu0 = splat<T>(entry(H.NU0));
  const keepF = splat<T>(1 - 1 / (3 * entry(H.NU0) + 0.5));
  const coupled = splat<T>(0.25 * COUPLING);
  const keepPhi = splat<T>(1 - omegaPhi);
  const slope = 4 / entry(H.WIDTH);
  const cubed = slope * slope * slope;
  const fifth = cubed * slope * slope;
  const square = slope * slope / 3;
  const norm = 1 / (1.0 / 6 - square / 30);
  const weight0 = splat<T>(norm * (1 + square) / 2);
  const weight1 = splat<T>(-norm * (1 + 7 * square) / 3);
  const weight2 = splat<T>(3 * norm * square);
  const weight3 = splat<T>(-1.2 * norm * square);
  const theta0 = splat<T>(slope - cubed / 12 + fifth / 120);
  const theta1 = splat<T>(cubed / 2 - fifth / 4);
  const theta2 = splat<T>(fifth);
  const sharp = splat<T>((1 - 0.5 * omegaPhi) / 3);
  const gasLimit = splat<T>(entry(H.GAS_LIMIT));
  const tiny = splat<T>(1e-12);
  const notDenormal = splat<T>(1e-20);
  let fluxLanes = zero;
  let i = start;
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
    const steep = root<T>(mad<T>(phiX, phiX, mad<T>(phiY, phiY, tiny)));
    const both = mul<T>(inside, gas);
    const sharpness = div<T>(mul<T>(both, mad<T>(both, mad<T>(both, theta2, theta1), theta0)), steep);

    // forces
    const mu = sub<T>(div<T>(mul<T>(mul<T>(bent, mul<T>(phi, z)), sub<T>(phi, half)), mad<T>(bend, both, one)), mul<T>(kappaSixth, lap6));
    let accelX = mad<T>(mu, phiX, forceX);
    let accelY = mad<T>(mu, phiY, forceY);

    // what sets gas and interface apart from liquid: gradient of P, weight, viscosity of the faces, coupling of pressure
    const P = get(PC + i);
    const openE = get(openC + i + size);
    const openW = get(openC + i - size);
    const openN = get(openC + stride + i);
    const openS = get(openC - stride + i);
    const lowest = atMost<T>(atMost<T>(zE, zW), atMost<T>(atMost<T>(zNorth, zSouth), z));
    let etaE = nuLiquid;
    let etaW = nuLiquid;
    let etaN = nuLiquid;
    let etaS = nuLiquid;
    if (isInteger<Thins>()) {
      etaE = get(etaXC + i);
      etaW = get(etaXC + i - size);
      etaN = get(etaYC + i);
      etaS = get(etaYC - stride + i);
    }
    let coupling = zero;
    const mx = get(mxC + i);
    const my = get(myC + i);
    const liquidAlone = noneBelow<T>(lowest, pure);
    if (liquidAlone) {
      accelX = mul<T>(liquidLight, accelX);
      accelY = mul<T>(liquidLight, accelY);
      if (isInteger<Thins>()) {
        etaE = mul<T>(liquidLight, etaE);
        etaW = mul<T>(liquidLight, etaW);
        etaN = mul<T>(liquidLight, etaN);
        etaS = mul<T>(liquidLight, etaS);
      }
    } else {
      const PE = get(PC + i + size);
      const PW = get(PC + i - size);
      const PNorth = get(PN + i);
      const PSouth = get(PS + i);
      const PA = sub<T>(get(PN + i + size), get(PS + i - size));
      const PB = sub<T>(get(PS + i + size), get(PN + i - size));
      const Px = mad<T>(sub<T>(PE, PW), third, mul<T>(add<T>(PA, PB), twelfth));
      const Py = mad<T>(sub<T>(PNorth, PSouth), third, mul<T>(sub<T>(PA, PB), twelfth));
      const light = get(lightC + i);
      const lighter = sub<T>(light, liquidLight);
      const whole = share<T>(z);
      const heavy = nmad<T>(mul<T>(whole, whole), mad<T>(whole, mad<T>(whole, mad<T>(whole, weight3, weight2), weight1), weight0), one);
      accelX = nmad<T>(lighter, Px, mul<T>(light, nmad<T>(heavy, heavyX, accelX)));
      accelY = nmad<T>(lighter, Py, mul<T>(light, nmad<T>(heavy, heavyY, accelY)));
      if (isInteger<Thins>()) {
        etaE = mul<T>(light, thicknessBeside<T>(z, zE, fluidityGas, etaE));
        etaW = mul<T>(light, thicknessBeside<T>(z, zW, fluidityGas, etaW));
        etaN = mul<T>(light, thicknessBeside<T>(z, zNorth, fluidityGas, etaN));
        etaS = mul<T>(light, thicknessBeside<T>(z, zSouth, fluidityGas, etaS));
      } else {
        etaE = mul<T>(light, thickness<T>(z, zE, fluidityGas, dFluidity));
        etaW = mul<T>(light, thickness<T>(z, zW, fluidityGas, dFluidity));
        etaN = mul<T>(light, thickness<T>(z, zNorth, fluidityGas, dFluidity));
        etaS = mul<T>(light, thickness<T>(z, zSouth, fluidityGas, dFluidity));
      }
      const weightE = mul<T>(openE, atMost<T>(lighter, sub<T>(get(lightC + i + size), liquidLight)));
      const weightW = mul<T>(openW, atMost<T>(lighter, sub<T>(get(lightC + i - size), liquidLight)));
      const weightN = mul<T>(openN, atMost<T>(lighter, sub<T>(get(lightC + stride + i), liquidLight)));
      const weightS = mul<T>(openS, atMost<T>(lighter, sub<T>(get(lightC - stride + i), liquidLight)));
      const couplingX = add<T>(part<T>(weightE, PE, P, get(PC + i + 2 * size), PW), part<T>(weightW, PW, P, get(PC + i - 2 * size), PE));
      const couplingY = add<T>(part<T>(weightN, PNorth, P, get(PN + stride + i), PSouth), part<T>(weightS, PSouth, P, get(PS - stride + i), PNorth));
      coupling = mul<T>(coupled, add<T>(couplingX, couplingY));
    }

    // viscous force over the four faces
    const cE = nmad<T>(nu0, openE, etaE);
    const cW = nmad<T>(nu0, openW, etaW);
    const cN = nmad<T>(nu0, openN, etaN);
    const cS = nmad<T>(nu0, openS, etaS);
    const mxE = get(mxC + i + size);
    const mxW = get(mxC + i - size);
    const mxNorth = get(mxN + i);
    const mxSouth = get(mxS + i);
    const myE = get(myC + i + size);
    const myW = get(myC + i - size);
    const myNorth = get(myN + i);
    const mySouth = get(myS + i);
    const alongX = sub<T>(myE, myW);
    const alongXN = mul<T>(quarter, add<T>(alongX, sub<T>(get(myN + i + size), get(myN + i - size))));
    const alongXS = mul<T>(quarter, add<T>(alongX, sub<T>(get(myS + i + size), get(myS + i - size))));
    const alongY = sub<T>(mxNorth, mxSouth);
    const alongYE = mul<T>(quarter, add<T>(alongY, sub<T>(get(mxN + i + size), get(mxS + i + size))));
    const alongYW = mul<T>(quarter, add<T>(alongY, sub<T>(get(mxN + i - size), get(mxS + i - size))));
    const stretchX = sub<T>(mul<T>(cE, sub<T>(mxE, mx)), mul<T>(cW, sub<T>(mx, mxW)));
    const stretchY = sub<T>(mul<T>(cN, sub<T>(myNorth, my)), mul<T>(cS, sub<T>(my, mySouth)));
    const shearX = sub<T>(mul<T>(cN, add<T>(sub<T>(mxNorth, mx), alongXN)), mul<T>(cS, add<T>(sub<T>(mx, mxSouth), alongXS)));
    const shearY = sub<T>(mul<T>(cE, add<T>(sub<T>(myE, my), alongYE)), mul<T>(cW, add<T>(sub<T>(my, myW), alongYW)));
    const Fx = add<T>(accelX, mad<T>(two, stretchX, shearX));
    const Fy = add<T>(accelY, mad<T>(two, stretchY, shearY));

    // velocity
    const fluid = get(mask + i);
    const halfX = mul<T>(half, Fx);
    const halfY = mul<T>(half, Fy);
    let midX = mul<T>(add<T>(sub<T>(mx, get(sound + i)), halfX), fluid);
    let midY = mul<T>(add<T>(my, halfY), fluid);
    let ux = mad<T>(halfX, fluid, midX);
    let uy = mad<T>(halfY, fluid, midY);
    if (!liquidAlone) {
      const excess = atLeast<T>(sub<T>(mul<T>(mad<T>(ux, ux, mul<T>(uy, uy)), gasLimit), one), zero);
      const held = div<T>(one, root<T>(mad<T>(sub<T>(one, share<T>(z)), excess, one)));
      ux = mul<T>(ux, held);
      uy = mul<T>(uy, held);
      midX = mul<T>(midX, held);
      midY = mul<T>(midY, held);
    }
    const xx = mul<T>(ux, ux);
    const yy = mul<T>(uy, uy);
    const u2 = add<T>(xx, yy);
    fluxLanes = add<T>(fluxLanes, midX);
    top = max<T>(top, u2);

    // the flow
    const s = mul<T>(toSum, get(pC + i));
    const specific = mul<T>(liquidLight, P);
    const d20 = mul<T>(mul<T>(half, keepF), get(n20C + i));
    const d11 = mul<T>(keepF, get(n11C + i));
    const twice11 = add<T>(d11, d11);
    const q20 = add<T>(add<T>(specific, xx), d20);
    const q02 = sub<T>(add<T>(specific, yy), d20);
    const uv = mul<T>(ux, uy);
    const q11 = add<T>(uv, d11);
    const d21 = mad<T>(ux, twice11, mul<T>(uy, d20));
    const d12 = nmad<T>(ux, d20, mul<T>(uy, twice11));
    const q21 = mad<T>(uy, add<T>(third, xx), d21);
    const q12 = mad<T>(ux, add<T>(third, yy), d12);
    const d22a = mul<T>(two, mad<T>(uy, d21, mul<T>(ux, d12)));
    const d22 = nmad<T>(mul<T>(splat<T>(4), uv), d11, mad<T>(sub<T>(xx, yy), d20, d22a));
    const q22 = add<T>(mad<T>(third, add<T>(specific, u2), mul<T>(xx, yy)), d22);
    const f0 = o0 + i;
    put(f0, add<T>(sub<T>(add<T>(s, q22), add<T>(q20, q02)), coupling));
    send<T>(f0, ux, uy, q20, q02, q11, q21, q12, q22);
    if (flags & FIELDS) {
      put(phiOut + i, phi);
      put(uxAt + i, midX);
      put(uyAt + i, midY);
    }

    // the interface
    const skimmed = get(skim + i);
    const zAfter = add<T>(nmad<T>(z, skimmed, z), notDenormal);
    const phiAfter = add<T>(one, zAfter);
    const sharpen = mul<T>(sharp, sharpness);
    const vx = mul<T>(phiAfter, midX);
    const vy = mul<T>(phiAfter, midY);
    const h10 = mad<T>(sharpen, phiX, mad<T>(keepPhi, sub<T>(get(j10C + i), vx), vx));
    const h01 = mad<T>(sharpen, phiY, mad<T>(keepPhi, sub<T>(get(j01C + i), vy), vy));
    const zThird = mul<T>(third, zAfter);
    const vxx = mul<T>(vx, midX);
    const vyy = mul<T>(vy, midY);
    const h20 = add<T>(zThird, vxx);
    const h02 = add<T>(zThird, vyy);
    const h11 = mul<T>(vx, midY);
    const h21 = mul<T>(third, h01);
    const h12 = mul<T>(third, h10);
    const h22 = mul<T>(third, add<T>(zThird, add<T>(vxx, vyy)));
    const g0 = r0 + i;
    put(g0, sub<T>(add<T>(zAfter, h22), add<T>(h20, h02)));
    send<T>(g0, h10, h01, h20, h02, h11, h21, h12, h22);
    i += 16;
  } while (i < end);
  flux = total<T>(fluxLanes);
  return top;
}
