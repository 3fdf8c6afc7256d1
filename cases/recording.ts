import type { Case, WallSide } from './case.ts';
import type { Derived } from './scale.ts';

/** What a run hands back, in SI: the only thing measures are made from. */
export interface Recording {
  case: Case;
  derived: Derived;
  /** false while the asked span is not yet recorded */
  complete: boolean;
  /** by what it ended: its span; measures that are sure; the most to be recorded, without that; a signal, before any of these */
  ended: 'span' | 'sure' | 'atMost' | 'stopped';
  /** centres of the wall elements along the channel, over the whole height; shape (elements) */
  x_m: Float64Array;
  /** elements that count: release and skim bands left out, [first, end) */
  membrane: { first: number; end: number };
  /** time since the start of each wall sample, all after settling; shape (samples) */
  times_s: Float64Array;
  /** both walls, whether or not they carry a membrane */
  walls: Record<WallSide, WallRows>;
  fins: FinRows;
  /** from the start on, settling included */
  history: History;
  /** one row per bubble and observation */
  bubbles: BubbleRow[];
}

/** Shape (samples, elements), row-major. */
interface WallRows {
  /** wall shear stress with sign, upward positive; NaN on elements under a fin */
  shear_Pa: Float32Array;
  /** 1 where gas touches the element */
  gas: Uint8Array;
}

/**
 * Force of liquid and gas on each fin, in the order of the case, per metre of the sheet's width; shape (samples, fins), row-major. Without
 * the buoyancy of the fin in the liquid.
 */
interface FinRows {
  /** upward positive */
  along_N_m: Float64Array;
  /** towards the right wall positive */
  across_N_m: Float64Array;
}

/** Columns of equal length. */
export interface History {
  time_s: number[];
  /** share of the channel's free area that is gas */
  holdup: number[];
  /** superficial velocity of the loop */
  upflow_m_s: number[];
  /** gas areas of the plane section: let in, taken out at the top, in the channel */
  released_m2: number[];
  skimmed_m2: number[];
  present_m2: number[];
}

/** A bubble seen at one time: a connected patch of gas. */
export interface BubbleRow {
  time_s: number;
  /** stays the same while the bubble can be followed */
  bubble: number;
  area_m2: number;
  x_m: number;
  y_m: number;
  /** mean of the gas velocity */
  ux_m_s: number;
  uy_m_s: number;
}

/** A picture's worth of the state at one time, SI; shape (ny, nx), row-major. Valid during the call only. */
export interface Snapshot {
  time_s: number;
  nx: number;
  ny: number;
  phi: Float32Array;
  ux_m_s: Float32Array;
  uy_m_s: Float32Array;
  /** 1 in solids */
  solid: Uint8Array;
}

/** State to go on from; plain data, so that a room further right can write it to a file. */
export interface Checkpoint {
  step: number;
  /** the solver's own image */
  solver: Uint8Array;
  /** all the rest, JSON; typed arrays are kept beside it in `arrays` */
  json: string;
  arrays: Record<string, Float32Array | Float64Array | Uint8Array>;
}

/** How a caller follows and steers `simulate`. Every hook may be left out. */
export interface Hooks {
  /** goes on from here instead of the start */
  resume?: Checkpoint;
  /** time between snapshots; none without it */
  frameEvery_s?: number;
  onFrame?: (snapshot: Snapshot) => void | Promise<void>;
  onProgress?: (progress: Progress) => void;
  /** most threads to compute with, 1 without it; the recording has the same bits for any number */
  threads?: number;
  /** least wall-clock time between checkpoints, s */
  checkpointEvery_s?: number;
  onCheckpoint?: (checkpoint: Checkpoint) => void | Promise<void>;
  /**
   * Says of a recording with `record.until` whether its measures are sure; asked at step numbers fixed by the case, must depend on the
   * recording alone. Without it such a case is recorded to its most.
   */
  sureEnough?: (recording: Recording) => boolean;
  /** stops at the next event; a last checkpoint is handed over and the recording comes back incomplete */
  signal?: AbortSignal;
}

export interface Progress {
  step: number;
  steps: number;
  time_s: number;
  holdup: number;
  upflow_m_s: number;
}
