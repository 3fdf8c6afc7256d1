// What arrives at every cell of a box with gas, taken in before any row is written: z = phi - 1, the sum of the g that arrive
// (each less its w), and the first moment of g; the velocity m, the sum of f, and the second moments of f less m m.
// Reads f, g, mask, skim. Adds m and gas to the sums of the sections over the block of rows, and adds up z and what the collision
// will skim of it over the row. Tiles of liquid alone: liquid.ts.
//
// f and g in loops of their own, over the whole row: with half as many streams from memory at a time the whole step takes 6 % less at
// 8000 cells along the channel and 2 % less at 2000 (every cell active, CPU time). Over pieces of a row of 2 kB: nothing gained.
import * as H from '../header';
import { arriveLiquid, lessLiquid } from './liquid';
import { address, blockSums, clearBlock, fieldRow, nx, row, rowSums, stride, zRow } from './rows';
import { ACTIVE, endOfRun, runBytes, SOLID, tileRow, tiles } from './tiles';
import { add, atLeast, atMost, get, mad, mul, nmad, put, splat, sub, total } from './vector';

let less: f64 = 0;
let skimmed: f64 = 0;

/** All that arrives in row y. */
export function arriveRow<T>(y: i32): void {
  clearBlock(y);
  less = 0;
  skimmed = 0;
  const was = tileRow(H.AT_WAS, y);
  for (let t = 0; t < tiles(); ) {
    const state = load<u8>(was + <usize>t);
    const next = endOfRun(was, t, state);
    if (state == ACTIVE) arrive<T>(y, runBytes<T>(t), min<usize>(runBytes<T>(next), <usize>nx * sizeof<T>()));
    else if (state != SOLID) {
      arriveLiquid<T>(y, runBytes<T>(t), min<usize>(runBytes<T>(next), <usize>nx * sizeof<T>()));
      less += lessLiquid;
    }
    t = next;
  }
  const sums = rowSums(y);
  store<f64>(sums, less, 8);
  store<f64>(sums, skimmed, 16);
}

/** What arrives from byte `start` to byte `end` of row y. */
function arrive<T>(y: i32, start: usize, end: usize): void {
  const size = sizeof<T>();
  const skim = address(H.AT_SKIM);
  const sections = blockSums(y);
  const sectionGas = sections + stride;
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
  const nine = 9 * stride;
  const mask = fieldRow(H.AT_MASK, y);
  const zOut = zRow(y);
  const mxOut = fieldRow(H.AT_MX, y);
  const myOut = fieldRow(H.AT_MY, y);
  const sumOut = fieldRow(H.AT_SUM, y);
  const n20Out = fieldRow(H.AT_N20, y);
  const n11Out = fieldRow(H.AT_N11, y);
  const j10Out = fieldRow(H.AT_J10, y);
  const j01Out = fieldRow(H.AT_J01, y);
  const zero = splat<T>(0);
  const one = splat<T>(1);
  let gasLanes = splat<T>(0);
  let skimLanes = splat<T>(0);
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
    put(sumOut + i, add<T>(add<T>(get(here + i), add<T>(x13, y24)), add<T>(b57, b86)));
    put(n20Out + i, sub<T>(sub<T>(x13, y24), sub<T>(mul<T>(mx, mx), mul<T>(my, my))));
    put(n11Out + i, nmad<T>(mx, my, sub<T>(b57, b86)));
    put(sections + i, mad<T>(mx, get(mask + i), get(sections + i)));
    i += 16;
  } while (i < end);
  i = start;
  do {
    const w1 = get(f1 + nine + i);
    const w2 = get(f2 + nine + i);
    const w3 = get(f3 + nine + i);
    const w4 = get(f4 + nine + i);
    const w5 = get(f5 + nine + i);
    const w6 = get(f6 + nine + i);
    const w7 = get(f7 + nine + i);
    const w8 = get(f8 + nine + i);
    const c57 = sub<T>(w5, w7);
    const c86 = sub<T>(w8, w6);
    put(j10Out + i, add<T>(sub<T>(w1, w3), add<T>(c57, c86)));
    put(j01Out + i, add<T>(sub<T>(w2, w4), sub<T>(c57, c86)));
    const axes = add<T>(add<T>(w1, w3), add<T>(w2, w4));
    const diagonals = add<T>(add<T>(w5, w7), add<T>(w6, w8));
    const z = add<T>(add<T>(get(here + nine + i), axes), diagonals);
    put(zOut + i, z);
    const fluid = get(mask + i);
    const counted = mul<T>(z, fluid);
    const gas = atMost<T>(atLeast<T>(sub<T>(zero, z), zero), one);
    put(sectionGas + i, mad<T>(gas, fluid, get(sectionGas + i)));
    gasLanes = add<T>(gasLanes, counted);
    skimLanes = mad<T>(counted, get(skim + i), skimLanes);
    i += 16;
  } while (i < end);
  less += total<T>(gasLanes);
  skimmed += total<T>(skimLanes);
}
