import type { NdArray } from 'ndarray';
import type { Setup } from './setup.ts';

/** A row-major field over the box: `get(x, y)`, shape [nx, ny], x contiguous. Valid until the next `advance`. */
export type Field = NdArray<Float32Array | Float64Array>;

/** How `advance` ended. On a failure `x`, `y` name the first bad cell of `step`. */
export type Status = { kind: 'ok'; step: number } | { kind: 'nonFinite' | 'tooFast'; step: number; x: number; y: number; speed: number };

/** A series along time: `get(sample, x)`, shape [samples, nx]. */
export type Rows = NdArray<Float32Array>;

/** `get(sample, body)`, shape [samples, bodies]; body n of the setup is n - 1 here. */
type Forces = NdArray<Float64Array>;

/** What the walls felt, recorded inside the kernel's memory and handed over once. Lattice units. */
export interface Samples {
  /** step of each sample; shape (samples) */
  steps: Float64Array;
  /** viscous stress the fluid exerts along +x on the wall, signed; 0 on elements covered by a solid */
  shear: { left: Rows; right: Rows };
  /** phi at the wall (extrapolated) */
  phi: { left: Rows; right: Rows };
  /** force of the fluid on each body, along and across the channel; see bodyforce.ts */
  force: { x: Forces; y: Forces };
  /** mean of ux over all cells: the volume flux of the section over the gap; shape (samples) */
  upflow: Float64Array;
  /** sum of (1 - phi) over fluid cells, less what this step skims; shape (samples) */
  gasArea: Float64Array;
  /** gas area skimmed since the start; shape (samples) */
  skimmed: Float64Array;
}

export interface Simulation {
  readonly setup: Setup;
  /** steps done since the start */
  readonly step: number;
  /** 1 liquid, 0 gas; solids hold what wetting puts there */
  readonly phi: Field;
  readonly ux: Field;
  readonly uy: Field;
  /** p, less the hydrostatic pressure of the liquid */
  readonly pressure: Field;
  /**
   * Does `steps` steps; a sample is kept after every step whose number is a multiple of `sampleEvery` (0: none).
   * Stops early, with a status, where a value is not finite or a speed passes the limit.
   */
  advance(steps: number, sampleEvery?: number): Status;
  /** The samples since the last call. */
  takeSamples(): Samples;
  /**
   * Puts a round bubble into the liquid: phi falls to the circle's profile where that is lower; velocity and pressure stay,
   * the Laplace pressure sigma / radius is added inside.
   * @returns gas area added
   */
  placeGas(circle: { x: number; y: number; radius: number }): number;
  /** Totals now: gas area, gas area skimmed since the start, mean ux. */
  totals(): { gasArea: number; skimmed: number; upflow: number };
  /** The whole state as bytes; `restore` of it goes on bit for bit. */
  save(): Uint8Array;
  restore(image: Uint8Array): void;
  /** Ends the threads, if there are any; the simulation still goes on, on one. */
  dispose(): void;
}
