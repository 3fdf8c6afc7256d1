import ndarray from 'ndarray';
import type { Samples } from './simulation.ts';

/** One sample's rows; shape (nx) each. */
export interface SampleRow {
  shearLeft: Float32Array;
  shearRight: Float32Array;
  phiLeft: Float32Array;
  phiRight: Float32Array;
  /** x and y in turn; shape (bodies, 2) */
  forces: Float64Array;
}

/** Collects samples between two calls of `take`. */
export class Recorder {
  private readonly nx: number;
  private readonly bodies: number;
  /** four rows of nx per sample */
  private rows: Float32Array[] = [];
  private forces: Float64Array[] = [];
  /** step, upflow, gas area, gas skimmed per sample */
  private scalars: [number, number, number, number][] = [];

  constructor(nx: number, bodies: number) {
    this.nx = nx;
    this.bodies = bodies;
  }

  /** Opens the next sample; the caller fills the rows. */
  next(step: number, upflow: number, gasArea: number, skimmed: number): SampleRow {
    const { nx, bodies } = this;
    const block = new Float32Array(4 * nx);
    const forces = new Float64Array(2 * bodies);
    this.rows.push(block);
    this.forces.push(forces);
    this.scalars.push([step, upflow, gasArea, skimmed]);
    const part = (n: number) => block.subarray(n * nx, (n + 1) * nx);
    return { shearLeft: part(0), shearRight: part(1), phiLeft: part(2), phiRight: part(3), forces };
  }

  /** All samples since the last call, and starts anew. */
  take(): Samples {
    const { nx, bodies, rows, scalars } = this;
    const n = rows.length;
    const all = new Float32Array(4 * nx * n);
    for (let s = 0; s < n; s++) all.set(rows[s], 4 * nx * s);
    const forces = new Float64Array(2 * bodies * n);
    this.forces.forEach((row, s) => {
      forces.set(row, 2 * bodies * s);
    });
    const component = (c: number) => ndarray(forces, [n, bodies], [2 * bodies, 2], c);
    const view = (part: number) => ndarray(all, [n, nx], [4 * nx, 1], part * nx);
    const column = (c: number) => Float64Array.from(scalars, (row) => row[c]);
    this.rows = [];
    this.forces = [];
    this.scalars = [];
    return {
      steps: column(0),
      shear: { left: view(0), right: view(1) },
      phi: { left: view(2), right: view(3) },
      force: { x: component(0), y: component(1) },
      upflow: column(1),
      gasArea: column(2),
      skimmed: column(3),
    };
  }
}
