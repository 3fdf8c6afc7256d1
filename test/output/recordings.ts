import type { Case, Derived, Recording, WallSide } from '../../cases/index.ts';

/** What a made recording differs in from a plain one of 10 elements (8 in the membrane) and 20 samples, still water. */
export interface Making {
  elements?: number;
  samples?: number;
  every_s?: number;
  membrane?: { first: number; end: number };
  membranes?: WallSide[];
  complete?: boolean;
  softened?: boolean;
  swept?: { above_Pa: number; within_s: number };
  tilt_rad?: number;
  air?: Partial<Case['air']>;
  liquid?: Case['liquid'];
  particles?: Case['particles'];
  deposit?: Case['deposit'];
  across?: number;
  /** signed shear in Pa of wall, sample and element */
  shear?: (side: WallSide, sample: number, element: number) => number;
  gas?: (side: WallSide, sample: number, element: number) => boolean;
}

/** Cell size of made recordings. */
const CELL_M = 2e-4;

/** A recording whose every entry is known, on cells of 0.2 mm; sampling starts at 1 s. */
export function makeRecording(making: Making = {}): Recording {
  const elements = making.elements ?? 10;
  const samples = making.samples ?? 20;
  const every_s = making.every_s ?? 0.01;
  const across = making.across ?? 8;
  const shear = making.shear ?? (() => 0);
  const gas = making.gas ?? (() => false);
  const membrane = making.membrane ?? { first: 1, end: elements - 1 };
  const rows = (side: WallSide) => {
    const wall = { shear_Pa: new Float32Array(samples * elements), gas: new Uint8Array(samples * elements) };
    for (let s = 0; s < samples; s++) {
      for (let e = 0; e < elements; e++) {
        wall.shear_Pa[s * elements + e] = shear(side, s, e);
        wall.gas[s * elements + e] = gas(side, s, e) ? 1 : 0;
      }
    }
    return wall;
  };
  const panel: Case = {
    title: 'Made panel',
    channel: {
      gap_m: across * CELL_M,
      height_m: elements * CELL_M,
      tilt_rad: making.tilt_rad ?? 0,
      membranes: making.membranes ?? ['left', 'right'],
      return: { loss: 1.5 },
    },
    fins: [],
    liquid: making.liquid ?? { kind: 'custom', density_kg_m3: 1000, viscosity_Pa_s: 1e-3 },
    surfaceTension_N_m: 0.072,
    contactAngle_rad: 1,
    gas: {
      supply_m_s: 1e-4,
      serves_m: 1,
      bubble: { diameter_m: 5e-3, kinds: [{ diameter_m: 5e-3, spread: 0.15, share: 1 }] },
      across: 'even',
      start: [],
      seed: 7,
      density_kg_m3: making.softened ? 20 : 1.2,
      viscosity_Pa_s: making.softened ? 2e-4 : 1.8e-5,
      airDensity_kg_m3: 1.2,
      softened: making.softened ?? false,
    },
    grid: { across, speed_m_s: 0.3 },
    record: { settle_s: 1, span_s: samples * every_s, every_s },
    swept: making.swept ?? { above_Pa: 0.5, within_s: 0.05 },
    air: { depth_m: 2.5, losses_m: 1, efficiency: 0.6, inlet_K: 293.15, ...making.air },
    particles: making.particles ?? { length_m: 1, wallToBulk: 60 },
    ...(making.deposit === undefined ? {} : { deposit: making.deposit }),
  };
  const derived: Derived = {
    nx: elements,
    ny: across,
    dx_m: CELL_M,
    dt_s: every_s / 10,
    steps: Math.round((1 + samples * every_s) / (every_s / 10)),
    sampleEvery: 10,
    tauLiquid: 0.503,
    tauGas: 0.55,
    densityRatio: 50,
    Re: 1000,
    Eo: 3.4,
    Mo: 2.6e-11,
    meanSupply_m_s: 1e-4,
    bubblesPerSecond: 5,
    gasVelocity_m_s: 0.014,
    cellsPerBubble: 25,
    unit: { velocity_m_s: 15, stress_Pa: 225_000, area_m2: CELL_M ** 2 },
    release: { from_m: 0, to_m: membrane.first * CELL_M },
    skim: { from_m: membrane.end * CELL_M, to_m: elements * CELL_M },
  };
  return {
    case: panel,
    derived,
    complete: making.complete ?? true,
    ended: making.complete === false ? 'stopped' : 'span',
    x_m: Float64Array.from({ length: elements }, (_, e) => (e + 0.5) * CELL_M),
    membrane,
    times_s: Float64Array.from({ length: samples }, (_, s) => 1 + (s + 1) * every_s),
    walls: { left: rows('left'), right: rows('right') },
    fins: { along_N_m: new Float64Array(), across_N_m: new Float64Array() },
    history: {
      time_s: [0, 0.5],
      holdup: [0, 0.05],
      upflow_m_s: [0, 0.1],
      released_m2: [0, 2e-5],
      skimmed_m2: [0, 1e-5],
      present_m2: [0, 1e-5],
    },
    bubbles: [{ time_s: 0.5, bubble: 3, area_m2: 1e-5, x_m: 0.01, y_m: 0.004, ux_m_s: 0.25, uy_m_s: -0.01 }],
  };
}
