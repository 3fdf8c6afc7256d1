/**
 * Which fins can be computed. A fin may reach past a wall: it is then attached to it, and what lies beyond is cut off.
 * Refused are fins outside the gap, in the bands at the ends, thinner than two cells, bent too tightly, crossing themselves or
 * one another, and any arrangement that leaves no way through of three cells.
 */
import { bandsOf, gridOf } from './bands.ts';
import type { Case, Outline } from './case.ts';
import type { PlacedFinding } from './faults.ts';
import type { FinEntry } from './finkeys.ts';
import { cellsWithin, type PlacedFin, solidCells, wayUp } from './fins.ts';
import { type Memory, remembered } from './memory.ts';
import { band, commonPoint, crossesItself, extent, leastPiece, pieceLength, signedArea, turnAt } from './polygon.ts';
import type { CaseEntries } from './schema.ts';
import type { Path } from './text.ts';
import { mm } from './units.ts';

/** Slack on places, m. */
const ROUND_OFF_m = 1e-9;

/** Thinnest fin the grid carries, cells. */
const THINNEST = 2;

/** Largest turn of a middle line at one corner: beyond it a mitre is longer than the fin is thick. */
const SHARPEST_rad = Math.PI / 2;

/** What was found of fins before, by their places and the grid's. */
const known: Memory<PlacedFinding[]> = new Map();

export function finFindings(entries: CaseEntries, panel: Case, fins: readonly PlacedFin[]): PlacedFinding[] {
  if (entries.fins.length === 0) return [];
  const key = JSON.stringify([entries.fins, panel.channel.gap_m, gridOf(panel), bandsOf(panel)]);
  return remembered(known, key, () => findingsOf(entries, panel, fins));
}

function findingsOf(entries: CaseEntries, panel: Case, fins: readonly PlacedFin[]): PlacedFinding[] {
  const written = entries.fins.flatMap((_, entry) => entryFindings(entries, panel, entry));
  if (written.length > 0) return written;
  const alone = fins.flatMap((fin, i) => shapeFindings(panel, fin, i, fins));
  if (alone.length > 0) return firstPerEntry(alone);
  const crossed = crossings(fins);
  if (crossed.length > 0) return firstPerEntry(crossed);
  const { nx, ny, dx_m } = gridOf(panel);
  const highest = wayUp(solidCells(panel.fins, nx, ny, dx_m), nx, ny);
  if (highest === nx - 1) return [];
  const problem = `leave no way three cells wide past ${mm((highest + 1) * dx_m)} along`;
  return [{ path: ['fins'], problem, remedy: 'Move or shorten fins' }];
}

/** A group of twenty fins with one mistake in it is one fault. */
function firstPerEntry(found: readonly PlacedFinding[]): PlacedFinding[] {
  return found.filter((one, i) => found.findIndex((other) => other.path[1] === one.path[1]) === i);
}

function entryFindings({ fins }: CaseEntries, panel: Case, entry: number): PlacedFinding[] {
  const fin = fins[entry] as FinEntry;
  const path = ['fins', entry];
  const found = [
    ...groupFindings(path, fin),
    ...('outline' in fin ? outlineFindings(path, fin.outline as Outline) : thinFindings(path, fin, panel)),
  ];
  return 'path' in fin ? [...found, ...pathFindings(path, fin.path as Outline, fin.thickness)] : found;
}

function groupFindings(path: Path, fin: FinEntry): PlacedFinding[] {
  const found: PlacedFinding[] = [];
  if (fin.count > 1 && fin.pitch === undefined)
    found.push({ path: [...path, 'pitch'], problem: 'is missing', allowed: 'a length, needed for more than one fin' });
  if (fin.alternate && fin.mirrored) {
    const remedy = 'mirrored puts a fin on both sides each time, alternate on one side in turn';
    found.push({ path: [...path, 'mirrored'], problem: 'stands beside alternate', allowed: 'one of the two', remedy });
  }
  return found;
}

function outlineFindings(path: Path, corners: Outline): PlacedFinding[] {
  const at = [...path, 'outline'];
  if (corners.length < 3) return [{ path: at, problem: `has ${corners.length} corners`, allowed: 'at least 3 corners' }];
  if (crossesItself(corners))
    return [{ path: at, problem: 'crosses itself', remedy: 'List the corners in the order in which they are joined' }];
  if (Math.abs(signedArea(corners)) < 1e-12)
    return [{ path: at, problem: 'encloses no area', remedy: 'Take corners that do not lie on one line' }];
  return [];
}

