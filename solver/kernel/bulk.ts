// The flow collision of one row of a box that holds liquid alone: flow.ts with phi = 1 and no gradients.
// Reads f of rows y - 1, y, y + 1 and mask; writes f over row y - 2, ux and uy, and on demand p and tau.
import * as H from '../header';
import { send } from './populations';
import { address, entry, fieldRow, nx, row, stride } from './rows';
import { lookUp } from './table';
import { tremble } from './tremble';
import { add, get, largest, mad, max, mul, nmad, put, splat, sub } from './vector';

export const FIELDS: i32 = 1;
export const STRESS: i32 = 2;
/** omega is to be renewed, for the steps to come */
export const RENEW: i32 = 8;

export let bulkTopU2: f64 = 0;

/** `Thins` an integer type: every cell has an omega of its own, see rheology.ts; a compiled path apart, so that others pay nothing. */
export function bulkRow<T, Thins>(y: i32, flags: i32): void {
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
  const out = row(y - 2);
  const mask = fieldRow(H.AT_MASK, y);
  const uxOut = fieldRow(H.AT_UX, y);
  const uyOut = fieldRow(H.AT_UY, y);
  const pOut = fieldRow(H.AT_P, y);
  const tauOut = fieldRow(H.AT_TAU, y);
  const omegaAt = isInteger<Thins>() ? fieldRow(H.AT_OMEGA, y) : 0;

  const density = entry(H.RHO_LIQUID);
  const omegaNumber = 1 / (3 / (density * entry(H.FLUIDITY_LIQUID)) + 0.5);
  const one = splat<T>(1);
  const half = splat<T>(0.5);
  const quarter = splat<T>(0.25);
  const third = splat<T>(1.0 / 3.0);
  const twoThirds = splat<T>(2.0 / 3.0);
  const rho = splat<T>(density);
  const lighter = splat<T>(1 / density);
  const rateOf = splat<T>(3 / density);
  const omegaAll = splat<T>(omegaNumber);
  const keepAll = splat<T>(1 - omegaNumber);
  const toStressAll = splat<T>(0.5 * omegaNumber - 1);
  const sections = address(H.AT_SECTIONS);
  const sound = sections + 2 * stride;
  const driveX = entry(H.FORCE_X) + entry(H.DRIVE_FORCE);
  const driveY = entry(H.FORCE_Y);
  const halfFx = splat<T>(0.5 * driveX + tremble<T>(driveX));
  const halfFy = splat<T>(0.5 * driveY + tremble<T>(driveY));
  let top = splat<T>(0);

  const end = <usize>nx * size;
  let i: usize = 0;
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
    const m10 = add<T>(sub<T>(v1, v3), add<T>(a57, a86));
    const m01 = add<T>(sub<T>(v2, v4), sub<T>(a57, a86));
    const m11 = sub<T>(b57, b86);
    const x13 = add<T>(v1, v3);
    const y24 = add<T>(v2, v4);

    const live = mul<T>(lighter, get(mask + i));
    const ux = mul<T>(nmad<T>(rho, get(sound + i), add<T>(halfFx, m10)), live);
    const uy = mul<T>(add<T>(halfFy, m01), live);
    const jx = mul<T>(rho, ux);
    const jy = mul<T>(rho, uy);
    const xx = mul<T>(jx, ux);
    const yy = mul<T>(jy, uy);
    const rhoU2 = add<T>(xx, yy);
    const u2 = mad<T>(ux, ux, mul<T>(uy, uy));
    put(sections + i, add<T>(get(sections + i), ux));
    top = max<T>(top, u2);
    const moving = add<T>(add<T>(x13, y24), add<T>(b57, b86));
    const p = mul<T>(splat<T>(0.6), nmad<T>(twoThirds, rhoU2, moving));

    const e11 = mul<T>(jx, uy);
    const n11 = sub<T>(m11, e11);
    const n20 = sub<T>(sub<T>(x13, y24), sub<T>(xx, yy));
    const omega = isInteger<Thins>() ? get(omegaAt + i) : omegaAll;
    const keep = isInteger<Thins>() ? sub<T>(one, omega) : keepAll;
    if (isInteger<Thins>()) {
      if (flags & RENEW) {
        const rate = mul<T>(rateOf, omega);
        const n2 = mad<T>(n11, n11, mul<T>(mul<T>(quarter, n20), n20));
        put(omegaAt + i, mul<T>(mul<T>(rate, rate), n2));
      }
    }
    const d11 = mul<T>(keep, n11);
    const d20 = mul<T>(half, mul<T>(keep, n20));
    const q10 = add<T>(halfFx, jx);
    const q01 = add<T>(halfFy, jy);
    const q20 = add<T>(add<T>(p, xx), d20);
    const q02 = sub<T>(add<T>(p, yy), d20);
    const q11 = add<T>(e11, d11);
    const twice11 = add<T>(d11, d11);
    const q21 = mad<T>(third, q01, mad<T>(ux, twice11, mul<T>(uy, d20)));
    const q12 = mad<T>(third, q10, nmad<T>(ux, d20, mul<T>(uy, twice11)));
    const q22 = mul<T>(third, add<T>(p, rhoU2));

    const outF = out + i;
    put(outF, sub<T>(q22, add<T>(q20, q02)));
    send<T>(outF, q10, q01, q20, q02, q11, q21, q12, q22);
    put(uxOut + i, ux);
    put(uyOut + i, uy);
    if (flags & FIELDS) put(pOut + i, p);
    if (flags & STRESS) put(tauOut + i, mul<T>(isInteger<Thins>() ? sub<T>(mul<T>(half, omega), one) : toStressAll, n11));
    i += 16;
  } while (i < end);
  bulkTopU2 = largest<T>(top);
  if (isInteger<Thins>()) {
    if (flags & RENEW) lookUp<T>(omegaAt, <i32>(i / size));
  }
}
