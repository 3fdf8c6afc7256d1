// Pressure of a box with gas from the sum of f, as forces.ts says; 1/rho beside it; then the ghosts of velocity, P and 1/rho.
// Reads the sum of f, z and its ghosts, p; writes p, P, 1/rho, and ghosts.
import * as H from '../header';
import { above, address, below, entry, fieldRow, listRow, nx, ny, stride, zRow } from './rows';
import { ACTIVE, endOfRun, runBytes, tileRow, tiles } from './tiles';
import { add, atMost, div, get, mad, mul, nmad, put, share, splat } from './vector';

const SOUND_FRICTION: f64 = 0.2;

/** Pressure of what is not liquid alone in row y. */
export function pressRow<T>(y: i32): void {
  const was = tileRow(H.AT_WAS, y);
  for (let t = 0; t < tiles(); ) {
    const state = load<u8>(was + <usize>t);
    const next = endOfRun(was, t, state);
    if (state == ACTIVE) press<T>(y, runBytes<T>(t), min<usize>(runBytes<T>(next), <usize>nx * sizeof<T>()));
    t = next;
  }
}

function press<T>(y: i32, start: usize, end: usize): void {
  const size = sizeof<T>();
  const zS = zRow(y - 1);
  const zC = zRow(y);
  const zN = zRow(y + 1);
  const sumAt = fieldRow(H.AT_SUM, y);
  const pAt = fieldRow(H.AT_P, y);
  const out = fieldRow(H.AT_PRESSURE, y);
  const lightOut = fieldRow(H.AT_LIGHT, y);
  const zero = splat<T>(0);
  const one = splat<T>(1);
  const rhoGas = splat<T>(entry(H.RHO_GAS));
  const dRho = splat<T>(entry(H.RHO_LIQUID) - entry(H.RHO_GAS));
  const third = splat<T>(1.0 / 3.0);
  const toSum = splat<T>(3 / entry(H.RHO_LIQUID));
  const friction = splat<T>(SOUND_FRICTION);
  let i = start;
  do {
    const z = get(zC + i);
    const south = atMost<T>(atMost<T>(atMost<T>(zero, get(zS + i - size)), get(zS + i)), get(zS + i + size));
    const here = atMost<T>(atMost<T>(atMost<T>(south, get(zC + i - size)), z), get(zC + i + size));
    const least = atMost<T>(atMost<T>(atMost<T>(here, get(zN + i - size)), get(zN + i)), get(zN + i + size));
    const lowest = mad<T>(share<T>(least), dRho, rhoGas);
    const p = get(pAt + i);
    const change = mul<T>(mul<T>(lowest, third), nmad<T>(toSum, p, get(sumAt + i)));
    const inside = share<T>(z);
    const square = mul<T>(inside, inside);
    const now = add<T>(p, change);
    put(pAt + i, now);
    put(out + i, mad<T>(mul<T>(friction, nmad<T>(square, square, one)), change, now));
    put(lightOut + i, div<T>(one, mad<T>(inside, dRho, rhoGas)));
    i += 16;
  } while (i < end);
}

/** Ghosts of velocity, P and 1/rho that row y sees to: its own and those of a side that takes them from it. */
export function pressGhosts<T>(y: i32): void {
  fillWallGhosts<T>(y);
  fillImages<T>(address(H.AT_MX), y, -1, 1);
  fillImages<T>(address(H.AT_MY), y, 1, -1);
  fillImages<T>(address(H.AT_PRESSURE), y, 1, 1);
  fillImages<T>(address(H.AT_LIGHT), y, 1, 1);
  fillWide<T>(address(H.AT_PRESSURE), y);
}

