// Entry points of the kernel. One call does many steps; a failure is a status in the header, never a trap.
// A step with gas: what walls return; what arrives; ghosts of phi; pressure and its ghosts; collision. Between these all threads meet.
// A step without gas, on one thread: ghosts, then one collision row after another.
//
// Tried: a step without gas on two threads, the first three new rows of a band set aside until all rows are done. With the sums of ux over
// the sections made by column, half of ux comes out of the other core's cache: 0.71, 0.73 and 0.93 of the speed of one thread at 2000 x 80,
// 600 x 48 and 8000 x 256, and one thread alone lost a tenth. Without these sums (wrong) two threads reach 1.67 and 1.51 at the first two.
import * as H from '../header';
import { arriveRow } from './arrive';
import { bodyForces } from './bodies';
import { FIELDS, RENEW, STRESS, bulkRow, bulkTopU2 } from './bulk';
import { collideRow } from './collision';
import { bindForce } from './force';
import { clearSolids, fillGhosts, fillReturns } from './ghosts';
import { phiGhosts } from './phi';
import { pressGhosts, pressRow } from './pressure';
import { bind, entry, ny, row, rowSums, setEntry, turn } from './rows';
import { sample } from './samples';
import { addBlocks, addRows, checkSpeed, clearSections, dampSound, drive, meanFlux } from './sections';
import { call, endRow, firstRow, join, meet, nextCall, share, thread } from './team';
import { EVERY } from './table';
import { thinRow, thins } from './thin';
import { look, mark, refreshing, settle, wake } from './tiles';

export function version(): i32 { return H.VERSION; }
/** Address of the populations of row y, for the host. */
export function populations(y: i32): usize { bind(); return row(y); }
export function advance32(steps: i32, sampleEvery: i32): i32 { return advance<f32>(steps, sampleEvery); }
export function advance64(steps: i32, sampleEvery: i32): i32 { return advance<f64>(steps, sampleEvery); }
export function serve32(number: i32): void { serve<f32>(number); }
export function serve64(number: i32): void { serve<f64>(number); }
/** To be called before the host changes phi. */
export function wake32(): void { bind(); wake<f32>(); }
export function wake64(): void { bind(); wake<f64>(); }

/** Does up to `steps` steps and returns the number done; the fields are written in the last one. */
function advance<T>(steps: i32, sampleEvery: i32): i32 {
  bind();
  setEntry(H.STATUS, 0);
  if (entry(H.TWO_PHASE) == 0) return flowAlone<T>(steps, sampleEvery);
  setEntry(H.ASKED_STEPS, <f64>steps);
  setEntry(H.ASKED_SAMPLES, <f64>sampleEvery);
  call();
  return together<T>();
}

/** The life of a thread beside the first. */
function serve<T>(number: i32): void {
  join(number);
  for (let seen = nextCall(0); seen != 0; seen = nextCall(seen)) {
    bind();
    together<T>();
  }
}

function together<T>(): i32 {
  const steps = <i32>entry(H.ASKED_STEPS);
  const sampleEvery = <i32>entry(H.ASKED_SAMPLES);
  let step = <i64>entry(H.STEP);
  bindForce<T>();
  share();
  let done = 0;
  while (done < steps) {
    for (let y = firstRow; y < endRow; y++) fillReturns<T>(y);
    meet();
    if (entry(H.STATUS) != 0) {
      // the host may clear the status once the first thread is back: not before all have read it
      meet();
      break;
    }
    done++;
    step++;
    const refresh = refreshing(step);
    for (let y = firstRow; y < endRow; y++) {
      arriveRow<T>(y);
      if (refresh) look<T>(y);
    }
    meet();
    addBlocks<T>();
    for (let y = firstRow; y < endRow; y++) {
      phiGhosts<T>(y);
      if (refresh) mark(y);
    }
    meet();
    dampSound<T>();
    for (let y = firstRow; y < endRow; y++) pressRow<T>(y);
    meet();
    for (let y = firstRow; y < endRow; y++) pressGhosts<T>(y);
    meet();
    if (thins(step)) {
      for (let y = firstRow; y < endRow; y++) thinRow<T>(y);
      meet();
    }
    const sampling = sampleEvery > 0 && step % <i64>sampleEvery == 0;
    if (sampling && entry(H.TOUCHES) != 0) {
      if (thread == 0) bodyForces<T>();
      meet();
    }
    for (let y = firstRow; y < endRow; y++) {
      if (entry(H.THINS) != 0) collideRow<T, i32>(y, done == steps ? FIELDS : 0);
      else collideRow<T, f32>(y, done == steps ? FIELDS : 0);
      if (refresh) settle(y);
    }
    clearSolids<T>(firstRow, endRow);
    meet();
    if (refresh) share();
    if (thread == 0) finish<T>(step, sampling);
  }
  return done;
}

/** The end of a step, while other threads may have begun with what walls return in the next. */
function finish<T>(step: i64, sampling: bool): void {
  for (let y = 0; y < ny; y++) checkSpeed<T>(y, load<f64>(rowSums(y), 24));
  setEntry(H.STALE, 0);
  setEntry(H.STEP, <f64>step);
  drive(addRows());
  if (sampling) sample<T>();
}

function flowAlone<T>(steps: i32, sampleEvery: i32): i32 {
  const thins = entry(H.THINS) != 0;
  let done = 0;
  while (done < steps && entry(H.STATUS) == 0) {
    done++;
    const step = <i64>entry(H.STEP) + 1;
    clearSections<T>();
    fillGhosts<T>();
    const sampling = sampleEvery > 0 && step % <i64>sampleEvery == 0;
    if (sampling) bodyForces<T>();
    for (let y = 0; y < ny; y++) {
      const flags = (done == steps ? FIELDS : 0) | (y < 2 || y >= ny - 2 ? STRESS : 0);
      if (thins) bulkRow<T, i32>(y, flags | (step % EVERY == 0 ? RENEW : 0));
      else bulkRow<T, f32>(y, flags);
      checkSpeed<T>(y, bulkTopU2);
    }
    turn();
    clearSolids<T>(0, ny);
    setEntry(H.STEP, <f64>step);
    drive(meanFlux<T>());
    dampSound<T>();
    if (sampling) sample<T>();
  }
  return done;
}
