/**
 * A liquid drop on a straight wall, let go as a half disc of radius R: at rest it is a circle's segment that meets the wall at theta,
 * theta = 2 arctan(2 height / base) [V].
 */
import { createSimulation } from '../../../solver/index.ts';
import { CHANNEL, crossings, profile, settle } from '../channel.ts';
import { type Check, row } from '../row.ts';

const [W, SIGMA] = [4, 0.01];

/** Height over base of the segment at 30, 60, 90, 120, 150 degrees [V]. */
export const SEGMENTS: readonly [number, number][] = [
  [30, 0.13397],
  [60, 0.28868],
  [90, 0.5],
  [120, 0.86603],
  [150, 1.86603],
];

export const angle_deg = (ratio: number): number => (360 / Math.PI) * Math.atan(2 * ratio);

/** Angle and height over base of the drop once it rests: no change of the angle by 0.05 degrees in as many steps as 30 R^2. */
export async function restingAngle(asked_deg: number, R: number): Promise<{ angle_deg: number; ratio: number }> {
  // a drop that wets spreads over 4.2 R at 30 degrees
  const nx = Math.ceil(((asked_deg < 60 ? 5 : 4) * R) / 2 + 5) * 2;
  const ny = 2 * R + 8;
  const middle = nx / 2 - 0.5;
  const drop = (x: number, y: number) => profile(R - Math.hypot(x - middle, y + 0.5), W);
  const s = await createSimulation({
    ...{ nx, ny, sides: CHANNEL, interfaceWidth: W, surfaceTension: SIGMA, contactAngle: (asked_deg * Math.PI) / 180 },
    ...{ liquid: { density: 1, viscosity: 0.1 }, gas: { density: 0.1, viscosity: 0.01 } },
    initial: { phi: drop, pressure: (x, y) => (drop(x, y) * SIGMA) / R },
  });
  let ratio = 0;
  for (let n = 0; n < 20; n++) {
    const { phi } = settle(s, 30 * R * R);
    const before = ratio;
    const wetted = crossings((x) => phi.left.get(0, x), nx);
    const [top] = crossings((y) => (s.phi.get(nx / 2 - 1, y) + s.phi.get(nx / 2, y)) / 2, ny);
    if (wetted.length !== 2 || top === undefined) throw new Error(`the drop of ${asked_deg} deg has left the wall or spread to the ends`);
    ratio = (top + 0.5) / (wetted[1] - wetted[0]);
    if (Math.abs(angle_deg(ratio) - angle_deg(before)) < 0.05) break;
  }
  return { angle_deg: angle_deg(ratio), ratio };
}

export const check: Check = {
  name: 'contact-angle',
  async run() {
    const rows = [];
    for (const [asked_deg] of SEGMENTS) {
      const ours = [];
      for (const cells of [16, 32]) ours.push({ cells, value: (await restingAngle(asked_deg, cells)).angle_deg });
      const part = { check: this.name, quantity: `angle at ${asked_deg} deg, straight wall`, source: 'segment of a circle [V]' };
      rows.push(row({ ...part, reference: asked_deg, counts: 'R ', ours, scale: { absolute: 'deg' }, gate: 3 }));
    }
    return rows;
  },
};