/** In walls and solids: velocity by the weights of walls.ts, P in a straight line. */
function fillWallGhosts<T>(y: i32): void {
  const mx = address(H.AT_MX);
  const my = address(H.AT_MY);
  const P = address(H.AT_PRESSURE);
  const end = listRow(H.AT_WALL_GHOST_ROWS, y + 1);
  for (let ghost = listRow(H.AT_WALL_GHOST_ROWS, y); ghost < end; ) {
    const to = <usize><i32>load<f64>(ghost);
    const faces = load<f64>(ghost, 8);
    ghost += 16;
    let u: f64 = 0;
    let v: f64 = 0;
    let p: f64 = 0;
    for (let face = <i32>faces; face > 0; face--, ghost += 48) {
      const i = <usize><i32>load<f64>(ghost);
      const j = <usize><i32>load<f64>(ghost, 8);
      const own = load<f64>(ghost, 16);
      const behind = load<f64>(ghost, 24);
      u += load<f64>(ghost, 32) + own * <f64>load<T>(mx + i) + behind * <f64>load<T>(mx + j);
      v += load<f64>(ghost, 40) + own * <f64>load<T>(my + i) + behind * <f64>load<T>(my + j);
      p += 2 * <f64>load<T>(P + i) - <f64>load<T>(P + j);
    }
    store<T>(mx + to, <T>(u / faces));
    store<T>(my + to, <T>(v / faces));
    store<T>(P + to, <T>(p / faces));
  }
}

/** Ghosts of a field beyond periodic sides (copies) and slip sides (images; its sign turns across x by signX, across y by signY). */
function fillImages<T>(field: usize, y: i32, signX: f64, signY: f64): void {
  imageColumns<T>(field, y, signX);
  if (y == below()) imageRow<T>(field, -1, y, H.SIDE_LEFT, signX, signY);
  if (y == above()) imageRow<T>(field, ny, y, H.SIDE_RIGHT, signX, signY);
}

function imageColumns<T>(field: usize, y: i32, sign: f64): void {
  const bottom = <i32>entry(H.SIDE_BOTTOM);
  const top = <i32>entry(H.SIDE_TOP);
  const first = field + <usize>(y * <i32>stride);
  const last = first + <usize>(nx - 1) * sizeof<T>();
  if (bottom == 0) store<T>(first - sizeof<T>(), load<T>(last));
  if (bottom == 2) store<T>(first - sizeof<T>(), <T>sign * load<T>(first));
  if (top == 0) store<T>(last + sizeof<T>(), load<T>(first));
  if (top == 2) store<T>(last + sizeof<T>(), <T>sign * load<T>(last));
}

function imageRow<T>(field: usize, ghost: i32, y: i32, sideAt: i32, signX: f64, signY: f64): void {
  const side = <i32>entry(sideAt);
  if (side != 1) {
    const to = field + <usize>(ghost * <i32>stride) - sizeof<T>();
    const from = field + <usize>(y * <i32>stride) - sizeof<T>();
    const factor = side == 0 ? <T>1 : <T>signY;
    const end = <usize>(nx + 2) * sizeof<T>();
    for (let i: usize = 0; i < end; i += sizeof<T>()) store<T>(to + i, factor * load<T>(from + i));
  }
  imageColumns<T>(field, ghost, signX);
}

/** Second ghosts, which only the coupling across a periodic or slip side reads. */
function fillWide<T>(field: usize, y: i32): void {
  const size = <i32>sizeof<T>();
  const acrossY = <i32>entry(H.SIDE_LEFT) == 0;
  const acrossX = <i32>entry(H.SIDE_BOTTOM) == 0;
  const bytes = <usize>(nx * size);
  const at = field + <usize>(y * <i32>stride);
  const low = acrossY ? ny - 2 : 1;
  const high = ny - 1 - low;
  if (y == within(low)) memory.copy(field - 2 * stride, field + <usize>(low * <i32>stride), bytes);
  if (y == within(high)) memory.copy(field + <usize>((ny + 1) * <i32>stride), field + <usize>(high * <i32>stride), bytes);
  store<T>(at - 2 * sizeof<T>(), load<T>(at + <usize>((acrossX ? nx - 2 : 1) * size)));
  store<T>(at + <usize>((nx + 1) * size), load<T>(at + <usize>((acrossX ? 1 : nx - 2) * size)));
}

/** The row of the box next to row y. */
@inline function within(y: i32): i32 { return max<i32>(min<i32>(y, ny - 1), 0); }
