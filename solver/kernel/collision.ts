// The collision of one row of a box with gas: which of its tiles take everything (force.ts, flow.ts), which the step of liquid alone (liquid.ts).
// Leaves the sum of ux and the largest u^2 of the row in its sums.
import * as H from '../header';
import { collide, flux } from './flow';
import { collideLiquid, fluxLiquid, INTERFACE } from './liquid';
import { nx, rowSums } from './rows';
import { ACTIVE, LIQUID, runBytes, SOLID, tileRow, tiles } from './tiles';
import { largest, splat } from './vector';

/** Collides in row y, each tile as it arrived, and leaves what it will need next; `Thins` as in force.ts. */
export function collideRow<T, Thins>(y: i32, flags: i32): void {
  const was = tileRow(H.AT_WAS, y);
  const will = tileRow(H.AT_TILES, y);
  let top = splat<T>(0);
  let sum: f64 = 0;
  for (let t = 0; t < tiles(); ) {
    const state = load<u8>(was + <usize>t);
    const edge = load<u8>(will + <usize>t) > LIQUID;
    const start = runBytes<T>(t);
    do t++; while (load<u8>(was + <usize>t) == state && (state == ACTIVE || load<u8>(will + <usize>t) > LIQUID == edge));
    const end = min<usize>(runBytes<T>(t), <usize>nx * sizeof<T>());
    if (state == ACTIVE) {
      top = collide<T, Thins>(y, flags, start, end, top);
      sum += flux;
    } else if (state != SOLID) {
      top = collideLiquid<T, Thins>(y, edge ? flags | INTERFACE : flags, start, end, top);
      sum += fluxLiquid;
    }
  }
  const sums = rowSums(y);
  store<f64>(sums, sum);
  store<f64>(sums, largest<T>(top), 24);
}
