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

/** A point that two outlines share, if there is one: where edges meet, else a corner of the one that lies within the other. */
export function commonPoint(a: Outline, b: Outline): Point | undefined {
  const ea = extent(a);
  const eb = extent(b);
  if (ea.along[1] < eb.along[0] || eb.along[1] < ea.along[0] || ea.across[1] < eb.across[0] || eb.across[1] < ea.across[0])
    return undefined;
  for (let i = 0; i < a.length; i++) {
    for (let j = 0; j < b.length; j++) {
      const [from, to, other, end] = [corner(a, i), corner(a, i + 1), corner(b, j), corner(b, j + 1)];
      if (segmentsMeet(from, to, other, end)) return meetingPoint(from, to, other, end);
    }
  }
  if (inside(a, ...corner(b, 0))) return corner(b, 0);
  return inside(b, ...corner(a, 0)) ? corner(a, 0) : undefined;
}

/** Where the segment a-b, which meets c-d, does so; an end of it where both lie on one line. */
function meetingPoint(a: Point, b: Point, c: Point, d: Point): Point {
  const [cda, cdb] = [turn(c, d, a), turn(c, d, b)];
  const share = cda === cdb ? 0 : cda / (cda - cdb);
  return [a[0] + share * (b[0] - a[0]), a[1] + share * (b[1] - a[1])];
}

/**
 * Outline of a line with a thickness: mitred where it turns, cut off straight at both ends. A piece of the line that is shorter than
 * {@link leastPiece} makes an outline that runs backwards there.
 * @param path at least two corners, no two neighbours alike, none that turns back on itself
 */
export function band(path: Outline, thickness: number): Outline {
  const offsets = path.map((_, i): Point => {
    const before = direction(path, Math.max(0, i - 1));
    const after = direction(path, Math.min(path.length - 2, i));
    const scale = thickness / 2 / (1 + before[0] * after[0] + before[1] * after[1]);
    return [-scale * (before[1] + after[1]), scale * (before[0] + after[0])];
  });
  const side = (sign: number): Outline =>
    path.map(([x, y], i) => [x + sign * (offsets[i] as Point)[0], y + sign * (offsets[i] as Point)[1]]);
  return [...side(-1), ...side(1).reverse()];
}

/** Angle by which a line turns at corner i, 0 at its ends; positive from across towards along. */
export function turnAt(path: Outline, i: number): number {
  if (i === 0 || i === path.length - 1) return 0;
  const [before, after] = [direction(path, i - 1), direction(path, i)];
  return Math.atan2(before[0] * after[1] - before[1] * after[0], before[0] * after[0] + before[1] * after[1]);
}

/** What the mitres at both ends of piece i take from its length on one side or the other. */
export function leastPiece(path: Outline, i: number, thickness: number): number {
  return (thickness / 2) * Math.abs(Math.tan(turnAt(path, i) / 2) + Math.tan(turnAt(path, i + 1) / 2));
}

/** Length of piece i of a line. */
export function pieceLength(path: Outline, i: number): number {
  const [[ax, ay], [bx, by]] = [corner(path, i), corner(path, i + 1)];
  return Math.hypot(bx - ax, by - ay);
}

/** Unit vector along piece i of a line. */
function direction(path: Outline, i: number): Point {
  const [[ax, ay], [bx, by], length] = [corner(path, i), corner(path, i + 1), pieceLength(path, i)];
  return [(bx - ax) / length, (by - ay) / length];
}

/** Distance of a point from the outline's area; 0 inside. */
export function distanceTo(outline: Outline, across: number, along: number): number {
  return inside(outline, across, along) ? 0 : distanceToEdge(outline, across, along);
}

/** Distance of a point from the nearest edge of the outline, inside or outside. */
export function distanceToEdge(outline: Outline, across: number, along: number): number {
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