function thinFindings(path: Path, { thickness }: { thickness: number }, panel: Case): PlacedFinding[] {
  const { dx_m } = gridOf(panel);
  if (thickness >= THINNEST * dx_m * (1 - 1e-9)) return [];
  const cells = Math.ceil((THINNEST * panel.channel.gap_m) / thickness);
  const remedy = `Make the fin thicker, or take grid.across: ${cells}`;
  const allowed = `at least ${mm(THINNEST * dx_m)} on this grid`;
  return [{ path: [...path, 'thickness'], problem: 'is thinner than two cells', allowed, remedy }];
}

/** Middle lines around which no band of the thickness can be drawn. */
function pathFindings(path: Path, line: Outline, thickness: number): PlacedFinding[] {
  const at = [...path, 'path'];
  if (line.length < 2) return [{ path: at, problem: 'has fewer than two corners', allowed: 'at least 2 corners' }];
  for (let i = 0; i < line.length - 1; i++) {
    if (pieceLength(line, i) < ROUND_OFF_m)
      return [{ path: [...at, i + 1], problem: 'is the same corner as the one before', remedy: 'Leave it out' }];
  }
  const sharp = line.findIndex((_, i) => Math.abs(turnAt(line, i)) > SHARPEST_rad + 1e-9);
  if (sharp > 0) {
    const problem = `is a corner at which the fin turns by ${Math.round(Math.abs(turnAt(line, sharp)) * (180 / Math.PI))} deg`;
    return [{ path: [...at, sharp], problem, allowed: 'at most 90 deg', remedy: 'Take more corners, or draw an outline' }];
  }
  for (let i = 0; i < line.length - 1; i++) {
    const least_m = leastPiece(line, i, thickness);
    if (pieceLength(line, i) <= least_m) {
      const problem = `is ${mm(pieceLength(line, i))} from the corner before, too near for bends of this thickness`;
      return [{ path: [...at, i + 1], problem, allowed: `more than ${mm(least_m)}`, remedy: 'Make the fin thinner or bend it less' }];
    }
  }
  if (!crossesItself(band(line, thickness))) return [];
  return [{ path: at, problem: 'makes a fin that crosses itself', remedy: 'Make it thinner, or bend it less' }];
}

function shapeFindings(panel: Case, { outline, entry }: PlacedFin, index: number, fins: readonly PlacedFin[]): PlacedFinding[] {
  const path = ['fins', entry];
  const { gap_m } = panel.channel;
  const { release, skim } = bandsOf(panel);
  const { across, along } = extent(outline);
  const which = nameOf(fins, index);
  const span = `${mm(along[0])} to ${mm(along[1])}`;
  if (across[1] <= 0 || across[0] >= gap_m) {
    const place = `from ${mm(across[0])} to ${mm(across[1])} across`;
    return [{ path, problem: `${which} lies outside the gap, ${place}`, allowed: `some part within 0 mm to ${mm(gap_m)}` }];
  }
  if (across[0] <= 0 && across[1] >= gap_m)
    return [{ path, problem: `${which} reaches from wall to wall`, remedy: 'Leave a way past the fin' }];
  const low = along[0] < release.to_m - ROUND_OFF_m;
  if (low || along[1] > skim.from_m + ROUND_OFF_m) {
    const band = low ? 'the band at the bottom where gas is let in' : 'the band at the top where gas is taken out';
    const allowed = `${mm(release.to_m)} to ${mm(skim.from_m)} along`;
    return [{ path, problem: `${which} reaches into ${band}, ${span} along`, allowed, remedy: 'Move the fin or make the channel higher' }];
  }
  const { nx, ny, dx_m } = gridOf(panel);
  const cells = cellsWithin(outline, nx, ny, dx_m).length;
  if (cells < THINNEST * THINNEST)
    return [
      {
        path,
        problem: `${which} fills too little of the grid (cells: ${cells})`,
        allowed: 'at least 4 cells',
        remedy: 'Take more cells across',
      },
    ];
  return [];
}

/** "fin 3 of the group", or "the fin" where the entry makes one only. */
function nameOf(fins: readonly PlacedFin[], index: number): string {
  const { entry } = fins[index] as PlacedFin;
  const before = fins.slice(0, index).filter((fin) => fin.entry === entry).length;
  return fins.filter((fin) => fin.entry === entry).length === 1 ? 'the fin' : `fin ${before + 1} of the group`;
}

function crossings(fins: readonly PlacedFin[]): PlacedFinding[] {
  return fins.flatMap((fin, i): PlacedFinding[] => {
    for (const other of fins.slice(0, i)) {
      const point = commonPoint(other.outline, fin.outline);
      if (point === undefined) continue;
      const whose = other.entry === fin.entry ? 'the same group' : `entry ${other.entry + 1}`;
      const problem = `${nameOf(fins, i)} overlaps a fin of ${whose} at ${mm(point[0])} across, ${mm(point[1])} along`;
      return [{ path: ['fins', fin.entry], problem, remedy: 'Move one of them, or draw both as one outline' }];
    }
    return [];
  });
}
