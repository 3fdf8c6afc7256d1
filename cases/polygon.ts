/** Plane geometry of closed outlines: [across, along] corners in any one unit, the last joined to the first. */
import type { Outline } from './case.ts';

type Point = readonly [number, number];

/** Signed area; positive when the corners run from across towards along. */
export function signedArea(outline: Outline): number {
  let sum = 0;
  for (let i = 0; i < outline.length; i++) {
    const [ax, ay] = corner(outline, i);
    const [bx, by] = corner(outline, i + 1);
    sum += ax * by - bx * ay;
  }
  return sum / 2;
}

function corner(outline: Outline, i: number): Point {
  return outline[i % outline.length] as Point;
}

/** Whether a point lies inside, by counting the edges a ray crosses. */
export function inside(outline: Outline, across: number, along: number): boolean {
  let odd = false;
  for (let i = 0; i < outline.length; i++) {
    const [ax, ay] = corner(outline, i);
    const [bx, by] = corner(outline, i + 1);
    if (ay > along !== by > along && across < ax + ((along - ay) / (by - ay)) * (bx - ax)) odd = !odd;
  }
  return odd;
}

/** Least and greatest corner in each direction. */
export function extent(outline: Outline): { across: [number, number]; along: [number, number] } {
  const across = outline.map((point) => point[0]);
  const along = outline.map((point) => point[1]);
  return { across: [Math.min(...across), Math.max(...across)], along: [Math.min(...along), Math.max(...along)] };
}

/** Whether two edges of the outline that are not neighbours meet. */
export function crossesItself(outline: Outline): boolean {
  const n = outline.length;
  for (let i = 0; i < n; i++) {
    for (let j = i + 2; j < n; j++) {
      if (i === 0 && j === n - 1) continue;
      if (segmentsMeet(corner(outline, i), corner(outline, i + 1), corner(outline, j), corner(outline, j + 1))) return true;
    }
  }
  return false;
}

/** Whether two outlines share any point. */
export function overlap(a: Outline, b: Outline): boolean {
  const ea = extent(a);
  const eb = extent(b);
  if (ea.along[1] < eb.along[0] || eb.along[1] < ea.along[0] || ea.across[1] < eb.across[0] || eb.across[1] < ea.across[0]) return false;
  for (let i = 0; i < a.length; i++) {
    for (let j = 0; j < b.length; j++) if (segmentsMeet(corner(a, i), corner(a, i + 1), corner(b, j), corner(b, j + 1))) return true;
  }
  return inside(a, ...corner(b, 0)) || inside(b, ...corner(a, 0));
}

/** Distance of a point from the outline's area; 0 inside. */
export function distanceTo(outline: Outline, across: number, along: number): number {
  if (inside(outline, across, along)) return 0;
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i < outline.length; i++) {
    const [ax, ay] = corner(outline, i);
    const [bx, by] = corner(outline, i + 1);
    const length2 = (bx - ax) ** 2 + (by - ay) ** 2;
    const share = length2 === 0 ? 0 : Math.min(1, Math.max(0, ((across - ax) * (bx - ax) + (along - ay) * (by - ay)) / length2));
    least = Math.min(least, Math.hypot(across - ax - share * (bx - ax), along - ay - share * (by - ay)));
  }
  return least;
}

/** Twice the area of the triangle; its sign says on which side of a-b the point c lies. */
function turn(a: Point, b: Point, c: Point): number {
  return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0]);
}

function segmentsMeet(a: Point, b: Point, c: Point, d: Point): boolean {
  const abc = turn(a, b, c);
  const abd = turn(a, b, d);
  const cda = turn(c, d, a);
  const cdb = turn(c, d, b);
  if (abc * abd < 0 && cda * cdb < 0) return true;
  return (
    (abc === 0 && between(a, b, c)) || (abd === 0 && between(a, b, d)) || (cda === 0 && between(c, d, a)) || (cdb === 0 && between(c, d, b))
  );
}

function between(a: Point, b: Point, c: Point): boolean {
  return Math.min(a[0], b[0]) <= c[0] && c[0] <= Math.max(a[0], b[0]) && Math.min(a[1], b[1]) <= c[1] && c[1] <= Math.max(a[1], b[1]);
}
