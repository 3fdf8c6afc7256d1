import ndarray from 'ndarray';
import type { Samples } from './simulation.ts';

/** One sample's rows; shape (nx) each. */
export interface SampleRow {
  shearLeft: Float32Array;
  shearRight: Float32Array;
  phiLeft: Float32Array;
  phiRight: Float32Array;
}

/** Collects samples between two calls of `take`. */
export class Recorder {
  private readonly nx: number;
  /** four rows of nx per sample */
  private rows: Float32Array[] = [];
  /** step, upflow, gas area, gas skimmed per sample */
  private scalars: [number, number, number, number][] = [];

  constructor(nx: number) {
    this.nx = nx;
  }

  /** Opens the next sample; the caller fills the rows. */
  next(step: number, upflow: number, gasArea: number, skimmed: number): SampleRow {
    const { nx } = this;
    const block = new Float32Array(4 * nx);
    this.rows.push(block);
    this.scalars.push([step, upflow, gasArea, skimmed]);
    const part = (n: number) => block.subarray(n * nx, (n + 1) * nx);
    return { shearLeft: part(0), shearRight: part(1), phiLeft: part(2), phiRight: part(3) };
  }

  /** All samples since the last call, and starts anew. */
  take(): Samples {
    const { nx, rows, scalars } = this;
    const n = rows.length;
    const all = new Float32Array(4 * nx * n);
    for (let s = 0; s < n; s++) all.set(rows[s], 4 * nx * s);
    const view = (part: number) => ndarray(all, [n, nx], [4 * nx, 1], part * nx);
    const column = (c: number) => Float64Array.from(scalars, (row) => row[c]);
    this.rows = [];
    this.scalars = [];
    return {
      steps: column(0),
      shear: { left: view(0), right: view(1) },
      phi: { left: view(2), right: view(3) },
      upflow: column(1),
      gasArea: column(2),
      skimmed: column(3),
    };
  }
}
