// Ghosts of the interface variable z = phi - 1: its profile gone on with into walls and solids, see wetting.ts.
import * as H from '../header';
import { above, below, entry, listRow, nx, ny, zRow } from './rows';

/** see wetting.ts */
const PURE: f64 = 1e-6;
const STEEPEST: f64 = 3;

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
    const neighbours = <usize>load<f64>(ghost, 16);
    store<T>(zRow(y) + <usize>(x * size), <T>solidGhost<T>(ghost + 32, ghost + 32 + neighbours * 24, load<f64>(ghost, 24)));
    ghost += 32 + neighbours * 24;
  }
  ghostColumns<T>(y, c);
  if (y == below()) ghostRow<T>(y, -1, <i32>entry(H.SIDE_LEFT), c);
  if (y == above()) ghostRow<T>(y, ny, <i32>entry(H.SIDE_RIGHT), c);
}

@inline function valueOf<T>(neighbour: usize): f64 {
  return <f64>load<T>(zRow(<i32>load<f64>(neighbour, 8)) + <usize>(<i32>load<f64>(neighbour) * <i32>sizeof<T>()));
}

/** z in a solid cell from the list of its neighbours between two addresses; c is what wetting adds. */
function solidGhost<T>(first: usize, end: usize, c: f64): f64 {
  let mean: f64 = 0;
  let base: f64 = 0;
  let most: f64 = PURE;
  for (let at = first; at < end; at += 24) {
    const z = valueOf<T>(at);
    mean += load<f64>(at, 16) * z;
    const Y = -z * (1 + z);
    if (Y > most) {
      most = Y;
      base = z;
    }
  }
  if (most == PURE) return mean;
  const limit = (4 * STEEPEST) / entry(H.WIDTH);
  const odds = -base / (1 + base);
  let shift: f64 = 0;
  for (let at = first; at < end; at += 24) {
    const z = valueOf<T>(at);
    let L = z >= 0 ? limit : -limit;
    if (z < 0 && z > -1) L = min(max(Math.log((odds * (1 + z)) / -z), -limit), limit);
    shift += load<f64>(at, 16) * L;
  }
  return wettedGhost(base, c * Math.exp(shift));
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
