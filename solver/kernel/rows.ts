// Where things lie in memory. The populations are a ring of ny + 3 rows; a row holds its 9 f and its 9 g (less w), each
// `stride` bytes long with x contiguous:
//
//   ring slot:   row -1 | row 0 | row 1 | ... | row ny | spare
//   in a slot:   f0 [. ghost | cells ... | ghost, padding .] f1 [...] ... f8, g0 ... g8
//
// Without gas a step writes its new row y over the old row y - 2, which no later row pulls from, and then turns the ring by two
// slots. With gas all that arrives is taken in before anything is written, and each row stays in its place.
import { BLOCK } from '../constants';
import * as H from '../header';

/** Entry of the header. */
@inline export function entry(n: i32): f64 { return load<f64>(<usize>n << 3); }
@inline export function address(n: i32): usize { return <usize>load<f64>(<usize>n << 3); }
@inline export function setEntry(n: i32, value: f64): void { store<f64>(<usize>n << 3, value); }

export let nx: i32 = 0;
export let ny: i32 = 0;
export let stride: usize = 0;
let ring: i32 = 0;
let base: i32 = 0;
let populations: usize = 0;
let z: usize = 0;

/** Takes over the sizes; to be called at the start of every call from the host. */
export function bind(): void {
  nx = <i32>entry(H.NX);
  ny = <i32>entry(H.NY);
  stride = address(H.STRIDE);
  ring = <i32>entry(H.RING);
  base = <i32>entry(H.BASE);
  populations = address(H.AT_POPULATIONS);
  z = address(H.AT_Z);
}

/** f0 at (0, y), y from -2 (where row 0 of the next step goes) to ny. */
export function row(y: i32): usize {
  let slot = y + 1 + base;
  if (slot < 0) slot += ring;
  if (slot >= ring) slot -= ring;
  return populations + <usize>slot * 18 * stride;
}

/** Turns the ring after a step. */
export function turn(): void {
  base = base >= 2 ? base - 2 : base - 2 + ring;
  setEntry(H.BASE, <f64>base);
}

/** z = phi - 1 at (0, y), y from -1 to ny. */
@inline export function zRow(y: i32): usize { return z + <usize>(y * <i32>stride); }

/** A field at (0, y); y from -1 to ny where it has ghosts. */
@inline export function fieldRow(at: i32, y: i32): usize { return address(at) + <usize>(y * <i32>stride); }


/** The four sums of row y. */
@inline export function rowSums(y: i32): usize { return address(H.AT_ROWS) + <usize>(32 * y); }

/** The two rows of sums of the block that row y lies in. */
export function blockSums(y: i32): usize { return address(H.AT_BLOCKS) + <usize>(y / BLOCK) * 2 * stride; }

/** Where row y begins a block, its sums begin at zero. */
export function clearBlock(y: i32): void { if (y % BLOCK == 0) memory.fill(blockSums(y), 0, 2 * stride); }

/** The row that sees to the ghosts of the row below the first, and above the last: the one they are taken from. */
@inline export function below(): i32 { return <i32>entry(H.SIDE_LEFT) == 0 ? ny - 1 : 0; }
@inline export function above(): i32 { return <i32>entry(H.SIDE_LEFT) == 0 ? 0 : ny - 1; }

/** Where the entries of a list begin that row y sees to. */
@inline export function listRow(rowsAt: i32, y: i32): usize { return <usize>load<i32>(address(rowsAt) + (<usize>y << 2)); }
