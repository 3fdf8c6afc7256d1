import type { NdArray } from 'ndarray';
import ndarray from 'ndarray';
import ops from 'ndarray-ops';
import type { Recording, WallSide } from '../../cases/index.ts';

/**
 * One wall of a recording laid out for measures: time is contiguous, and elements that never carry a value are gone.
 * An element is covered (left out) when any of its samples is not finite, which is how a recording marks elements under a fin.
 */
export interface Surface {
  side: WallSide;
  /** the wall carries a membrane */
  membrane: boolean;
  /** index of each open element in the recording; shape (open) */
  elements: Int32Array;
  /** elements of the asked range that a fin covers */
  covered: number;
  samples: number;
  /** time between samples */
  every_s: number;
  /** signed wall shear; shape [open, samples] */
  shear_Pa: NdArray<Float32Array>;
  /** |wall shear|; shape [open, samples] */
  magnitude_Pa: NdArray<Float32Array>;
  /** 1 under gas; shape [open, samples] */
  gas: NdArray<Uint8Array>;
}

/**
 * Lays out all elements of one wall, from the lower end to the upper, bands included. The recording's own arrays are viewed, then turned
 * once so that time is contiguous.
 */
export function layWall(recording: Recording, side: WallSide): Surface {
  const samples = recording.times_s.length;
  const elements = recording.x_m.length;
  const rows = recording.walls[side];
  // views on the recording: [element, sample], nothing copied yet
  const shearView = ndarray(rows.shear_Pa, [samples, elements]).transpose(1, 0);
  const gasView = ndarray(rows.gas, [samples, elements]).transpose(1, 0);

  // one NaN or infinity makes the sum of an element's samples non-finite
  const sums = new Float64Array(elements);
  for (let s = 0; s < samples; s++) for (let e = 0; e < elements; e++) sums[e] += rows.shear_Pa[s * elements + e];
  const open = Int32Array.from(sums.keys()).filter((e) => Number.isFinite(sums[e]));

  const shear_Pa = ndarray(new Float32Array(open.length * samples), [open.length, samples]);
  const magnitude_Pa = ndarray(new Float32Array(open.length * samples), [open.length, samples]);
  const gas = ndarray(new Uint8Array(open.length * samples), [open.length, samples]);
  // runs of neighbouring open elements are turned together: fins part the wall into few runs
  for (let i = 0; i < open.length; ) {
    let n = 1;
    while (i + n < open.length && open[i + n] === open[i] + n) n++;
    ops.assign(shear_Pa.lo(i, 0).hi(n, samples), shearView.lo(open[i], 0).hi(n, samples));
    ops.assign(gas.lo(i, 0).hi(n, samples), gasView.lo(open[i], 0).hi(n, samples));
    i += n;
  }
  ops.abs(magnitude_Pa, shear_Pa);

  return {
    side,
    membrane: recording.case.channel.membranes.includes(side),
    elements: open,
    covered: elements - open.length,
    samples,
    every_s: recording.derived.sampleEvery * recording.derived.dt_s,
    shear_Pa,
    magnitude_Pa,
    gas,
  };
}

/** The elements [first, end) of a wall as views on the same memory. */
export function clip(surface: Surface, range: { first: number; end: number }): Surface {
  const { samples } = surface;
  const from = surface.elements.filter((e) => e < range.first).length;
  const elements = surface.elements.filter((e) => e >= range.first && e < range.end);
  const part = <T extends Float32Array | Uint8Array>(rows: NdArray<T>): NdArray<T> =>
    ndarray(rows.data.subarray(from * samples, (from + elements.length) * samples) as T, [elements.length, samples]);
  return {
    ...surface,
    elements,
    covered: Math.max(0, range.end - range.first) - elements.length,
    shear_Pa: part(surface.shear_Pa),
    magnitude_Pa: part(surface.magnitude_Pa),
    gas: part(surface.gas),
  };
}

/** One element's samples as a plain array over the same memory; `rows` must be contiguous along time, as a {@link Surface}'s are. */
export function series<T extends Float32Array | Uint8Array>(rows: NdArray<T>, element: number): T {
  const samples = rows.shape[1];
  return rows.data.subarray(element * samples, (element + 1) * samples) as T;
}
