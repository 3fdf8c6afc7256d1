// Ghosts of the populations after collision, filled before a step so that every cell pulls in the same way.
// Order: links of solids, the columns x = -1 and nx, the rows y = -1 and ny. Along a side, what comes in along k is
//   periodic  the population k of the far side
//   wall      what left against k from the cell it will reach (halfway bounce-back), plus 6 w rho e.u on a moving wall
//   slip      what left along the mirrored direction
// In a corner of two sides that are not periodic the diagonal goes straight back, with what both walls add.
import * as H from '../header';
import { W1, W2 } from '../constants';
import { address, entry, listRow, nx, ny, row, stride } from './rows';

const PERIODIC: i32 = 0;
const SLIP: i32 = 2;

/** Address of population n (0..8 f, 9..17 g) of cell (x, y). */
@inline export function at<T>(x: i32, y: i32, n: i32): usize { return row(y) + <usize>n * stride + <usize>(x * <i32>sizeof<T>()); }

@inline function opposite(k: i32): i32 { return k == 0 ? 0 : k < 5 ? ((k + 1) & 3) + 1 : ((k - 3) & 3) + 5; }
@inline export function ex(k: i32): i32 { return k == 1 || k == 5 || k == 8 ? 1 : k == 3 || k == 6 || k == 7 ? -1 : 0; }
@inline export function ey(k: i32): i32 { return k == 2 || k == 5 || k == 6 ? 1 : k == 4 || k == 7 || k == 8 ? -1 : 0; }
/** the direction with the sign of ex turned, of ey turned */
@inline function mirrorX(k: i32): i32 { return k == 1 ? 3 : k == 3 ? 1 : k == 5 ? 6 : k == 6 ? 5 : k == 7 ? 8 : k == 8 ? 7 : k; }
@inline function mirrorY(k: i32): i32 { return k == 2 ? 4 : k == 4 ? 2 : k == 5 ? 8 : k == 8 ? 5 : k == 6 ? 7 : k == 7 ? 6 : k; }

/** Of a box without gas. */
export function fillGhosts<T>(): void {
  fillLinks<T>();
  const periodicX = <i32>entry(H.SIDE_BOTTOM) == PERIODIC;
  const periodicY = <i32>entry(H.SIDE_LEFT) == PERIODIC;
  if (periodicX) for (let y = 0; y < ny; y++) wrapColumns<T>(0, y);
  else {
    reflectColumn<T>(0, 1, H.SIDE_BOTTOM, H.SPEED_BOTTOM, periodicY);
    reflectColumn<T>(nx - 1, -1, H.SIDE_TOP, H.SPEED_TOP, periodicY);
  }
  if (periodicY) {
    wrapRow<T>(0, 0, periodicX);
    wrapRow<T>(0, ny - 1, periodicX);
  }
  else {
    reflectRow<T>(0, 1, H.SIDE_LEFT, H.SPEED_LEFT, periodicX);
    reflectRow<T>(ny - 1, -1, H.SIDE_RIGHT, H.SPEED_RIGHT, periodicX);
  }
  for (let y = 0; y < ny; y++) clearPadding<T>(9, y);
}

/** Of a box with gas, what row y sees to: periodic sides wrap, all walls return what walls.ts lists. */
export function fillReturns<T>(y: i32): void {
  const periodicX = <i32>entry(H.SIDE_BOTTOM) == PERIODIC;
  const periodicY = <i32>entry(H.SIDE_LEFT) == PERIODIC;
  for (let set = 0; set < 18; set += 9) {
    if (periodicX) wrapColumns<T>(set, y);
    if (periodicY) wrapRow<T>(set, y, periodicX);
  }
  clearPadding<T>(18, y);
  const end = listRow(H.AT_RETURN_ROWS, y + 1);
  const g = 9 * stride;
  for (let item = listRow(H.AT_RETURN_ROWS, y); item < end; item += 16) {
    const to = <usize>load<i32>(item);
    const bytes = <usize>load<i32>(item, 12);
    if (bytes == sizeof<T>()) {
      store<T>(to, load<T>(<usize>load<i32>(item, 4)));
      store<T>(to + g, load<T>(<usize>load<i32>(item, 8) + g));
    } else {
      memory.copy(to, <usize>load<i32>(item, 4), bytes);
      memory.copy(to + g, <usize>load<i32>(item, 8) + g, bytes);
    }
  }
}

/** Bounce-back of solids: each link's slot in the solid cell takes what left the fluid cell towards it, and a share of a second population. */
function fillLinks<T>(): void {
  const count = <i32>entry(H.LINKS);
  let link = address(H.AT_LINKS);
  for (let n = 0; n < count; n++, link += 48) {
    const k = load<i32>(link, 8);
    const to = at<T>(load<i32>(link), load<i32>(link, 4), k);
    const left = <f64>load<T>(at<T>(load<i32>(link, 12), load<i32>(link, 16), opposite(k)));
    const second = <f64>load<T>(at<T>(load<i32>(link, 20), load<i32>(link, 24), load<i32>(link, 28)));
    store<T>(to, <T>(load<f64>(link, 32) * left + load<f64>(link, 40) * second));
  }
}

