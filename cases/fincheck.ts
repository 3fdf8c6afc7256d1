/**
 * Which fins can be computed. A fin may reach past a wall: it is then attached to it, and what lies beyond is cut off.
 * Refused are fins outside the gap, in the bands at the ends, thinner than two cells, crossing themselves or one another,
 * and any arrangement that leaves no way through of three cells.
 */
import { bandsOf, gridOf } from './bands.ts';
import type { Case } from './case.ts';
import type { PlacedFinding } from './faults.ts';
import { cellsWithin, type PlacedFin, passable, solidCells } from './fins.ts';
import { crossesItself, extent, overlap, signedArea } from './polygon.ts';
import type { CaseEntries } from './schema.ts';
import { mm } from './units.ts';

/** Slack on places, m. */
const ROUND_OFF_m = 1e-9;

/** Thinnest fin the grid carries, cells. */
const THINNEST = 2;

export function finFindings(entries: CaseEntries, panel: Case, fins: readonly PlacedFin[]): PlacedFinding[] {
  const written = entries.fins.flatMap((_, entry) => entryFindings(entries, panel, entry));
  if (written.length > 0) return written;
  const alone = fins.flatMap((fin, i) => shapeFindings(panel, fin, i, fins));
  if (alone.length > 0) return firstPerEntry(alone);
  const crossed = crossings(fins);
  if (crossed.length > 0) return firstPerEntry(crossed);
  const { nx, ny, dx_m } = gridOf(panel);
  if (fins.length === 0 || passable(solidCells(panel.fins, nx, ny, dx_m), nx, ny)) return [];
  return [{ path: ['fins'], problem: 'leave no way through the channel that is three cells wide', remedy: 'Move or shorten fins' }];
}

/** A group of twenty fins with one mistake in it is one fault. */
function firstPerEntry(found: readonly PlacedFinding[]): PlacedFinding[] {
  return found.filter((one, i) => found.findIndex((other) => other.path[1] === one.path[1]) === i);
}

function entryFindings(entries: CaseEntries, panel: Case, entry: number): PlacedFinding[] {
  const fin = entries.fins[entry] as CaseEntries['fins'][number];
  const path = ['fins', entry];
  if ('outline' in fin) {
    const corners = fin.outline as [number, number][];
    const at = [...path, 'outline'];
    if (corners.length < 3) return [{ path: at, problem: `has ${corners.length} corners`, allowed: 'at least 3 corners' }];
    if (crossesItself(corners))
      return [{ path: at, problem: 'crosses itself', remedy: 'List the corners in the order in which they are joined' }];
    if (Math.abs(signedArea(corners)) < 1e-12)
      return [{ path: at, problem: 'encloses no area', remedy: 'Take corners that do not lie on one line' }];
    return [];
  }
  if (fin.count > 1 && fin.pitch === undefined)
    return [{ path: [...path, 'pitch'], problem: 'is missing', allowed: 'a length, needed for more than one fin' }];
  const { dx_m } = gridOf(panel);
  if (fin.thickness < THINNEST * dx_m * (1 - 1e-9)) {
    const cells = Math.ceil((THINNEST * panel.channel.gap_m) / fin.thickness);
    const remedy = `Make the fin thicker, or take grid.across: ${cells}`;
    return [
      {
        path: [...path, 'thickness'],
        problem: 'is thinner than two cells',
        allowed: `at least ${mm(THINNEST * dx_m)} on this grid`,
        remedy,
      },
    ];
  }
  return [];
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
    const other = fins.findIndex((candidate, j) => j < i && overlap(candidate.outline, fin.outline));
    if (other < 0) return [];
    const { entry } = fins[other] as PlacedFin;
    const whose = entry === fin.entry ? 'the same group' : `entry ${entry + 1}`;
    return [
      {
        path: ['fins', fin.entry],
        problem: `${nameOf(fins, i)} overlaps a fin of ${whose}`,
        remedy: 'Move one of them, or draw both as one outline',
      },
    ];
  });
}
