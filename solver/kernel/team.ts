// The threads of a call. Each has a kernel of its own over the one memory and sees to a band of rows; between the parts of a step
// all wait for each other. Bands are whole blocks of rows, and every sum over several rows is made per row or block and then in
// one order, so that results do not depend on the number of threads.
//
// A thread that waits spins, then sleeps. To be woken takes some 80 microseconds, as long as many a part of a step, and who is woken late
// keeps the others waiting in the next part until they sleep as well. So it spins for MANY turns, 100 microseconds; and where others want
// the processors, so that what it waits for may wait itself, each sleep halves the turns, down to FEW. A wait that ends awake halves how
// often, and after eight sleeps it is MANY again: two threads that only wake each other find together.
//
// Tried, two threads against one, both cores free: 10 000 turns always, 0.77 of the speed at 600 x 48 every cell active and 1.4 at the panel
// of 2000 x 80; 300 000 always, 1.78 and 2.03, but two such runs at once on two cores do 0.57 and 0.79 of what they do with 10 000. As it
// is: 1.74 and 2.00, and two runs at once as with 10 000. MANY again after 32 sleeps only, with one step back for a wait that ends awake:
// stays asleep for long.
import { AT_CALLS, AT_QUIT, BLOCK } from '../constants';
import * as H from '../header';
import { address, entry, ny } from './rows';

const AT_HERE: usize = 1152;
const AT_ROUND: usize = 1216;
const AT_SLEEPERS: usize = 1280;
const MANY: i32 = 300000;
const FEW: i32 = 10000;

/** how often the turns are halved */
let weary: i32 = 0;

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
  } else if (waitWhile(AT_ROUND, round, max<i32>(FEW, MANY >> weary))) weary = weary >> 1;
  else weary = (weary + 1) % 8;
}

/** Sets the other threads to work. */
export function call(): void {
  if (entry(H.THREADS) == 1) return;
  atomic.add<i32>(AT_CALLS, 1);
  atomic.notify(AT_CALLS, -1);
}

/** Waits for a call beyond `seen`; returns its number, or 0 for the end. */
export function nextCall(seen: i32): i32 {
  waitWhile(AT_CALLS, seen, FEW);
  return atomic.load<i32>(AT_QUIT) != 0 ? 0 : atomic.load<i32>(AT_CALLS);
}

/** Waits while the word is `value`, awake for so many turns; returns whether it never slept. */
function waitWhile(at: usize, value: i32, turns: i32): bool {
  for (let n = turns; n > 0; n--) if (atomic.load<i32>(at) != value) return true;
  atomic.add<i32>(AT_SLEEPERS, 1);
  while (atomic.load<i32>(at) == value) atomic.wait<i32>(at, value, -1);
  atomic.sub<i32>(AT_SLEEPERS, 1);
  return false;
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
