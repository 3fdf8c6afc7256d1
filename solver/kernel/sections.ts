// Sums over sections (all y at one x) and over the box, each in an order fixed by the rows alone; sound damping and the drive.
import * as H from '../header';
import { BLOCK, TILE } from '../constants';
import { address, entry, fieldRow, nx, ny, row, rowSums, setEntry, stride } from './rows';
import { threads, thread } from './team';
import { liquidTiles } from './tiles';

/** Adds up the blocks: each thread a part of the sections. */
export function addBlocks<T>(): void {
  const size = <i32>sizeof<T>();
  const groups = (nx * size + 15) >> 4;
  const from = <usize>(groups * thread / threads) << 4;
  const end = <usize>(groups * (thread + 1) / threads) << 4;
  const blocks = (ny + BLOCK - 1) / BLOCK;
  for (let sum: usize = 0; sum < 2 * stride; sum += stride) {
    const out = address(H.AT_SECTIONS) + sum;
    for (let i = from; i < end; i += 16) {
      let at = address(H.AT_BLOCKS) + sum + i;
      let total = v128.splat<T>(0);
      for (let n = 0; n < blocks; n++, at += 2 * stride) total = v128.add<T>(total, v128.load(at));
      v128.store(out + i, total);
    }
  }
}

/** Sums of a box without gas: ux over each section, from the rows' own. */
export function clearSections<T>(): void { memory.fill(address(H.AT_SECTIONS), 0, stride + <usize>nx * sizeof<T>()); }

/**
 * What sound damping takes from the sections of liquid: with gas in this very step, from what arrives, since what is taken a step late
 * feeds velocities that change sign in every step; without gas in the next one, where viscosity takes care of those.
 * Each thread takes the mean over the box, and a part of the sections.
 */
export function dampSound<T>(): void {
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
  const factor = share / <f64>ny;
  const end = nx * (thread + 1) / threads;
  for (let x = nx * thread / threads; x < end; x++) {
    const at = sums + <usize>x * sizeof<T>();
    const weight = liquidWeight(<f64>load<T>(at + stride));
    store<T>(at + 2 * stride, <T>(factor * weight * (<f64>load<T>(at) - reference)));
  }
}

/** 1 for a section without gas, 0 for one with a fiftieth or more of it. */
@inline function liquidWeight(gas: f64): f64 { return Math.max(0, 1 - 50 * gas / <f64>ny); }

/** Mean of ux over all cells of a box without gas. */
export function meanFlux<T>(): f64 {
  const sums = address(H.AT_SECTIONS);
  let total: f64 = 0;
  for (let x = 0; x < nx; x++) total += <f64>load<T>(sums + <usize>x * sizeof<T>());
  return total / <f64>(nx * ny);
}

/** Adds up the rows of a box with gas; returns the mean of ux. */
export function addRows(): f64 {
  let flux: f64 = 0;
  let less: f64 = 0;
  let skimmed: f64 = 0;
  for (let y = 0; y < ny; y++) {
    flux += load<f64>(rowSums(y));
    less += load<f64>(rowSums(y), 8);
    skimmed += load<f64>(rowSums(y), 16);
  }
  const area = skimmed - less;
  const due = entry(H.GAS_DUE) + skimmed;
  setEntry(H.GAS_AREA, area);
  setEntry(H.GAS_DUE, due);
  setEntry(H.SKIMMED, entry(H.SKIMMED) - skimmed);
  let liquid = 0;
  for (let y = 0; y < ny; y++) liquid += liquidTiles(y);
  setEntry(H.AMENDS, liquid == 0 ? 0 : (area - due) / <f64>(liquid * TILE));
  return flux / <f64>(nx * ny);
}

/** The force of the drive for the next step. */
export function drive(upflow: f64): void {
  const before = entry(H.UPFLOW);
  const kind = <i32>entry(H.DRIVE_KIND);
  const value = entry(H.DRIVE_VALUE);
  if (kind == 1) setEntry(H.DRIVE_FORCE, -value * upflow * Math.abs(upflow));
  if (kind == 2) setEntry(H.DRIVE_FORCE, entry(H.DRIVE_FORCE) + 0.05 * entry(H.RHO_LIQUID) * (value - 2 * upflow + before));
  setEntry(H.UPFLOW, upflow);
  setEntry(H.UPFLOW_BEFORE, before);
}

/** A speed in row y, whose largest u^2 is `top`, that is not below the limit: names its cell. */
export function checkSpeed<T>(y: i32, top: f64): void {
  const limit = entry(H.SPEED_LIMIT);
  if (top < limit * limit || entry(H.STATUS) != 0) return;
  const twoPhase = entry(H.TWO_PHASE) != 0;
  for (let x = 0; x < nx; x++) {
    const i = <usize>x * sizeof<T>();
    // with gas the populations carry the velocity itself
    const f = row(y) + i;
    const ux = twoPhase ? across<T>(f, 1, 3) + across<T>(f, 5, 7) + across<T>(f, 8, 6) : <f64>load<T>(fieldRow(H.AT_UX, y) + i);
    const uy = twoPhase ? across<T>(f, 2, 4) + across<T>(f, 5, 7) + across<T>(f, 6, 8) : <f64>load<T>(fieldRow(H.AT_UY, y) + i);
    const speed = Math.sqrt(ux * ux + uy * uy);
    // rounding may hide the cell that the row noticed
    if (speed < (1 - 1e-5) * limit) continue;
    setEntry(H.STATUS, isFinite(speed) ? 2 : 1);
    setEntry(H.BAD_X, <f64>x);
    setEntry(H.BAD_Y, <f64>y);
    setEntry(H.BAD_SPEED, speed);
    break;
  }
}

/** f of one direction less that of another */
@inline function across<T>(f: usize, a: usize, b: usize): f64 { return <f64>load<T>(f + a * stride) - <f64>load<T>(f + b * stride); }
