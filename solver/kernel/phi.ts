// Ghosts of the interface variable z = phi - 1:
//   wall:    d(phi)/dn = -(4/W) cos(theta) phi (1 - phi), n into the fluid, solved for the value on the wall
//   solid:   the same from the weighted mean of its fluid neighbours
import * as H from '../header';
import { above, below, entry, listRow, nx, ny, zRow } from './rows';

/** z beyond a wall whose first cell holds `z`. */
@inline function wettedGhost(z: f64, c: f64): f64 {
  return z > 0 || z < -1 ? z : z / ((1 + z) * c - z);
}

/** The ghosts that row y sees to: in its solids, beyond its ends, and beyond a side that takes them from it. */
export function phiGhosts<T>(y: i32): void {
  const c = entry(H.WETTING);
  const size = <i32>sizeof<T>();
  const end = listRow(H.AT_GHOST_ROWS, y + 1);
  for (let ghost = listRow(H.AT_GHOST_ROWS, y); ghost < end; ) {
    const x = <i32>load<f64>(ghost);
    const neighbours = <i32>load<f64>(ghost, 16);
    ghost += 24;
    let mean: f64 = 0;
    for (let m = 0; m < neighbours; m++, ghost += 24) {
      const at = zRow(<i32>load<f64>(ghost, 8)) + <usize>(<i32>load<f64>(ghost) * size);
      mean += load<f64>(ghost, 16) * <f64>load<T>(at);
    }
    store<T>(zRow(y) + <usize>(x * size), <T>wettedGhost(mean, c));
  }
  ghostColumns<T>(y, c);
  if (y == below()) ghostRow<T>(y, -1, <i32>entry(H.SIDE_LEFT), c);
  if (y == above()) ghostRow<T>(y, ny, <i32>entry(H.SIDE_RIGHT), c);
}

function ghostColumns<T>(y: i32, c: f64): void {
  const first = zRow(y);
  const last = first + <usize>(nx - 1) * sizeof<T>();
  store<T>(first - sizeof<T>(), beyond<T>(<i32>entry(H.SIDE_BOTTOM), first, last, c));
  store<T>(last + sizeof<T>(), beyond<T>(<i32>entry(H.SIDE_TOP), last, first, c));
}

/** Ghost value beyond a side: periodic 0, wall 1, slip 2. */
@inline function beyond<T>(side: i32, inside: usize, across: usize, c: f64): T {
  if (side == 0) return load<T>(across);
  return side == 2 ? load<T>(inside) : <T>wettedGhost(<f64>load<T>(inside), c);
}

/** The row `ghost` beyond a side from the row y that it is taken from. */
function ghostRow<T>(y: i32, ghost: i32, side: i32, c: f64): void {
  const from = zRow(y);
  const to = zRow(ghost);
  const end = <usize>nx * sizeof<T>();
  for (let i: usize = 0; i < end; i += sizeof<T>()) store<T>(to + i, beyond<T>(side, from + i, from + i, c));
  ghostColumns<T>(ghost, c);
}
