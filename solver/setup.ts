/**
 * What a box of fluid is, in lattice units: cell size 1, time step 1, CS2 = 1/3.
 * x runs along the channel (0 .. nx-1), y across it (0 .. ny-1, from the left wall); the centre of cell (x, y) lies at (x, y),
 * so a halfway wall on the left side lies at y = -1/2.
 */

/** How one side of the box ends. A moving wall slides along itself with `speed` (+x on left/right, +y on bottom/top). */
export type Side = 'periodic' | 'wall' | 'slip' | { speed: number };

export interface Fluid {
  /** density */
  density: number;
  /** dynamic viscosity eta; with a rheology what the box starts with, and what the populations' own small viscosity is a share of */
  viscosity: number;
  /** of a liquid: eta = consistency rate^(index - 1) + yieldStress / rate, bounded below and above */
  rheology?: Rheology;
}

/** A liquid that thins under shear; yieldStress 0 for none. */
interface Rheology {
  consistency: number;
  /** 0.1 to 1 */
  index: number;
  yieldStress: number;
  /** least eta */
  least: number;
  /** most eta over the density; 0.16, all that an explicit viscous force bears, by default */
  most?: number;
}

/** A vector along (x) and across (y) the channel. */
export interface Vector {
  x: number;
  y: number;
}

/** Closes a periodic channel along x by a uniform force on all cells, set anew in every step from the mean of ux. */
export type Drive =
  /** -coefficient * U |U|, U = mean ux: the resistance of the way back through the tank */
  | { kind: 'loss'; coefficient: number }
  /** holds the mean of ux at `target` (a pump) */
  | { kind: 'upflow'; target: number };

export interface Setup {
  nx: number;
  ny: number;
  /** sides at y = -1/2, y = ny - 1/2, x = -1/2, x = nx - 1/2; periodic sides come in pairs */
  sides: { left: Side; right: Side; bottom: Side; top: Side };
  liquid: Fluid;
  /** without a gas the box holds one phase, and phi is 1 everywhere */
  gas?: Fluid;
  /** sigma; needed with a gas */
  surfaceTension?: number;
  /** W, cells; 5 by default */
  interfaceWidth?: number;
  /** M of the interface equation; 0.1 by default */
  mobility?: number;
  /** theta at walls and solids, radians, measured in the liquid; pi/2 by default */
  contactAngle?: number;
  /** 1 where a cell is solid; shape (ny, nx), x contiguous: index y * nx + x */
  solid?: Uint8Array;
  /** which body a solid cell is part of, 1 and up, 0 none; all solids are body 1 without it. The force on each is sampled; shape (ny, nx) */
  bodies?: Uint16Array;
  /**
   * Distance of a point from the faces of the solids, cells, positive in the fluid; asked up to one cell beyond the box. It tells where
   * between a fluid and a solid cell the face lies; without it, halfway
   */
  solidDistance?: (x: number, y: number) => number;
  /** acceleration on (rho - liquid density), times `buoyancy`; the hydrostatic pressure of the liquid is left out of p */
  gravity?: Vector;
  /** factor on the density difference in the buoyancy, where the gas is heavier than the real one; 1 by default */
  buoyancy?: number;
  /** force per volume on all cells */
  force?: Vector;
  drive?: Drive;
  /** share of the gas taken out in each step, per x; shape (nx) */
  skim?: Float64Array;
  /** state at the start as functions of the cell's centre; phi 1, at rest, p 0 by default */
  initial?: {
    phi?: (x: number, y: number) => number;
    velocity?: (x: number, y: number) => Vector;
    pressure?: (x: number, y: number) => number;
  };
  /**
   * Share per step by which the mean of ux over a section that holds liquid alone is drawn to that of all such sections; 0 by
   * default. Between sides that let nothing through they are equal in a liquid that cannot be compressed: what this damps is
   * sound along x, and nothing else.
   */
  soundDamping?: number;
  /** speed above which gas, and gas alone, is held back smoothly: a safety net for its jets; 0.2 by default, Infinity for none */
  gasSpeedLimit?: number;
  /** speed at which a run is stopped as too fast; 0.4 by default */
  speedLimit?: number;
  /** f32 by default; f64 serves validation */
  precision?: 'f32' | 'f64';
  /** false: every cell takes the whole step, also where there is liquid alone; shows what that saves */
  tiles?: boolean;
}
