// The threads of a call. Each has a kernel of its own over the one memory and sees to a band of rows; between the parts of a step
// all wait for each other. Bands are whole blocks of rows, and every sum over several rows is made per row or block and then in
// one order, so that results do not depend on the number of threads.
//
// A thread that waits spins for some 20 microseconds, then sleeps: a wait that outlasts that costs no processor time.
import { AT_CALLS, AT_QUIT, BLOCK } from '../constants';
import * as H from '../header';
import { address, entry, ny } from './rows';

const AT_HERE: usize = 1152;
const AT_ROUND: usize = 1216;
const AT_SLEEPERS: usize = 1280;
const SPINS: i32 = 10000;

/** which thread this is, of how many */
export let thread: i32 = 0;
export let threads: i32 = 1;
/** rows of this thread's band */
export let firstRow: i32 = 0;
export let endRow: i32 = 0;

export function join(number: i32): void { thread = number; }

/** Waits until all threads are here. */
export function meet(): void {
  if (threads == 1) return;
  const round = atomic.load<i32>(AT_ROUND);
  if (atomic.add<i32>(AT_HERE, 1) == threads - 1) {
    atomic.store<i32>(AT_HERE, 0);
    atomic.add<i32>(AT_ROUND, 1);
    if (atomic.load<i32>(AT_SLEEPERS) > 0) atomic.notify(AT_ROUND, -1);
  } else waitWhile(AT_ROUND, round);
}

/** Sets the other threads to work. */
export function call(): void {
  if (entry(H.THREADS) == 1) return;
  atomic.add<i32>(AT_CALLS, 1);
  atomic.notify(AT_CALLS, -1);
}

/** Waits for a call beyond `seen`; returns its number, or 0 for the end. */
export function nextCall(seen: i32): i32 {
  waitWhile(AT_CALLS, seen);
  return atomic.load<i32>(AT_QUIT) != 0 ? 0 : atomic.load<i32>(AT_CALLS);
}

function waitWhile(at: usize, value: i32): void {
  for (let spins = SPINS; spins > 0; spins--) if (atomic.load<i32>(at) != value) return;
  atomic.add<i32>(AT_SLEEPERS, 1);
  while (atomic.load<i32>(at) == value) atomic.wait<i32>(at, value, -1);
  atomic.sub<i32>(AT_SLEEPERS, 1);
}

/** Cuts the rows into bands of about the same work: an active tile takes about four times as long as one of liquid alone. */
export function share(): void {
  threads = <i32>entry(H.THREADS);
  firstRow = 0;
  endRow = ny;
  if (threads == 1) return;
  let all = 0;
  for (let y = 0; y < ny; y++) all += work(y);
  firstRow = thread == 0 ? 0 : cut(<i64>all * thread / threads);
  endRow = thread == threads - 1 ? ny : cut(<i64>all * (thread + 1) / threads);
}

/** The start of the block of rows before which about `before` of the work lies. */
function cut(before: i64): i32 {
  let sum: i64 = 0;
  for (let y = 0; y < ny; y += BLOCK) {
    const next = min<i32>(y + BLOCK, ny);
    let block: i64 = 0;
    for (let row = y; row < next; row++) block += work(row);
    if (2 * (before - sum) < block) return y;
    sum += block;
  }
  return ny;
}

/** What row y takes, in sixteenths of a tile of liquid; kept by tiles.ts behind the tiles of the row. */
@inline function work(y: i32): i32 { return load<i32>(address(H.AT_TILES) + <usize>(y + 1) * address(H.TILE_STRIDE) - 4); }
