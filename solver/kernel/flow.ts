// Both collisions of one row of a box with gas: the formulas of collide.ts in lanes along x. Reads what arrive.ts, pressure.ts and force.ts
// left; writes f and g of the row in place, on demand (flag FIELDS) phi, ux and uy. Tiles of liquid alone: liquid.ts.
//
// Three short loops over a piece of a row, with a scratch room between, take 9 % less of a step with every cell active than one long
// loop (600 x 48 and 2000 x 80, CPU time): that needed more constants and values than there are registers, and a fifth of its instructions
// moved them to the stack and back. Tried as well, within 2 % or slower: the viscous force in a loop of its own; pieces of half the
// length; stores in the order of the populations, the stride added in place of multiplied; neighbours along x by the offset of
// the load instruction; P, open and m loaded after the branch for liquid alone; no root and no divisions (the time is that of the
// number of instructions, not of the longest).
import * as H from '../header';
import { FIELDS } from './bulk';
import { clearFlux, flux as fluxLanes, kick } from './force';
import { send } from './populations';
import { address, entry, fieldRow, row, stride, zRow } from './rows';
import { COUPLING, MID_X, MID_Y, PIECE, SHARPEN_X, SHARPEN_Y, scratch, UY } from './scratch';
import { add, get, mad, mul, nmad, put, splat, sub, total } from './vector';

/** sum of ux of the last call */
export let flux: f64 = 0;

/** Everything, from byte `start` to byte `end` of row y; `top`, what is returned and `Thins` as in force.ts. */
export function collide<T, Thins>(y: i32, flags: i32, start: usize, end: usize, top: v128): v128 {
  clearFlux();
  for (let from = start; from < end; from += PIECE) {
    const to = min<usize>(from + PIECE, end);
    top = kick<T, Thins>(y, from, to, top);
    collideFlow<T>(y, from, to);
    collideInterface<T>(y, flags, from, to);
  }
  flux = total<T>(fluxLanes);
  return top;
}

function collideFlow<T>(y: i32, start: usize, end: usize): void {
  const o0 = row(y);
  const PC = fieldRow(H.AT_PRESSURE, y);
  const pC = fieldRow(H.AT_P, y);
  const n20C = fieldRow(H.AT_N20, y);
  const n11C = fieldRow(H.AT_N11, y);

  const rhoLiquid = entry(H.RHO_LIQUID);
  const half = splat<T>(0.5);
  const two = splat<T>(2);
  const third = splat<T>(1.0 / 3.0);
  const liquidLight = splat<T>(1 / rhoLiquid);
  const toSum = splat<T>(3 / rhoLiquid);
  const keepF = splat<T>(1 - 1 / (3 * entry(H.NU0) + 0.5));
  let from = scratch(y);
  let i = start;
  do {
    const ux = get(from);
    const uy = get(from + UY);
    const xx = mul<T>(ux, ux);
    const yy = mul<T>(uy, uy);
    const u2 = add<T>(xx, yy);
    const specific = mul<T>(liquidLight, get(PC + i));
    const s = mul<T>(toSum, get(pC + i));
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
    put(f0, add<T>(sub<T>(add<T>(s, q22), add<T>(q20, q02)), get(from + COUPLING)));
    send<T>(f0, ux, uy, q20, q02, q11, q21, q12, q22);
    from += 16;
    i += 16;
  } while (i < end);
}

function collideInterface<T>(y: i32, flags: i32, start: usize, end: usize): void {
  const o0 = row(y);
  const r0 = o0 + 9 * stride;
  const zC = zRow(y);
  const j10C = fieldRow(H.AT_J10, y);
  const j01C = fieldRow(H.AT_J01, y);
  const skim = address(H.AT_SKIM);
  const uxAt = fieldRow(H.AT_UX, y);
  const uyAt = fieldRow(H.AT_UY, y);
  const phiOut = fieldRow(H.AT_PHI, y);

  const omegaPhi = entry(H.OMEGA_PHI);
  const one = splat<T>(1);
  const third = splat<T>(1.0 / 3.0);
  const keepPhi = splat<T>(1 - omegaPhi);
  const notDenormal = splat<T>(1e-20);
  let from = scratch(y);
  let i = start;
  do {
    const z = get(zC + i);
    const midX = get(from + MID_X);
    const midY = get(from + MID_Y);
    const skimmed = get(skim + i);
    const zAfter = add<T>(nmad<T>(z, skimmed, z), notDenormal);
    const phiAfter = add<T>(one, zAfter);
    const vx = mul<T>(phiAfter, midX);
    const vy = mul<T>(phiAfter, midY);
    const h10 = add<T>(get(from + SHARPEN_X), mad<T>(keepPhi, sub<T>(get(j10C + i), vx), vx));
    const h01 = add<T>(get(from + SHARPEN_Y), mad<T>(keepPhi, sub<T>(get(j01C + i), vy), vy));
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
    if (flags & FIELDS) {
      put(phiOut + i, add<T>(one, z));
      put(uxAt + i, midX);
      put(uyAt + i, midY);
    }
    from += 16;
    i += 16;
  } while (i < end);
}
