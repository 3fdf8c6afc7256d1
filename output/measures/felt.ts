import type { Recording, WallSide } from '../../cases/index.ts';
import { ascending } from './order.ts';
import { clip, layWall, type Surface, series } from './surface.ts';

/** A wall between the bands, with what several measures need of it made once, on first use. */
export interface Felt {
  surface: Surface;
  /** all |tau|, ascending */
  sorted_Pa(): Float32Array;
}

export function felt(surface: Surface): Felt {
  let sorted: Float32Array | undefined;
  return {
    surface,
    sorted_Pa() {
      sorted ??= ascending(surface.magnitude_Pa.data);
      return sorted;
    },
  };
}

/** A wall, or `together`: all membrane walls as one surface. */
export type Place = WallSide | 'together';

export const PLACES: readonly Place[] = ['left', 'right', 'together'];

/** The walls of each place, each wall made once. */
export type Places = Record<Place, readonly Felt[]>;

/** @param surfaces the whole walls, where they are at hand */
export function placesOf(recording: Recording, surfaces?: Record<WallSide, Surface>): Places {
  const between = (side: WallSide): Felt => felt(clip(surfaces?.[side] ?? layWall(recording, side), recording.membrane));
  const walls = { left: between('left'), right: between('right') };
  return { left: [walls.left], right: [walls.right], together: recording.case.channel.membranes.map((side) => walls[side]) };
}

/** Open elements of the walls taken as one surface. */
function openElements(walls: readonly Felt[]): number {
  return walls.reduce((sum, { surface }) => sum + surface.elements.length, 0);
}

/** What a series in time takes from one element: adds to `sums`, one entry per sample. */
export type Adding = (sums: Float64Array, element: { shear_Pa: Float32Array; magnitude_Pa: Float32Array; gas: Uint8Array }) => void;

/**
 * Mean over all open elements of the walls, sample by sample; shape (length), empty where no element is open or `length` is not positive.
 * @param length entries of the series: the samples, or fewer
 */
export function overElements(walls: readonly Felt[], length: number, add: Adding): Float64Array {
  const open = openElements(walls);
  if (open === 0 || length <= 0) return new Float64Array(0);
  const sums = new Float64Array(length);
  for (const { surface } of walls) {
    for (let e = 0; e < surface.elements.length; e++) {
      add(sums, {
        shear_Pa: series(surface.shear_Pa, e),
        magnitude_Pa: series(surface.magnitude_Pa, e),
        gas: series(surface.gas, e),
      });
    }
  }
  for (let i = 0; i < length; i++) sums[i] /= open;
  return sums;
}

/** Samples of a recording; the same on every wall. */
export function samplesOf(walls: readonly Felt[]): number {
  return walls[0].surface.samples;
}
