// Tiles of liquid alone in a box with gas: arrive.ts, pressure.ts, force.ts and flow.ts with phi = 1 and no gradient of it. There
//   p = P = rho/3 sum f,   z += 3 (p - p before)/rho + amends,   u - m = force/rho + (nu - nu0 where momentum passes) div S
// Reads f, mask, open, P, z; writes f in place, m and its moments, P, z; on demand (FIELDS) the fields, for the edge (INTERFACE) g and p.
import * as H from '../header';
import { FIELDS } from './bulk';
import { send } from './populations';
import { address, blockSums, entry, fieldRow, nx, row, stride, zRow } from './rows';
import { tremble } from './tremble';
import { add, get, mad, max, mul, nmad, put, splat, sub, total } from './vector';

export const INTERFACE: i32 = 4;

/** of the last call: sum of z; sum of ux; largest u^2, in lanes */
export let lessLiquid: f64 = 0;
export let fluxLiquid: f64 = 0;

export function arriveLiquid<T>(y: i32, start: usize, end: usize): void {
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
  const mask = fieldRow(H.AT_MASK, y);
  const zAt = zRow(y);
  const mxOut = fieldRow(H.AT_MX, y);
  const myOut = fieldRow(H.AT_MY, y);
  const pAt = fieldRow(H.AT_PRESSURE, y);
  const n20Out = fieldRow(H.AT_N20, y);
  const n11Out = fieldRow(H.AT_N11, y);
  const sections = blockSums(y);
  const fromSum = splat<T>(entry(H.RHO_LIQUID) / 3);
  const toSum = splat<T>(3 / entry(H.RHO_LIQUID));
  const amends = splat<T>(entry(H.AMENDS));
  let lanes = splat<T>(0);
  let i = start;
  do {
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
    const x13 = add<T>(v1, v3);
    const y24 = add<T>(v2, v4);
    const mx = add<T>(sub<T>(v1, v3), add<T>(a57, a86));
    const my = add<T>(sub<T>(v2, v4), sub<T>(a57, a86));
    put(mxOut + i, mx);
    put(myOut + i, my);
    put(n20Out + i, sub<T>(sub<T>(x13, y24), sub<T>(mul<T>(mx, mx), mul<T>(my, my))));
    put(n11Out + i, nmad<T>(mx, my, sub<T>(b57, b86)));
    const sum = add<T>(add<T>(get(here + i), add<T>(x13, y24)), add<T>(b57, b86));
    const z = add<T>(add<T>(get(zAt + i), amends), nmad<T>(toSum, get(pAt + i), sum));
    put(pAt + i, mul<T>(fromSum, sum));
    put(zAt + i, z);
    const fluid = get(mask + i);
    lanes = mad<T>(z, fluid, lanes);
    put(sections + i, mad<T>(mx, fluid, get(sections + i)));
    i += 16;
  } while (i < end);
  lessLiquid = total<T>(lanes);
}

