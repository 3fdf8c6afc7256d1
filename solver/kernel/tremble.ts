// Keeps f32 from swallowing part of a small force. Half a force is added to a momentum some 1e4 to 1e6 times larger, and the sum
// rounds to the momentum's own grid: a steady force then loses the same remainder in every step. Measured in a channel of 32
// cells at tau 0.7: wall force 8e-5 below the driving force, with this 8e-6; the force of a return path is 100 times smaller yet.
// A zero-mean change of the force from step to step, as wide as the grid is coarse, makes the rounding right on average.
import * as H from '../header';
import { entry } from './rows';

/** spacing of f32 numbers from 1/2 to 1: at least the grid of any momentum of the liquid */
const GRID: f64 = 1.0 / 16777216.0;

/** What to add to half of `force` in this step: evenly spread in time over -GRID/2 .. GRID/2; nothing in f64 or without a force. */
export function tremble<T>(force: f64): f64 {
  if (sizeof<T>() == 8 || force == 0) return 0;
  // multiples of the golden ratio fill the unit interval most evenly
  const turns = 0.6180339887498949 * entry(H.STEP) + 0.5;
  const offset = (turns - Math.floor(turns) - 0.5) * GRID;
  return force > 0 ? offset : -offset;
}
