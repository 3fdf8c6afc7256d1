// Which tiles (one row of TILE cells) take the whole step, and which the step of liquid alone:
//
//   SOLID    nothing is done
//   LIQUID   flow alone (liquid.ts); the populations of the interface are left lying
//   EDGE     next to an active tile: as LIQUID, and the populations of the interface are made anew for it to pull
//   ACTIVE   everything
//
// Told apart every REFRESH steps. A tile is active when one within REACH rows and one tile along holds z < -NEAR. In REFRESH steps an
// interface travels at most REFRESH times the speed limit, 4 x 0.4 = 1.6 cells, and its tail falls by exp(-4/W) per cell: where a tile
// of liquid begins, at least 8 - 1.6 = 6.4 cells further, its phi is within NEAR exp(-5.1) = 2e-4 of what it would be without it, which
// density and viscosity do not see (PURE).
// In liquid z goes with the pressure, dz = 3 dp/rho: both follow div u. Liquid that flows through a tile carries another z with it; what
// that comes to over the whole box is made up for by the same small amount in every cell of liquid, so that no gas is made or lost.
//
// Tried: no such amends: the wake of a bubble stayed in its tiles, and the gas in a box of 400 x 64 grew by a tenth in 18 000 steps.
// REFRESH 8, REACH 12 and tiles of 16 cells: 25 % of the tiles active in place of 16 % in a channel of 80 cells across with a bubble of 40 in
// every 320, and no closer to every cell active (test/solver/tiles.test.ts).
import { TILE, W0, W1, W2 } from '../constants';
import * as H from '../header';
import { address, entry, fieldRow, nx, ny, row, setEntry, stride, zRow } from './rows';
import { least } from './vector';

export const SOLID: u8 = 0;
export const LIQUID: u8 = 1;
export const EDGE: u8 = 2;
export const ACTIVE: u8 = 3;
/** behind the last tile of a row */
const NONE: u8 = 255;

const REFRESH: i64 = 4;
const REACH: i32 = 8;
const NEAR: f64 = 0.03;

@inline export function tileRow(at: i32, y: i32): usize { return address(at) + <usize>y * address(H.TILE_STRIDE); }
@inline export function tiles(): i32 { return (nx + TILE - 1) / TILE; }

/** The tile after the run of tiles of `state` that begins with tile t. */
@inline export function endOfRun(row: usize, t: i32, state: u8): i32 {
  do t++; while (load<u8>(row + <usize>t) == state);
  return t;
}

/** Where tile t begins, in bytes from cell 0. */
@inline export function runBytes<T>(t: i32): usize { return <usize>(t * TILE) * sizeof<T>(); }

/** Whether tiles are told apart in the step. */
export function refreshing(step: i64): bool { return entry(H.STALE) != 0 || step % REFRESH == 0; }

/** Notes where row y holds gas or interface. */
export function look<T>(y: i32): void {
  const was = tileRow(H.AT_WAS, y);
  const near = tileRow(H.AT_NEAR, y);
  const z = zRow(y);
  const mask = fieldRow(H.AT_MASK, y);
  const end = <usize>nx * sizeof<T>();
  const wide = <usize>TILE * sizeof<T>();
  const all = entry(H.ALL_ACTIVE) != 0;
  for (let t: usize = 0; t < <usize>tiles(); t++) {
    const seen = load<u8>(was + t) == ACTIVE && least<T>(z, mask, t * wide, min<usize>((t + 1) * wide, end)) < -NEAR;
    store<u8>(near + t, all || seen ? 1 : 0);
  }
}

