// What walls and bodies felt in a step, written behind the samples there are; see header.ts for the layout.
import * as H from '../header';
import { address, entry, fieldRow, nx, ny, setEntry, zRow } from './rows';
import { PURE } from './vector';

export function sample<T>(): void {
  const n = <i32>entry(H.SAMPLES);
  setEntry(H.SAMPLES, <f64>(n + 1));
  const forces = 16 * <usize>entry(H.BODIES);
  const at = address(H.AT_SAMPLES) + <usize>n * (32 + forces + 16 * <usize>nx);
  store<f64>(at, entry(H.STEP));
  store<f64>(at, entry(H.UPFLOW), 8);
  store<f64>(at, entry(H.GAS_AREA), 16);
  store<f64>(at, entry(H.SKIMMED), 24);
  memory.copy(at + 32, address(H.AT_FORCES) + 16, forces);
  const rows = at + 32 + forces;
  const bytes = 4 * <usize>nx;
  if (entry(H.TWO_PHASE) != 0) {
    friction<T>(rows, 0, -1);
    friction<T>(rows + bytes, ny - 1, ny);
  } else {
    wall<T>(rows, 0, 0, 1, 1);
    wall<T>(rows + bytes, 2, ny - 1, ny - 2, -1);
  }
  wallPhi<T>(rows + 2 * bytes, 0, -1);
  wallPhi<T>(rows + 3 * bytes, ny - 1, ny);
}

/** The very force along x that the wall beyond the row `inside` took in this step; 0 under a solid and beyond a side that is no wall. */
function friction<T>(to: usize, inside: i32, beyond: i32): void {
  const gas = entry(H.FLUIDITY_GAS);
  const more = entry(H.FLUIDITY_LIQUID) - gas;
  const thins = entry(H.THINS) != 0;
  const eta = thins ? fieldRow(H.AT_ETA_Y, min<i32>(inside, beyond)) : 0;
  for (let x = 0; x < nx; x++) {
    const i = <usize>x * sizeof<T>();
    const wall = load<T>(fieldRow(H.AT_OPEN, inside) + i) != 0 && load<T>(fieldRow(H.AT_OPEN, beyond) + i) == 0;
    const phi = 1 + 0.5 * (<f64>load<T>(zRow(inside) + i) + <f64>load<T>(zRow(beyond) + i));
    const liquid = Math.min(Math.max((phi - PURE) / (1 - 2 * PURE), 0), 1);
    const slip = <f64>load<T>(fieldRow(H.AT_MX, inside) + i) - <f64>load<T>(fieldRow(H.AT_MX, beyond) + i);
    const fluidity = gas + liquid * (thins ? 1 / <f64>load<T>(eta + i) - gas : more);
    store<f32>(to + 4 * <usize>x, wall ? <f32>(slip / fluidity) : 0);
  }
}

/** Shear on a wall of a box without gas: the two nearest rows of tau with the weights of geometry.ts, `weights` and the next row of them. */
function wall<T>(to: usize, weights: i32, first: i32, second: i32, sign: f64): void {
  const a = fieldRow(H.AT_TAU, first);
  const b = fieldRow(H.AT_TAU, max<i32>(min<i32>(second, ny - 1), 0));
  const wa = fieldRow(H.AT_WEIGHTS, weights);
  const wb = fieldRow(H.AT_WEIGHTS, weights + 1);
  for (let x = 0; x < nx; x++) {
    const i = <usize>x * sizeof<T>();
    store<f32>(to + 4 * <usize>x, <f32>(sign * (<f64>load<T>(wa + i) * <f64>load<T>(a + i) + <f64>load<T>(wb + i) * <f64>load<T>(b + i))));
  }
}

function wallPhi<T>(to: usize, inside: i32, ghost: i32): void {
  const a = zRow(inside);
  const b = zRow(ghost);
  for (let x = 0; x < nx; x++) {
    const i = <usize>x * sizeof<T>();
    store<f32>(to + 4 * <usize>x, <f32>(1 + 0.5 * (<f64>load<T>(a + i) + <f64>load<T>(b + i))));
  }
}