/** Solid cells hold zero after a step, whatever the row loop made of them: those of rows `first` to `end`. */
export function clearSolids<T>(first: i32, end: i32): void {
  const count = <i32>entry(H.RUNS);
  let run = address(H.AT_RUNS);
  for (let n = 0; n < count; n++, run += 12) {
    const y = load<i32>(run);
    if (y < first || y >= end) continue;
    const x = load<i32>(run, 4);
    const bytes = <usize>(load<i32>(run, 8) - x) * sizeof<T>();
    for (let k = 0; k < 18; k++) memory.fill(at<T>(x, y, k), 0, bytes);
  }
}

/** Lanes beyond the last cell: nothing flows in there. Column nx is a ghost as well; only its ex < 0 is ever pulled. */
function clearPadding<T>(populations: i32, y: i32): void {
  const lanes = 16 / <i32>sizeof<T>();
  const padded = (nx + lanes - 1) & -lanes;
  if (padded == nx) return;
  for (let n = 0; n < populations; n++) {
    if (ex(n % 9) >= 0) store<T>(at<T>(nx, y, n), <T>0);
    for (let x = nx + 1; x < padded; x++) store<T>(at<T>(x, y, n), <T>0);
  }
}

function wrapColumns<T>(first: i32, y: i32): void {
  for (let k = 1; k < 9; k++) {
    if (ex(k) > 0) store<T>(at<T>(-1, y, first + k), load<T>(at<T>(nx - 1, y, first + k)));
    if (ex(k) < 0) store<T>(at<T>(nx, y, first + k), load<T>(at<T>(0, y, first + k)));
  }
}

/** The ghost row beyond the far side, from row y. */
function wrapRow<T>(first: i32, y: i32, periodicX: bool): void {
  const from = periodicX ? -1 : 0;
  const bytes = <usize>(periodicX ? nx + 2 : nx) * sizeof<T>();
  for (let k = 1; k < 9; k++) {
    if (ey(k) > 0 && y == ny - 1) memory.copy(at<T>(from, -1, first + k), at<T>(from, y, first + k), bytes);
    if (ey(k) < 0 && y == 0) memory.copy(at<T>(from, ny, first + k), at<T>(from, y, first + k), bytes);
  }
}

/** What a wall moving at `speed` along e adds to what it sends back. */
@inline function push(k: i32, along: i32, speed: f64): f64 {
  return 6 * (k < 5 ? W1 : W2) * entry(H.RHO_LIQUID) * <f64>along * speed;
}

function reflectColumn<T>(edge: i32, inward: i32, sideAt: i32, speedAt: i32, periodicY: bool): void {
  const slip = <i32>entry(sideAt) == SLIP;
  const speed = entry(speedAt);
  for (let k = 1; k < 9; k++) {
    if (ex(k) != inward) continue;
    for (let y = 0; y < ny; y++) {
      const source = y - ey(k);
      const ghost = at<T>(edge - inward, source, k);
      if (slip && (periodicY || (source >= 0 && source < ny))) {
        store<T>(ghost, load<T>(at<T>(edge, (source + ny) % ny, mirrorX(k))));
      } else {
        const back = <f64>load<T>(at<T>(edge, y, opposite(k)));
        store<T>(ghost, <T>(back + push(k, ey(k), speed)));
      }
    }
  }
}

function reflectRow<T>(edge: i32, inward: i32, sideAt: i32, speedAt: i32, periodicX: bool): void {
  const slip = <i32>entry(sideAt) == SLIP;
  const speed = entry(speedAt);
  for (let k = 1; k < 9; k++) {
    if (ey(k) != inward) continue;
    const bytes = <usize>nx * sizeof<T>();
    if (slip) {
      // cells 0 .. nx-1 shifted by ex: the ghost that feeds cell x lies at x - ex
      for (let x = 0; x < nx; x++) {
        const source = x - ex(k);
        const corner = !periodicX && (source < 0 || source >= nx);
        const from = corner ? at<T>(x, edge, opposite(k)) : at<T>((source + nx) % nx, edge, mirrorY(k));
        store<T>(at<T>(source, edge - inward, k), load<T>(from));
      }
    } else if (speed == 0) {
      memory.copy(at<T>(-ex(k), edge - inward, k), at<T>(0, edge, opposite(k)), bytes);
    } else {
      for (let x = 0; x < nx; x++) {
        const back = <f64>load<T>(at<T>(x, edge, opposite(k)));
        store<T>(at<T>(x - ex(k), edge - inward, k), <T>(back + push(k, ex(k), speed)));
      }
    }
    if (periodicX || ex(k) == 0) continue;
    const x = ex(k) > 0 ? 0 : nx - 1;
    const corner = at<T>(x - ex(k), edge - inward, k);
    const end = entry(ex(k) > 0 ? H.SPEED_BOTTOM : H.SPEED_TOP);
    store<T>(corner, <T>(<f64>load<T>(corner) + push(k, ey(k), end)));
  }
}
