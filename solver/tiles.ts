/** The tiles of a box with gas in the kernel's memory; see kernel/tiles.ts for what they are. */
import type { Box } from './box.ts';
import { TILE } from './constants.ts';
import * as H from './header.ts';

const ACTIVE = 3;
const NONE = 255;
/** of an active tile, in tiles of liquid */
const WORK = 4;

/** Tiles of a row, and bytes kept for them: whole words, a mark behind the last tile, and the work in the row. */
const tilesOf = ({ nx }: Box): number => Math.ceil(nx / TILE);
const rowBytes = (box: Box): number => Math.ceil((tilesOf(box) + 8) / 16) * 16 + 16;

/** Bytes that the maps take. */
export function tileBytes(box: Box): [number, number][] {
  return [H.AT_TILES, H.AT_WAS, H.AT_NEAR, H.AT_FLUID].map((at) => [at, box.ny * rowBytes(box)]);
}

/** Every tile that holds fluid begins as an active one, and is looked at in the first step. */
export function writeTiles(box: Box, header: Float64Array): void {
  const { nx, ny, geometry } = box;
  const wide = rowBytes(box);
  const count = tilesOf(box);
  header[H.TILE_STRIDE] = wide;
  header[H.STALE] = 1;
  header[H.ALL_ACTIVE] = box.setup.tiles === false ? 1 : 0;
  const bytes = (at: number): Uint8Array => new Uint8Array(header.buffer, header[at], ny * wide);
  const [tiles, was, fluid] = [bytes(H.AT_TILES), bytes(H.AT_WAS), bytes(H.AT_FLUID)];
  for (let y = 0; y < ny; y++) {
    let work = 0;
    for (let t = 0; t < count; t++) {
      const cells = geometry.fluid.subarray(y * nx + t * TILE, y * nx + Math.min((t + 1) * TILE, nx));
      if (!cells.includes(1)) continue;
      fluid[y * wide + t] = 1;
      tiles[y * wide + t] = was[y * wide + t] = ACTIVE;
      work += WORK;
    }
    new Int32Array(header.buffer, header[H.AT_TILES] + (y + 1) * wide - 4, 1)[0] = work;
    tiles[y * wide + count] = was[y * wide + count] = NONE;
  }
}