/** Collides from byte `start` to byte `end` of row y, `Thins` as in force.ts; returns the larger of `top` and the largest u^2, lane by lane. */
export function collideLiquid<T, Thins>(y: i32, flags: i32, start: usize, end: usize, top: v128): v128 {
  const size = sizeof<T>();
  const out = row(y);
  const mxC = fieldRow(H.AT_MX, y);
  const mxS = mxC - stride;
  const mxN = mxC + stride;
  const myC = fieldRow(H.AT_MY, y);
  const myS = myC - stride;
  const myN = myC + stride;
  const openC = fieldRow(H.AT_OPEN, y);
  const etaX = isInteger<Thins>() ? fieldRow(H.AT_ETA_X, y) : 0;
  const etaY = isInteger<Thins>() ? fieldRow(H.AT_ETA_Y, y) : 0;
  const pC = fieldRow(H.AT_PRESSURE, y);
  const n20C = fieldRow(H.AT_N20, y);
  const n11C = fieldRow(H.AT_N11, y);
  const mask = fieldRow(H.AT_MASK, y);
  const sound = address(H.AT_SECTIONS) + 2 * stride;
  const rhoLiquid = entry(H.RHO_LIQUID);
  const driveX = entry(H.FORCE_X) + entry(H.DRIVE_FORCE);
  const driveY = entry(H.FORCE_Y);
  const accelX = splat<T>(driveX / rhoLiquid + tremble<T>(driveX));
  const accelY = splat<T>(driveY / rhoLiquid + tremble<T>(driveY));
  const half = splat<T>(0.5);
  const quarter = splat<T>(0.25);
  const two = splat<T>(2);
  const third = splat<T>(1.0 / 3.0);
  const specificOf = splat<T>(1 / rhoLiquid);
  const toSum = splat<T>(3 / rhoLiquid);
  const nu = splat<T>(1 / (rhoLiquid * entry(H.FLUIDITY_LIQUID)));
  const nu0 = splat<T>(entry(H.NU0));
  const keep = splat<T>(1 - 1 / (3 * entry(H.NU0) + 0.5));
  let flux = splat<T>(0);
  let i = start;
  do {
    // viscous force over the four faces
    const cE = nmad<T>(nu0, get(openC + i + size), isInteger<Thins>() ? mul<T>(specificOf, get(etaX + i)) : nu);
    const cW = nmad<T>(nu0, get(openC + i - size), isInteger<Thins>() ? mul<T>(specificOf, get(etaX + i - size)) : nu);
    const cN = nmad<T>(nu0, get(openC + stride + i), isInteger<Thins>() ? mul<T>(specificOf, get(etaY + i)) : nu);
    const cS = nmad<T>(nu0, get(openC - stride + i), isInteger<Thins>() ? mul<T>(specificOf, get(etaY - stride + i)) : nu);
    const mx = get(mxC + i);
    const my = get(myC + i);
    const myE = get(myC + i + size);
    const myW = get(myC + i - size);
    const mxNorth = get(mxN + i);
    const mxSouth = get(mxS + i);
    const alongX = sub<T>(myE, myW);
    const alongXN = mul<T>(quarter, add<T>(alongX, sub<T>(get(myN + i + size), get(myN + i - size))));
    const alongXS = mul<T>(quarter, add<T>(alongX, sub<T>(get(myS + i + size), get(myS + i - size))));
    const alongY = sub<T>(mxNorth, mxSouth);
    const alongYE = mul<T>(quarter, add<T>(alongY, sub<T>(get(mxN + i + size), get(mxS + i + size))));
    const alongYW = mul<T>(quarter, add<T>(alongY, sub<T>(get(mxN + i - size), get(mxS + i - size))));
    const stretchX = sub<T>(mul<T>(cE, sub<T>(get(mxC + i + size), mx)), mul<T>(cW, sub<T>(mx, get(mxC + i - size))));
    const stretchY = sub<T>(mul<T>(cN, sub<T>(get(myN + i), my)), mul<T>(cS, sub<T>(my, get(myS + i))));
    const shearX = sub<T>(mul<T>(cN, add<T>(sub<T>(mxNorth, mx), alongXN)), mul<T>(cS, add<T>(sub<T>(mx, mxSouth), alongXS)));
    const shearY = sub<T>(mul<T>(cE, add<T>(sub<T>(myE, my), alongYE)), mul<T>(cW, add<T>(sub<T>(my, myW), alongYW)));
    const Fx = add<T>(accelX, mad<T>(two, stretchX, shearX));
    const Fy = add<T>(accelY, mad<T>(two, stretchY, shearY));
    const fluid = get(mask + i);
    const before = mul<T>(sub<T>(mx, get(sound + i)), fluid);
    const ux = mad<T>(Fx, fluid, before);
    const uy = mul<T>(add<T>(my, Fy), fluid);
    flux = mad<T>(half, add<T>(before, ux), flux);
    const xx = mul<T>(ux, ux);
    const yy = mul<T>(uy, uy);
    const u2 = add<T>(xx, yy);
    top = max<T>(top, u2);

    // the flow
    const p = get(pC + i);
    const specific = mul<T>(specificOf, p);
    const d20 = mul<T>(mul<T>(half, keep), get(n20C + i));
    const d11 = mul<T>(keep, get(n11C + i));
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
    const f0 = out + i;
    put(f0, sub<T>(mad<T>(toSum, p, q22), add<T>(q20, q02)));
    send<T>(f0, ux, uy, q20, q02, q11, q21, q12, q22);
    i += 16;
  } while (i < end);
  fluxLiquid = total<T>(flux);
  if (flags & (FIELDS | INTERFACE)) leave<T>(y, flags, start, end);
  return top;
}

/** What the edge and the host need of a row beside f: p; the interface populations that belong to z and u; the fields. */
function leave<T>(y: i32, flags: i32, start: usize, end: usize): void {
  const f = row(y);
  const g = f + 9 * stride;
  const zAt = zRow(y);
  const from = fieldRow(H.AT_PRESSURE, y);
  const to = fieldRow(H.AT_P, y);
  const uxOut = fieldRow(H.AT_UX, y);
  const uyOut = fieldRow(H.AT_UY, y);
  const phiOut = fieldRow(H.AT_PHI, y);
  const mxC = fieldRow(H.AT_MX, y);
  const myC = fieldRow(H.AT_MY, y);
  const mask = fieldRow(H.AT_MASK, y);
  const sound = address(H.AT_SECTIONS) + 2 * stride;
  const half = splat<T>(0.5);
  const one = splat<T>(1);
  const third = splat<T>(1.0 / 3.0);
  let i = start;
  do {
    const f0 = f + i;
    const a57 = sub<T>(get(f0 + 5 * stride), get(f0 + 7 * stride));
    const a86 = sub<T>(get(f0 + 8 * stride), get(f0 + 6 * stride));
    // the velocity in the middle of the kick
    const fluid = get(mask + i);
    const beforeX = mul<T>(sub<T>(get(mxC + i), get(sound + i)), fluid);
    const beforeY = mul<T>(get(myC + i), fluid);
    const ux = mul<T>(half, add<T>(beforeX, add<T>(sub<T>(get(f0 + stride), get(f0 + 3 * stride)), add<T>(a57, a86))));
    const uy = mul<T>(half, add<T>(beforeY, add<T>(sub<T>(get(f0 + 2 * stride), get(f0 + 4 * stride)), sub<T>(a57, a86))));
    const z = get(zAt + i);
    const phi = add<T>(one, z);
    put(to + i, get(from + i));
    if (flags & FIELDS) {
      put(uxOut + i, ux);
      put(uyOut + i, uy);
      put(phiOut + i, phi);
    }
    if (flags & INTERFACE) {
      const vx = mul<T>(phi, ux);
      const vy = mul<T>(phi, uy);
      const zThird = mul<T>(third, z);
      const vxx = mul<T>(vx, ux);
      const vyy = mul<T>(vy, uy);
      const h20 = add<T>(zThird, vxx);
      const h02 = add<T>(zThird, vyy);
      const h11 = mul<T>(vx, uy);
      const h21 = mul<T>(third, vy);
      const h12 = mul<T>(third, vx);
      const h22 = mul<T>(third, add<T>(zThird, add<T>(vxx, vyy)));
      const g0 = g + i;
      put(g0, sub<T>(add<T>(z, h22), add<T>(h20, h02)));
      send<T>(g0, vx, vy, h20, h02, h11, h21, h12, h22);
    }
    i += 16;
  } while (i < end);
}
