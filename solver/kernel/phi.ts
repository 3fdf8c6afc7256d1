// The interface variable of every cell as z = phi - 1, the sum of the g that arrive (each less its w), and its ghosts:
//   wall:    d(phi)/dn = -(4/W) cos(theta) phi (1 - phi), n into the fluid, solved for the value on the wall
//   solid:   the same from the weighted mean of its fluid neighbours
// Reads g, mask, skim; writes z and its ghost ring; adds up the gas area and the gas that the collision will skim.
import * as H from '../header';
import { address, entry, fieldRow, nx, ny, row, setEntry, stride, zRow } from './rows';
import { add, get, mad, mul, put, splat, total } from './vector';

export function phiPass<T>(): void {
  let less: f64 = 0;
  let skimmed: f64 = 0;
  for (let y = 0; y < ny; y++) {
    const size = sizeof<T>();
    const south = row(y - 1) + 9 * stride;
    const here = row(y) + 9 * stride;
    const north = row(y + 1) + 9 * stride;
    const g1 = here + stride - size;
    const g2 = south + 2 * stride;
    const g3 = here + 3 * stride + size;
    const g4 = north + 4 * stride;
    const g5 = south + 5 * stride - size;
    const g6 = south + 6 * stride + size;
    const g7 = north + 7 * stride + size;
    const g8 = north + 8 * stride - size;
    const out = zRow(y);
    const mask = fieldRow(H.AT_MASK, y);
    const skim = address(H.AT_SKIM);
    let gasLanes = splat<T>(0);
    let skimLanes = splat<T>(0);
    const end = <usize>nx * size;
    let i: usize = 0;
    do {
      const axes = add<T>(add<T>(get(g1 + i), get(g3 + i)), add<T>(get(g2 + i), get(g4 + i)));
      const diagonals = add<T>(add<T>(get(g5 + i), get(g7 + i)), add<T>(get(g6 + i), get(g8 + i)));
      const z = add<T>(add<T>(get(here + i), axes), diagonals);
      put(out + i, z);
      const counted = mul<T>(z, get(mask + i));
      gasLanes = add<T>(gasLanes, counted);
      skimLanes = mad<T>(counted, get(skim + i), skimLanes);
      i += 16;
    } while (i < end);
    less += total<T>(gasLanes);
    skimmed += total<T>(skimLanes);
  }
  setEntry(H.GAS_AREA, skimmed - less);
  setEntry(H.SKIMMED, entry(H.SKIMMED) - skimmed);
  fillPhiGhosts<T>();
}

/** z beyond a wall whose first cell holds `z`. */
// @ts-ignore: decorator
@inline function wettedGhost(z: f64, c: f64): f64 {
  const inside = Math.min(Math.max(1 + z, 0), 1);
  const wall = (4 * inside) / (2 - c + Math.sqrt((2 - c) * (2 - c) + 8 * c * inside));
  return z + 2 * (wall - inside);
}

function fillPhiGhosts<T>(): void {
  const c = entry(H.WETTING);
  const size = <i32>sizeof<T>();
  let ghost = address(H.AT_GHOSTS);
  for (let n = <i32>entry(H.GHOSTS); n > 0; n--) {
    const x = <i32>load<f64>(ghost);
    const y = <i32>load<f64>(ghost, 8);
    const neighbours = <i32>load<f64>(ghost, 16);
    ghost += 24;
    let mean: f64 = 0;
    for (let m = 0; m < neighbours; m++, ghost += 24) {
      const at = zRow(<i32>load<f64>(ghost, 8)) + <usize>(<i32>load<f64>(ghost) * size);
      mean += load<f64>(ghost, 16) * <f64>load<T>(at);
    }
    store<T>(zRow(y) + <usize>(x * size), <T>wettedGhost(mean, c));
  }
  ghostRow<T>(0, -1, ny - 1, <i32>entry(H.SIDE_LEFT), c);
  ghostRow<T>(ny - 1, ny, 0, <i32>entry(H.SIDE_RIGHT), c);
  const bottom = <i32>entry(H.SIDE_BOTTOM);
  const top = <i32>entry(H.SIDE_TOP);
  for (let y = -1; y <= ny; y++) {
    const first = zRow(y);
    const last = first + <usize>((nx - 1) * size);
    store<T>(first - size, beyond<T>(bottom, first, last, c));
    store<T>(last + size, beyond<T>(top, last, first, c));
  }
}

/** Ghost value beyond a side: periodic 0, wall 1, slip 2. */
// @ts-ignore: decorator
@inline function beyond<T>(side: i32, inside: usize, across: usize, c: f64): T {
  if (side == 0) return load<T>(across);
  return side == 2 ? load<T>(inside) : <T>wettedGhost(<f64>load<T>(inside), c);
}

function ghostRow<T>(inside: i32, ghost: i32, across: i32, side: i32, c: f64): void {
  const from = zRow(inside);
  const far = zRow(across);
  const to = zRow(ghost);
  const end = <usize>nx * sizeof<T>();
  for (let i: usize = 0; i < end; i += sizeof<T>()) store<T>(to + i, beyond<T>(side, from + i, far + i, c));
}
