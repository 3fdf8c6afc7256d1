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

/** Elements [first, end) of a recording's wall. */
export interface Range {
  first: number;
  end: number;
}

/**
 * Lays out the elements of `range` on one wall; the recording's own arrays are viewed, then turned once so that time is contiguous.
 * @param range membrane elements by default
 */
export function layWall(recording: Recording, side: WallSide, range: Range = recording.membrane): Surface {
  const samples = recording.times_s.length;
  const elements = recording.x_m.length;
  const rows = recording.walls[side];
  const asked = Math.max(0, range.end - range.first);
  // views on the recording: [element, sample], nothing copied yet
  const shearView = ndarray(rows.shear_Pa, [samples, elements]).lo(0, range.first).hi(samples, asked).transpose(1, 0);
  const gasView = ndarray(rows.gas, [samples, elements]).lo(0, range.first).hi(samples, asked).transpose(1, 0);

  const open: number[] = [];
  for (let e = 0; e < asked; e++) {
    // one NaN or infinity makes the sum non-finite
    if (Number.isFinite(ops.sum(shearView.pick(e, null)))) open.push(e);
  }

  const shear_Pa = ndarray(new Float32Array(open.length * samples), [open.length, samples]);
  const magnitude_Pa = ndarray(new Float32Array(open.length * samples), [open.length, samples]);
  const gas = ndarray(new Uint8Array(open.length * samples), [open.length, samples]);
  // runs of neighbouring open elements are turned together: a fin parts the wall into few runs
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
    elements: Int32Array.from(open, (e) => e + range.first),
    covered: asked - open.length,
    samples,
    every_s: recording.derived.sampleEvery * recording.derived.dt_s,
    shear_Pa,
    magnitude_Pa,
    gas,
  };
}

/** One element's samples as a plain array over the same memory; `rows` must be contiguous along time, as a {@link Surface}'s are. */
export function series<T extends Float32Array | Uint8Array>(rows: NdArray<T>, element: number): T {
  const samples = rows.shape[1];
  return rows.data.subarray(element * samples, (element + 1) * samples) as T;
}
