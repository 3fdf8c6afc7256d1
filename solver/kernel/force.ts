// Force and velocity of cells of a box with gas: the formulas of forces.ts, whose text explains them, in lanes along x. Reads what arrive.ts
// and pressure.ts left, with ghosts; leaves in the scratch room what the collisions of flow.ts take up.
import * as H from '../header';
import { COUPLING, MID_X, MID_Y, SHARPEN_X, SHARPEN_Y, scratch, UY } from './scratch';
import { address, entry, fieldRow, stride, zRow } from './rows';
import { tremble } from './tremble';
import { add, atLeast, atMost, div, get, mad, max, mul, nmad, noneBelow, PURE, put, root, share, splat, sub } from './vector';

/** share of the coupling of pressure, see forces.ts */
const COUPLED: f64 = 0.25;

// numbers of the box, lane by lane. What only a branch of the loop needs, the engine would work out anew in every group of lanes that
// goes there: five divisions. From here it is read.
let fluidityGas: v128 = i64x2.splat(0);
let dFluidity: v128 = i64x2.splat(0);
let liquidLight: v128 = i64x2.splat(0);
let nuLiquid: v128 = i64x2.splat(0);
let coupled: v128 = i64x2.splat(0);
let weight0: v128 = i64x2.splat(0);
let weight1: v128 = i64x2.splat(0);
let weight2: v128 = i64x2.splat(0);
let weight3: v128 = i64x2.splat(0);
let gasLimit: v128 = i64x2.splat(0);

/** To be called before the steps of a call. */
export function bindForce<T>(): void {
  const rhoLiquid = entry(H.RHO_LIQUID);
  fluidityGas = splat<T>(entry(H.FLUIDITY_GAS));
  dFluidity = splat<T>(entry(H.FLUIDITY_LIQUID) - entry(H.FLUIDITY_GAS));
  liquidLight = splat<T>(1 / rhoLiquid);
  nuLiquid = splat<T>(1 / (rhoLiquid * entry(H.FLUIDITY_LIQUID)));
  coupled = splat<T>(0.25 * COUPLED);
  const slope = 4 / entry(H.WIDTH);
  const square = slope * slope / 3;
  const norm = 1 / (1.0 / 6 - square / 30);
  weight0 = splat<T>(norm * (1 + square) / 2);
  weight1 = splat<T>(-norm * (1 + 7 * square) / 3);
  weight2 = splat<T>(3 * norm * square);
  weight3 = splat<T>(-1.2 * norm * square);
  gasLimit = splat<T>(entry(H.GAS_LIMIT));
}

/** eta at the face between two cells */
@inline function thickness<T>(z: v128, other: v128, gas: v128, more: v128): v128 {
  return div<T>(splat<T>(1), mad<T>(share<T>(mul<T>(splat<T>(0.5), add<T>(z, other))), more, gas));
}

/** the same beside a liquid of viscosity `liquid` */
@inline function thicknessBeside<T>(z: v128, other: v128, gas: v128, liquid: v128): v128 {
  const wet = share<T>(mul<T>(splat<T>(0.5), add<T>(z, other)));
  return div<T>(liquid, mad<T>(mul<T>(sub<T>(splat<T>(1), wet), gas), liquid, wet));
}

/** what one face has in the coupling: weight times (3 (P' - P) - (P'' - P behind)) */
@inline function part<T>(weight: v128, beyond: v128, own: v128, far: v128, behind: v128): v128 {
  return mul<T>(weight, sub<T>(mul<T>(splat<T>(3), sub<T>(beyond, own)), sub<T>(far, behind)));
}

/** sum of ux, lane by lane: the caller sets it to nothing and takes it up */
export let flux: v128 = i64x2.splat(0);
export function clearFlux(): void { flux = i64x2.splat(0); }

/**
 * Force and velocity from byte `start` to byte `end` of row y; returns the larger of `top` and the largest u^2, lane by lane. `Thins` an
 * integer type: eta of the liquid is that of thin.ts, in a compiled path of its own, so that others pay nothing.
 */
export function kick<T, Thins>(y: i32, start: usize, end: usize, top: v128): v128 {
  const size = sizeof<T>();
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
  const mask = fieldRow(H.AT_MASK, y);
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
  const pure = splat<T>(-PURE);
  const nu0 = splat<T>(entry(H.NU0));
  const slope = 4 / entry(H.WIDTH);
  const cubed = slope * slope * slope;
  const fifth = cubed * slope * slope;
  const theta0 = splat<T>(slope - cubed / 12 + fifth / 120);
  const theta1 = splat<T>(cubed / 2 - fifth / 4);
  const theta2 = splat<T>(fifth);
  const sharp = splat<T>((1 - 0.5 * omegaPhi) / 3);
  const tiny = splat<T>(1e-12);
  let fluxLanes = flux;
  let to = scratch(y);
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
    fluxLanes = add<T>(fluxLanes, midX);
    top = max<T>(top, mad<T>(ux, ux, mul<T>(uy, uy)));

    // what the collisions take up
    const sharpen = mul<T>(sharp, sharpness);
    put(to, ux);
    put(to + UY, uy);
    put(to + COUPLING, coupling);
    put(to + MID_X, midX);
    put(to + MID_Y, midY);
    put(to + SHARPEN_X, mul<T>(sharpen, phiX));
    put(to + SHARPEN_Y, mul<T>(sharpen, phiY));
    to += 16;
    i += 16;
  } while (i < end);
  flux = fluxLanes;
  return top;
}
