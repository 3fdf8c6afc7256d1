// The force of the fluid on each body in a step, as solver/bodyforce.ts says, on one thread and in the order of the list: between the ghosts
// and the collision, while the populations are those that the step pulls. Left in AT_FORCES until the sample is written.
// Reads f, z, m, P and their ghosts. Only for steps that are sampled.
import * as H from '../header';
import { W1, W2 } from '../constants';
import { at, ex, ey } from './ghosts';
import { address, entry, fieldRow, stride, zRow } from './rows';
import { PURE } from './vector';

let forceX: f64 = 0;
let forceY: f64 = 0;

export function bodyForces<T>(): void {
  const forces = address(H.AT_FORCES);
  memory.fill(forces, 0, 16 * (<usize>entry(H.BODIES) + 1));
  const twoPhase = entry(H.TWO_PHASE) != 0;
  const count = <i32>entry(H.TOUCHES);
  let touch = address(H.AT_TOUCHES);
  for (let n = 0; n < count; n++, touch += 32) {
    if (twoPhase) ofFlow<T>(touch);
    else ofLiquid<T>(touch);
    // bodies count from 1: entries 0 take what falls to none
    const toX = forces + 16 * <usize>load<i32>(touch, 24);
    const toY = forces + 16 * <usize>load<i32>(touch, 28);
    store<f64>(toX, load<f64>(toX) + forceX);
    store<f64>(toY, load<f64>(toY, 8) + forceY, 8);
  }
}

function ofLiquid<T>(touch: usize): void {
  const k = load<i32>(touch, 8);
  const back = <f64>load<T>(at<T>(load<i32>(touch), load<i32>(touch, 4), k));
  const left = <f64>load<T>(at<T>(load<i32>(touch, 12), load<i32>(touch, 16), load<i32>(touch, 20)));
  forceX = -<f64>ex(k) * (back + left);
  forceY = -<f64>ey(k) * (back + left);
}

function ofFlow<T>(touch: usize): void {
  const x = load<i32>(touch);
  const y = load<i32>(touch, 4);
  const k = load<i32>(touch, 8);
  const left = load<i32>(touch, 20);
  const eX = <f64>ex(k);
  const eY = <f64>ey(k);
  const j = <usize>(y * <i32>stride + x * <i32>sizeof<T>());
  const i = <usize>(load<i32>(touch, 16) * <i32>stride + load<i32>(touch, 12) * <i32>sizeof<T>());
  const z = zRow(0);
  const P = address(H.AT_PRESSURE);
  const rhoLiquid = entry(H.RHO_LIQUID);
  const rho = entry(H.RHO_GAS) + liquidShare(1 + value<T>(z + i)) * (rhoLiquid - entry(H.RHO_GAS));
  const carried = rho * value<T>(at<T>(x, y, k));
  const pressed = (1 - rho / rhoLiquid) * 3 * (k < 5 ? W1 : W2) * (value<T>(P + i) + value<T>(P + j));
  forceX = -(eX - <f64>ex(left)) * carried - eX * pressed;
  forceY = -(eY - <f64>ey(left)) * carried - eY * pressed;
  if (k > 4) return;
  // from a cell to its neighbour along the face; the velocity along the face, and normal to it
  const alongX = eX != 0;
  const side = alongX ? stride : sizeof<T>();
  const tangent = fieldRow(alongX ? H.AT_MY : H.AT_MX, 0);
  const normal = fieldRow(alongX ? H.AT_MX : H.AT_MY, 0);
  const outward = -(eX + eY);
  const face = 1 + 0.5 * (value<T>(z + i) + value<T>(z + j));
  const thinned = fieldRow(alongX ? H.AT_ETA_X : H.AT_ETA_Y, 0) + (eX + eY > 0 ? j : i);
  const liquid = entry(H.THINS) != 0 ? 1 / value<T>(thinned) : entry(H.FLUIDITY_LIQUID);
  const eta = 1 / (entry(H.FLUIDITY_GAS) + liquidShare(face) * (liquid - entry(H.FLUIDITY_GAS)));
  const across = value<T>(z + j) - value<T>(z + i);
  const along = slope<T>(z, i, j, side);
  const mixed = face * (1 - face);
  const bend = entry(H.BEND);
  const bulk = mixed - Math.log(1 + bend * mixed) / bend;
  const pull = entry(H.KAPPA) * (0.5 * (across * across - along * along) - bulk);
  const ofNormal = -2 * eta * (value<T>(normal + j) - value<T>(normal + i)) + outward * pull;
  const slip = value<T>(tangent + j) - value<T>(tangent + i) + outward * slope<T>(normal, i, j, side);
  const ofTangent = entry(H.KAPPA) * across * along - eta * slip;
  forceX += alongX ? ofNormal : ofTangent;
  forceY += alongX ? ofTangent : ofNormal;
}

@inline function value<T>(at: usize): f64 { return <f64>load<T>(at); }

/** Slope of a field along a face, as the mean of both sides of it. */
@inline function slope<T>(field: usize, i: usize, j: usize, side: usize): f64 {
  const own = value<T>(field + i + side) - value<T>(field + i - side);
  return 0.25 * (own + value<T>(field + j + side) - value<T>(field + j - side));
}

@inline function liquidShare(phi: f64): f64 { return Math.min(Math.max((phi - PURE) / (1 - 2 * PURE), 0), 1); }
