/**
 * Bubbles: patches of cells with phi < 1/2, joined over cell edges and over the periodic ends.
 * The area of a patch is the sum of 1 - phi over it and over the rim of diffuse interface around it, each rim cell going to
 * the patch it is nearest to; so the areas add up to the gas present but for crumbs below {@link LEAST_CELLS}.
 */
import type { Simulation } from '../solver/index.ts';
import type { BubbleRow } from './recording.ts';
import type { Derived } from './scale.ts';

/** Smallest patch that counts as a bubble, cells. */
const LEAST_CELLS = 12;

/** Rings of rim counted with a patch, cells: the interface width, beyond which 2 % of the tail is left. */
const RIM = 5;

/** A patch in lattice units; x may lie outside 0 .. nx before wrapping. */
interface Patch {
  cells: number;
  area: number;
  x: number;
  y: number;
  ux: number;
  uy: number;
}

/** Finds patches; its work arrays are allocated once. */
export class PatchFinder {
  /** patch of a cell, from 1; 0 none, -1 solid */
  readonly #label: Int32Array;
  /** x counted on past the periodic ends, so that a patch across them stays in one piece */
  readonly #unwrapped: Int32Array;
  /** cells in the order in which they were reached */
  readonly #queue: Int32Array;
  readonly #nx: number;
  readonly #ny: number;
  readonly #solid: Uint8Array | undefined;

  constructor(nx: number, ny: number, solid?: Uint8Array) {
    this.#nx = nx;
    this.#ny = ny;
    this.#solid = solid;
    this.#label = new Int32Array(nx * ny);
    this.#unwrapped = new Int32Array(nx * ny);
    this.#queue = new Int32Array(nx * ny);
  }

  find({ phi, ux, uy }: Pick<Simulation, 'phi' | 'ux' | 'uy'>): Patch[] {
    const [nx, ny] = [this.#nx, this.#ny];
    const label = this.#label.fill(0);
    if (this.#solid !== undefined) for (let i = 0; i < label.length; i++) if (this.#solid[i] === 1) label[i] = -1;
    const patches: Patch[] = [];
    let tail = 0;
    const reach = (i: number, x: number, patch: number): void => {
      label[i] = patch;
      this.#unwrapped[i] = x;
      this.#queue[tail++] = i;
    };
    const spread = (from: number, wanted: (x: number, y: number) => boolean): void => {
      const i = this.#queue[from] as number;
      const [x, y, far, patch] = [i % nx, Math.floor(i / nx), this.#unwrapped[i] as number, label[i] as number];
      const right = x === nx - 1 ? i + 1 - nx : i + 1;
      const left = x === 0 ? i - 1 + nx : i - 1;
      if (label[right] === 0 && wanted(right % nx, y)) reach(right, far + 1, patch);
      if (label[left] === 0 && wanted(left % nx, y)) reach(left, far - 1, patch);
      if (y > 0 && label[i - nx] === 0 && wanted(x, y - 1)) reach(i - nx, far, patch);
      if (y < ny - 1 && label[i + nx] === 0 && wanted(x, y + 1)) reach(i + nx, far, patch);
    };
    const inGas = (x: number, y: number): boolean => phi.get(x, y) < 0.5;
    let head = 0;
    for (let y = 0; y < ny; y++) {
      for (let x = 0; x < nx; x++) {
        if (label[y * nx + x] !== 0 || !inGas(x, y)) continue;
        patches.push({ cells: 0, area: 0, x: 0, y: 0, ux: 0, uy: 0 });
        const first = tail;
        reach(y * nx + x, x, patches.length);
        while (head < tail) spread(head++, inGas);
        (patches.at(-1) as Patch).cells = tail - first;
      }
    }
    head = 0;
    for (let ring = 0; ring < RIM; ring++) for (const end = tail; head < end; head++) spread(head, () => true);
    for (let n = 0; n < tail; n++) {
      const i = this.#queue[n] as number;
      const [x, y] = [i % nx, Math.floor(i / nx)];
      const patch = patches[(label[i] as number) - 1] as Patch;
      const gas = 1 - phi.get(x, y);
      patch.area += gas;
      patch.x += gas * (this.#unwrapped[i] as number);
      patch.y += gas * y;
      patch.ux += gas * ux.get(x, y);
      patch.uy += gas * uy.get(x, y);
    }
    return patches.filter(({ cells }) => cells >= LEAST_CELLS).map(mean);
  }
}

function mean({ cells, area, x, y, ux, uy }: Patch): Patch {
  return { cells, area, x: x / area, y: y / area, ux: ux / area, uy: uy / area };
}

/** Plain data, so that a checkpoint can hold it. */
export interface TrackState {
  last: BubbleRow[];
  next: number;
}

/**
 * Rows of the patches seen at `time_s`. A patch goes on as the bubble whose centre, moved on with its velocity since it was last seen, is
 * nearest and closer than the patch's own radius (of the circle of equal area); the closest pairs are joined first.
 */
export function follow(state: TrackState, patches: readonly Patch[], time_s: number, { nx, dx_m, unit }: Derived): BubbleRow[] {
  const height_m = nx * dx_m;
  const rows = patches.map(
    (patch): BubbleRow => ({
      time_s,
      bubble: -1,
      area_m2: patch.area * unit.area_m2,
      x_m: wrap((patch.x + 0.5) * dx_m, height_m),
      y_m: (patch.y + 0.5) * dx_m,
      ux_m_s: patch.ux * unit.velocity_m_s,
      uy_m_s: patch.uy * unit.velocity_m_s,
    }),
  );
  const pairs = rows.flatMap((row) =>
    state.last.flatMap((old) => {
      const away_m = missed_m(old, row, height_m);
      return away_m < Math.sqrt(row.area_m2 / Math.PI) ? [{ row, old, away_m }] : [];
    }),
  );
  pairs.sort((a, b) => a.away_m - b.away_m);
  const taken = new Set<number>();
  for (const { row, old } of pairs) {
    if (row.bubble >= 0 || taken.has(old.bubble)) continue;
    row.bubble = old.bubble;
    taken.add(old.bubble);
  }
  for (const row of rows) if (row.bubble < 0) row.bubble = state.next++;
  state.last = rows;
  return rows;
}

function wrap(x: number, length: number): number {
  return ((x % length) + length) % length;
}

/** Distance between where a bubble was expected and where a patch is, over the periodic ends. */
function missed_m(old: BubbleRow, row: BubbleRow, height_m: number): number {
  const elapsed_s = row.time_s - old.time_s;
  const along_m = wrap(row.x_m - old.x_m - old.ux_m_s * elapsed_s + height_m / 2, height_m) - height_m / 2;
  return Math.hypot(along_m, row.y_m - old.y_m - old.uy_m_s * elapsed_s);
}
