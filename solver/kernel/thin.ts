// Viscosity of a liquid that thins under shear, on the faces between cells: rheology.ts and `thinFaces` of forces.ts in lanes along x;
// eta itself is looked up one by one (table.ts). Reads the velocities that arrive, with
// ghosts; writes eta of the faces along x (from -1) and along y (from row -1).
import * as H from '../header';
import { entry, fieldRow, nx, stride } from './rows';
import { EVERY, lookUp } from './table';
import { add, get, mad, mul, put, splat, sub } from './vector';

/** Whether eta is worked out anew in the step. */
export function thins(step: i64): bool { return entry(H.THINS) != 0 && (step - 1) % EVERY == 0; }

/** The faces of row y; the first row sees to those below it. */
export function thinRow<T>(y: i32): void {
  const size = sizeof<T>();
  const mx = fieldRow(H.AT_MX, y);
  const my = fieldRow(H.AT_MY, y);
  const etaX = fieldRow(H.AT_ETA_X, y);
  // the face before cell 0, a number ahead of the groups of lanes
  squareAlone<T>(etaX - size, mx - size, my - size);
  squares<T>(etaX, mx, my, size, stride);
  lookUp<T>(etaX - size, nx + 1);
  for (let at = y == 0 ? -1 : y; at <= y; at++) {
    const etaY = fieldRow(H.AT_ETA_Y, at);
    squares<T>(etaY, fieldRow(H.AT_MY, at), fieldRow(H.AT_MX, at), stride, size);
    lookUp<T>(etaY, nx);
  }
}

/** rate^2 on the faces towards `step`: `normal` is the velocity across the face, `along` the one in it. */
@inline function squares<T>(to: usize, normal: usize, along: usize, step: usize, across: usize): void {
  const quarter = splat<T>(0.25);
  const two = splat<T>(2);
  const end = <usize>nx * sizeof<T>();
  let i: usize = 0;
  do {
    const n = normal + i;
    const a = along + i;
    const stretch = sub<T>(get(n + step), get(n));
    const turn = sub<T>(get(a + step), get(a));
    const normalSide = mul<T>(quarter, add<T>(sub<T>(get(n + across), get(n - across)), sub<T>(get(n + step + across), get(n + step - across))));
    const alongSide = mul<T>(quarter, add<T>(sub<T>(get(a + across), get(a - across)), sub<T>(get(a + step + across), get(a + step - across))));
    const shear = add<T>(turn, normalSide);
    put(to + i, mad<T>(two, mad<T>(stretch, stretch, mul<T>(alongSide, alongSide)), mul<T>(shear, shear)));
    i += 16;
  } while (i < end);
}

/** The same for one face along x. */
function squareAlone<T>(to: usize, n: usize, a: usize): void {
  const size = sizeof<T>();
  const stretch = load<T>(n + size) - load<T>(n);
  const turn = load<T>(a + size) - load<T>(a);
  const normalSide = <T>0.25 * (load<T>(n + stride) - load<T>(n - stride) + (load<T>(n + size + stride) - load<T>(n + size - stride)));
  const alongSide = <T>0.25 * (load<T>(a + stride) - load<T>(a - stride) + (load<T>(a + size + stride) - load<T>(a + size - stride)));
  const shear = turn + normalSide;
  store<T>(to, <T>2 * (stretch * stretch + alongSide * alongSide) + shear * shear);
}
