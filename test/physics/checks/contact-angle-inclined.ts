/**
 * A liquid drop on the face of a solid that leans against the grid, let go as a half disc: at rest it is a segment of a circle, of which the
 * middle lies -r cos(theta) above the face [V].
 */
import { createSimulation, type Simulation } from '../../../solver/index.ts';
import { advance, CLOSED, crossings, profile } from '../channel.ts';
import { type Check, row } from '../row.ts';
import { SEGMENTS } from './contact-angle.ts';

const [W, SIGMA] = [4, 0.01];
/** crossings this near the face are left out of the circle, cells */
const NEAR = 2;

interface Leaning {
  asked_deg: number;
  /** of the half disc, cells */
  R: number;
  /** of the face against x */
  lean_deg: number;
  /** how far the face lies from where it passes the middles of cells */
  offset?: number;
  /** where the face lies between cells is kept from the solver */
  stairs?: boolean;
}

/** Angle of the drop once it rests, degrees: no change by 0.05 in as many steps as 30 R^2. */
export async function leaningAngle_deg({ asked_deg, R, lean_deg, offset = 0.2, stairs }: Leaning): Promise<number> {
  const lean = (lean_deg * Math.PI) / 180;
  const [cosine, sine] = [Math.cos(lean), Math.sin(lean)];
  // room along the face on either side and above it; a drop that wets spreads over 4.2 R at 30 degrees
  const along = (asked_deg < 60 ? 2.5 : 2) * R + 5;
  const above = (asked_deg < 120 ? 1.5 : 2) * R + 8;
  const middle = { x: Math.ceil(along * cosine + above * sine), y: Math.ceil(along * sine) + 3 };
  const nx = middle.x + Math.ceil(along * cosine) + 1;
  const ny = middle.y + Math.ceil(along * sine + above * cosine);
  const distance = (x: number, y: number): number => (y - middle.y) * cosine - (x - middle.x) * sine + offset;
  const drop = (x: number, y: number): number => profile(R - Math.hypot(x - middle.x, y - middle.y), W);
  const s = await createSimulation({
    ...{ nx, ny, sides: CLOSED, interfaceWidth: W, surfaceTension: SIGMA, contactAngle: (asked_deg * Math.PI) / 180 },
    ...{ liquid: { density: 1, viscosity: 0.1 }, gas: { density: 0.1, viscosity: 0.01 } },
    solid: Uint8Array.from({ length: nx * ny }, (_, i) => (distance(i % nx, Math.floor(i / nx)) > 0 ? 0 : 1)),
    ...(stairs ? {} : { solidDistance: distance }),
    initial: { phi: drop, pressure: (x, y) => (drop(x, y) * SIGMA) / R },
  });
  let angle_deg = 0;
  for (let n = 0; n < 20; n++) {
    advance(s, 30 * R * R);
    const before = angle_deg;
    const circle = circleThrough(outlinePoints(s, distance));
    angle_deg = (180 / Math.PI) * Math.acos(-distance(circle.x, circle.y) / circle.radius);
    if (Math.abs(angle_deg - before) < 0.05) break;
  }
  return angle_deg;
}

/** Where phi crosses 1/2 along rows and columns, clear of the face. */
function outlinePoints({ phi, setup: { nx, ny } }: Simulation, distance: (x: number, y: number) => number): [number, number][] {
  const points: [number, number][] = [];
  for (let y = 0; y < ny; y++) for (const x of crossings((at) => phi.get(at, y), nx)) points.push([x, y]);
  for (let x = 0; x < nx; x++) for (const y of crossings((at) => phi.get(x, at), ny)) points.push([x, y]);
  return points.filter(([x, y]) => distance(x, y) > NEAR);
}

/** Circle by least squares of x^2 + y^2 - 2 a x - 2 b y - c. */
function circleThrough(points: [number, number][]): { x: number; y: number; radius: number } {
  const mean = (value: (x: number, y: number) => number): number => points.reduce((sum, [x, y]) => sum + value(x, y), 0) / points.length;
  const [mx, my] = [mean((x) => x), mean((_, y) => y)];
  const centred = (value: (u: number, v: number) => number): number => mean((x, y) => value(x - mx, y - my));
  const [uu, uv, vv] = [centred((u) => u * u), centred((u, v) => u * v), centred((_, v) => v * v)];
  const [p, q] = [centred((u, v) => (u * (u * u + v * v)) / 2), centred((u, v) => (v * (u * u + v * v)) / 2)];
  const determinant = uu * vv - uv * uv;
  const [a, b] = [(p * vv - q * uv) / determinant, (q * uu - p * uv) / determinant];
  return { x: mx + a, y: my + b, radius: Math.sqrt(a * a + b * b + uu + vv) };
}

export const check: Check = {
  name: 'contact-angle-inclined',
  async run(long) {
    const rows = [];
    for (const lean_deg of [30, 45]) {
      for (const [asked_deg] of SEGMENTS) {
        const ours = [];
        for (const cells of long ? [16, 32] : [16]) ours.push({ cells, value: await leaningAngle_deg({ asked_deg, R: cells, lean_deg }) });
        const part = {
          check: this.name,
          source: 'segment of a circle [V]',
          quantity: `angle at ${asked_deg} deg, face leaning by ${lean_deg} deg`,
        };
        rows.push(row({ ...part, reference: asked_deg, counts: 'R ', ours, scale: { absolute: 'deg' }, gate: 3 }));
      }
    }
    return rows;
  },
};
