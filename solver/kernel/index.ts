// Entry points of the kernel. One call does many steps; a failure is a status in the header, never a trap.
// A step: ghosts; with gas what arrives, its ghosts, the pressure; one collision row after another; the drive, a sample.
import * as H from '../header';
import { arrive } from './arrive';
import { FIELDS, STRESS, bulkRow, bulkTopU2 } from './bulk';
import { collideRow, topU2 } from './flow';
import { clearSolids, fillGhosts, fillReturns } from './ghosts';
import { fillPhiGhosts } from './phi';
import { press } from './pressure';
import { PURE } from './vector';
import { address, bind, entry, fieldRow, nx, ny, row, setEntry, stride, turn, zRow } from './rows';

export function version(): i32 { return H.VERSION; }
/** Address of the populations of row y, for the host. */
export function populations(y: i32): usize { bind(); return row(y); }
export function advance32(steps: i32, sampleEvery: i32): i32 { return advance<f32>(steps, sampleEvery); }
export function advance64(steps: i32, sampleEvery: i32): i32 { return advance<f64>(steps, sampleEvery); }

/** Does up to `steps` steps and returns the number done; phi and p are written in the last one. */
function advance<T>(steps: i32, sampleEvery: i32): i32 {
  bind();
  const twoPhase = entry(H.TWO_PHASE) != 0;
  setEntry(H.STATUS, 0);
  let done = 0;
  while (done < steps && entry(H.STATUS) == 0) {
    done++;
    const step = <i64>entry(H.STEP) + 1;
    const sampling = sampleEvery > 0 && step % <i64>sampleEvery == 0;
    const fields = done == steps ? FIELDS : 0;
    clearSections<T>();
    if (twoPhase) {
      fillReturns<T>();
      arrive<T>();
      dampSound<T>();
      clearSections<T>();
      fillPhiGhosts<T>();
      press<T>();
    } else fillGhosts<T>();
    for (let y = 0; y < ny; y++) collide<T>(y, fields | (y < 2 || y >= ny - 2 ? STRESS : 0), twoPhase);
    if (!twoPhase) turn();
    clearSolids<T>();
    setEntry(H.STEP, <f64>step);
    drive(meanFlux<T>());
    if (!twoPhase) dampSound<T>();
    if (sampling) sample<T>();
  }
  return done;
}

/** One row; a speed that is not below the limit names its cell. */
function collide<T>(y: i32, flags: i32, twoPhase: bool): void {
  if (twoPhase) collideRow<T>(y, flags);
  else bulkRow<T>(y, flags);
  const limit = entry(H.SPEED_LIMIT);
  const top = twoPhase ? topU2 : bulkTopU2;
  if (top < limit * limit || entry(H.STATUS) != 0) return;
  for (let x = 0; x < nx; x++) {
    const ux = <f64>load<T>(fieldRow(H.AT_UX, y) + <usize>x * sizeof<T>());
    const uy = <f64>load<T>(fieldRow(H.AT_UY, y) + <usize>x * sizeof<T>());
    const speed = Math.sqrt(ux * ux + uy * uy);
    if (speed < limit) continue;
    setEntry(H.STATUS, isFinite(speed) ? 2 : 1);
    setEntry(H.BAD_X, <f64>x);
    setEntry(H.BAD_Y, <f64>y);
    setEntry(H.BAD_SPEED, speed);
    break;
  }
}

function clearSections<T>(): void { memory.fill(address(H.AT_SECTIONS), 0, stride + <usize>nx * sizeof<T>()); }

/** Mean of ux over all cells. */
function meanFlux<T>(): f64 {
  const sums = address(H.AT_SECTIONS);
  let total: f64 = 0;
  for (let x = 0; x < nx; x++) total += <f64>load<T>(sums + <usize>x * sizeof<T>());
  return total / <f64>(nx * ny);
}

/**
 * What sound damping takes from the sections of liquid: with gas in this very step, from what arrives, since what is taken a step late
 * feeds velocities that change sign in every step; without gas in the next one, where viscosity takes care of those.
 */
