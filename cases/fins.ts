/** Fins: groups resolved to outlines, and outlines to the cells they fill. */
import type { Outline } from './case.ts';
import type { FinEntry } from './finkeys.ts';
import { band, distanceToEdge, extent, inside } from './polygon.ts';

/** A fin and the entry of the case file it comes from. */
export interface PlacedFin {
  outline: Outline;
  entry: number;
}

/**
 * The fins of an entry, lowest first. The first one is a rectangle `length` by `thickness` whose long side leans from the channel axis by
 * `angle` (positive: upper end to the right), a band around a middle line, or an outline as written; the others stand one `pitch`
 * above another. With `alternate`, the second, fourth, ... are mirrored across the middle of the gap; with `mirrored`, the mirror
 * image of each follows it.
 */
export function finOutlines(fin: FinEntry, gap_m: number): Outline[] {
  return Array.from({ length: fin.count }, (_, i) => {
    const outline = raised(fin, i * (fin.pitch ?? 0));
    const image = outline.map(([across, along]): [number, number] => [gap_m - across, along]).reverse();
    if (fin.mirrored) return [outline, image];
    return [fin.alternate && i % 2 === 1 ? image : outline];
  }).flat();
}

function raised(fin: FinEntry, by: number): Outline {
  if ('path' in fin) return band(raisedCorners(fin.path as Outline, by), fin.thickness);
  if ('outline' in fin) return raisedCorners(fin.outline as Outline, by);
  return bar(fin.across, fin.from + by, fin.length, fin.thickness, fin.angle);
}

function raisedCorners(corners: Outline, by: number): Outline {
  return corners.map(([across, along]) => [across, along + by]);
}

function bar(across: number, along: number, length: number, thickness: number, angle: number): Outline {
  const sine = Math.sin(angle);
  const cosine = Math.cos(angle);
  const ends: [number, number][] = [
    [-1, -1],
    [1, -1],
    [1, 1],
    [-1, 1],
  ];
  return ends.map(([side, end]) => {
    const a = (side * thickness) / 2;
    const b = (end * length) / 2;
    return [across + a * cosine + b * sine, along - a * sine + b * cosine];
  });
}

/**
 * Cells whose centre lies in a fin; shape (ny, nx), index y * nx + x. Cell (x, y) is centred at along (x + 1/2) dx,
 * across (y + 1/2) dx. What reaches past the walls is cut off.
 */
export function solidCells(fins: readonly Outline[], nx: number, ny: number, dx_m: number): Uint8Array {
  const solid = new Uint8Array(nx * ny);
  for (const fin of fins) for (const cell of cellsWithin(fin, nx, ny, dx_m)) solid[cell] = 1;
  return solid;
}

/** Which fin a cell is part of: 1 for the first, 0 for none; shape (ny, nx). */
export function finNumbers(fins: readonly Outline[], nx: number, ny: number, dx_m: number): Uint16Array {
  const numbers = new Uint16Array(nx * ny);
  fins.forEach((fin, n) => {
    for (const cell of cellsWithin(fin, nx, ny, dx_m)) numbers[cell] = n + 1;
  });
  return numbers;
}

/**
 * Distance of a point from the nearest face of the fins, cells, negative in fins; x and y as cells are numbered. Fins more than two cells
 * away are left out: Infinity where there is no other.
 */
export function finDistance(fins: readonly Outline[], dx_m: number): (x: number, y: number) => number {
  const near = fins.map((outline) => ({ outline, ...extent(outline) }));
  const beyond = (at: number, [low, high]: [number, number]): boolean => at < low - 2 * dx_m || at > high + 2 * dx_m;
  return (x, y) => {
    const [across_m, along_m] = [(y + 0.5) * dx_m, (x + 0.5) * dx_m];
    let least = Number.POSITIVE_INFINITY;
    for (const { outline, across, along } of near) {
      if (beyond(across_m, across) || beyond(along_m, along)) continue;
      const distance = distanceToEdge(outline, across_m, along_m) / dx_m;
      least = Math.min(least, inside(outline, across_m, along_m) ? -distance : distance);
    }
    return least;
  };
}

/** Indices of the cells whose centre lies in one fin. */
export function cellsWithin(fin: Outline, nx: number, ny: number, dx_m: number): number[] {
  const cells: number[] = [];
  const { across, along } = extent(fin);
  const xEnd = Math.min(nx - 1, Math.ceil(along[1] / dx_m));
  const yEnd = Math.min(ny - 1, Math.ceil(across[1] / dx_m));
  for (let y = Math.max(0, Math.floor(across[0] / dx_m) - 1); y <= yEnd; y++) {
    for (let x = Math.max(0, Math.floor(along[0] / dx_m) - 1); x <= xEnd; x++) {
      if (inside(fin, (y + 0.5) * dx_m, (x + 0.5) * dx_m)) cells.push(y * nx + x);
    }
  }
  return cells;
}

/**
 * How far a way three cells wide leads up from the bottom, one whose middle cell has no solid and no wall beside it: the highest x it
 * reaches, nx - 1 where it leads through the channel.
 */
export function wayUp(solid: Uint8Array, nx: number, ny: number): number {
  const seen = new Uint8Array(nx * ny);
  const open: number[] = [];
  let highest = 0;
  const visit = (x: number, y: number): void => {
    const i = y * nx + x;
    if (seen[i] === 1) return;
    seen[i] = 1;
    if (!isCrowded(solid, nx, ny, x, y)) open.push(i);
  };
  for (let y = 0; y < ny; y++) visit(0, y);
  for (let i = open.pop(); i !== undefined; i = open.pop()) {
    const x = i % nx;
    const y = (i - x) / nx;
    highest = Math.max(highest, x);
    if (x === nx - 1) return x;
    if (x > 0) visit(x - 1, y);
    visit(x, y - 1);
    visit(x, y + 1);
    // last, for what comes last is gone on from first, and most channels are open
    visit(x + 1, y);
  }
  return highest;
}

/** In a solid, in the rows along the walls, or with a solid beside it. */
function isCrowded(solid: Uint8Array, nx: number, ny: number, x: number, y: number): boolean {
  if (y <= 0 || y >= ny - 1) return true;
  const i = y * nx + x;
  const beside = solid[i - nx] + solid[i] + solid[i + nx] + (x > 0 ? solid[i - 1] : 0) + (x < nx - 1 ? solid[i + 1] : 0);
  return beside > 0;
}