/** Tells the tiles of row y apart. */
export function mark(y: i32): void {
  const wide = address(H.TILE_STRIDE);
  const count = tiles();
  const across = <i32>entry(H.SIDE_LEFT) == 0;
  const along = <i32>entry(H.SIDE_BOTTOM) == 0;
  const out = tileRow(H.AT_TILES, y);
  const fluid = tileRow(H.AT_FLUID, y);
  // bit 0: within REACH rows; bit 1: within one row more
  memory.fill(out, 0, wide);
  for (let d = -REACH - 1; d <= REACH + 1; d++) {
    let from = y + d;
    if (across) from = ((from % ny) + ny) % ny;
    else if (from < 0 || from >= ny) continue;
    const near = tileRow(H.AT_NEAR, from);
    const inside = d >= -REACH && d <= REACH;
    for (let t = 0; t < count; t += 8) {
      const bits = load<u64>(near + <usize>t);
      const to = out + <usize>t;
      store<u64>(to, load<u64>(to) | (bits << 1) | (inside ? bits : 0));
    }
  }
  // one tile along, two for the edge
  const first = bitsAt(out, 0, count, along);
  const second = bitsAt(out, 1, count, along);
  let before = bitsAt(out, -2, count, along);
  let last = bitsAt(out, -1, count, along);
  let here = first;
  let next = second;
  let work = 0;
  let liquid = 0;
  for (let t = 0; t < count; t++) {
    const beyond = t + 2 < count ? load<u8>(out + <usize>(t + 2)) : !along ? <u8>0 : t + 2 - count == 0 ? first : second;
    let state = LIQUID;
    if ((last | here | next) & 1) state = ACTIVE;
    else if (before | last | here | next | beyond) state = EDGE;
    if (load<u8>(fluid + <usize>t) == 0) state = SOLID;
    store<u8>(out + <usize>t, state);
    work += state == ACTIVE ? 4 : state == SOLID ? 0 : 1;
    if (state == LIQUID || state == EDGE) liquid++;
    before = last;
    last = here;
    here = next;
    next = beyond;
  }
  store<u8>(out + <usize>count, NONE);
  store<i32>(out + wide - 4, work);
  store<i32>(out + wide - 8, liquid);
}

function bitsAt(row: usize, t: i32, count: i32, along: bool): u8 {
  if (along) return load<u8>(row + <usize>(((t % count) + count) % count));
  return t < 0 || t >= count ? 0 : load<u8>(row + <usize>t);
}

/** Tiles of row y that hold liquid alone. */
export function liquidTiles(y: i32): i32 { return load<i32>(tileRow(H.AT_WAS, y + 1) - 8); }

/** What was decided for row y holds from now on. */
export function settle(y: i32): void { memory.copy(tileRow(H.AT_WAS, y), tileRow(H.AT_TILES, y), address(H.TILE_STRIDE)); }

/** Makes every tile that holds fluid active, before the host changes phi. */
export function wake<T>(): void {
  for (let y = 0; y < ny; y++) {
    const was = tileRow(H.AT_WAS, y);
    for (let t = 0; t < tiles(); t++) {
      const state = load<u8>(was + <usize>t);
      if (state == LIQUID) for (let x = t * TILE; x < min<i32>((t + 1) * TILE, nx); x++) revive<T>(x, y);
      if (state != SOLID) store<u8>(was + <usize>t, ACTIVE);
    }
    store<i32>(was + address(H.TILE_STRIDE) - 8, 0);
    memory.copy(tileRow(H.AT_TILES, y), was, address(H.TILE_STRIDE));
  }
  setEntry(H.STALE, 1);
}

/** The interface populations of a cell of liquid, at rest with the flow. */
function revive<T>(x: i32, y: i32): void {
  const i = <usize>x * sizeof<T>();
  const f = row(y) + i;
  const z = <f64>load<T>(zRow(y) + i);
  const a57 = value<T>(f, 5) - value<T>(f, 7);
  const a86 = value<T>(f, 8) - value<T>(f, 6);
  const ux = value<T>(f, 1) - value<T>(f, 3) + a57 + a86;
  const uy = value<T>(f, 2) - value<T>(f, 4) + a57 - a86;
  const vx = (1 + z) * ux;
  const vy = (1 + z) * uy;
  const g = f + 9 * stride;
  for (let k = 0; k < 9; k++) {
    const cx = <f64>(k == 1 || k == 5 || k == 8 ? 1 : k == 3 || k == 6 || k == 7 ? -1 : 0);
    const cy = <f64>(k == 2 || k == 5 || k == 6 ? 1 : k == 4 || k == 7 || k == 8 ? -1 : 0);
    const w = k == 0 ? W0 : k < 5 ? W1 : W2;
    const flux = cx * vx + cy * vy;
    const square = 4.5 * (cx * ux + cy * uy) * flux - 1.5 * (ux * vx + uy * vy);
    store<T>(g + <usize>k * stride, <T>(w * (z + 3 * flux + square)));
  }
  store<T>(fieldRow(H.AT_P, y) + i, load<T>(fieldRow(H.AT_PRESSURE, y) + i));
}

@inline function value<T>(f: usize, k: i32): f64 { return <f64>load<T>(f + <usize>k * stride); }