function dampSound<T>(): void {
  const share = entry(H.SOUND_DAMPING);
  if (share == 0) return;
  const sums = address(H.AT_SECTIONS);
  let ofLiquid: f64 = 0;
  let weights: f64 = 0;
  for (let x = 0; x < nx; x++) {
    const at = sums + <usize>x * sizeof<T>();
    const weight = liquidWeight(<f64>load<T>(at + stride));
    ofLiquid += weight * <f64>load<T>(at);
    weights += weight;
  }
  const reference = weights > 0 ? ofLiquid / weights : 0;
  for (let x = 0; x < nx; x++) {
    const at = sums + <usize>x * sizeof<T>();
    const weight = liquidWeight(<f64>load<T>(at + stride));
    store<T>(at + 2 * stride, <T>(share * weight * (<f64>load<T>(at) - reference) / <f64>ny));
  }
}

/** 1 for a section without gas, 0 for one with a fiftieth or more of it. */
@inline function liquidWeight(gas: f64): f64 { return Math.max(0, 1 - 50 * gas / <f64>ny); }

function drive(upflow: f64): void {
  const before = entry(H.UPFLOW);
  const kind = <i32>entry(H.DRIVE_KIND);
  const value = entry(H.DRIVE_VALUE);
  if (kind == 1) setEntry(H.DRIVE_FORCE, -value * upflow * Math.abs(upflow));
  if (kind == 2) setEntry(H.DRIVE_FORCE, entry(H.DRIVE_FORCE) + 0.05 * entry(H.RHO_LIQUID) * (value - 2 * upflow + before));
  setEntry(H.UPFLOW, upflow);
  setEntry(H.UPFLOW_BEFORE, before);
}

function sample<T>(): void {
  const n = <i32>entry(H.SAMPLES);
  setEntry(H.SAMPLES, <f64>(n + 1));
  const at = address(H.AT_SAMPLES) + <usize>n * (32 + 16 * <usize>nx);
  store<f64>(at, entry(H.STEP));
  store<f64>(at, entry(H.UPFLOW), 8);
  store<f64>(at, entry(H.GAS_AREA), 16);
  store<f64>(at, entry(H.SKIMMED), 24);
  const bytes = 4 * <usize>nx;
  if (entry(H.TWO_PHASE) != 0) {
    friction<T>(at + 32, 0, -1);
    friction<T>(at + 32 + bytes, ny - 1, ny);
  } else {
    wall<T>(at + 32, 0, 0, 1, 1);
    wall<T>(at + 32 + bytes, 2, ny - 1, ny - 2, -1);
  }
  wallPhi<T>(at + 32 + 2 * bytes, 0, -1);
  wallPhi<T>(at + 32 + 3 * bytes, ny - 1, ny);
}

/** The very force along x that the wall beyond the row `inside` took in this step; 0 under a solid and beyond a side that is no wall. */
function friction<T>(to: usize, inside: i32, beyond: i32): void {
  const gas = entry(H.FLUIDITY_GAS);
  const more = entry(H.FLUIDITY_LIQUID) - gas;
  for (let x = 0; x < nx; x++) {
    const i = <usize>x * sizeof<T>();
    const wall = load<T>(fieldRow(H.AT_OPEN, inside) + i) != 0 && load<T>(fieldRow(H.AT_OPEN, beyond) + i) == 0;
    const phi = 1 + 0.5 * (<f64>load<T>(zRow(inside) + i) + <f64>load<T>(zRow(beyond) + i));
    const liquid = Math.min(Math.max((phi - PURE) / (1 - 2 * PURE), 0), 1);
    const slip = <f64>load<T>(fieldRow(H.AT_MX, inside) + i) - <f64>load<T>(fieldRow(H.AT_MX, beyond) + i);
    store<f32>(to + 4 * <usize>x, wall ? <f32>(slip / (gas + liquid * more)) : 0);
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
