/** From SI to the lattice: the one place where units are converted. Lattice density 1 is the liquid's, length 1 a cell, time 1 a step. */
import type { Setup } from '../solver/index.ts';
import { bandsOf, gridOf, skimRates, stepsOf } from './bands.ts';
import type { Case, Rheology } from './case.ts';
import { finDistance, finNumbers, solidCells } from './fins.ts';
import { fitting_m } from './gas.ts';
import { meanArea_m2 } from './mixture.ts';
import { onShare } from './pulse.ts';
import { rateOf_1_s } from './thinning.ts';

/** Sizes and numbers that follow from a case; all the conversion factors there are. */
export interface Derived {
  nx: number;
  ny: number;
  dx_m: number;
  dt_s: number;
  /** steps of settling and recording together; steps between wall samples */
  steps: number;
  sampleEvery: number;
  /** at 100 1/s where the liquid thins */
  tauLiquid: number;
  /** of a liquid that thins: the thickest it is computed, and the shear rate below which that bites */
  thickest?: { viscosity_Pa_s: number; below_1_s: number };
  tauGas: number;
  densityRatio: number;
  /** of the mean diameter of the bubbles let in and the expected rise speed */
  Re: number;
  Eo: number;
  Mo: number;
  /** means over the times with air and without: air per membrane area (m3/(m2 s)), bubbles let in, superficial gas velocity */
  meanSupply_m_s: number;
  bubblesPerSecond: number;
  gasVelocity_m_s: number;
  /** cells across a bubble of the mean diameter, of the smallest kind */
  cellsPerBubble: number;
  /** SI value of one lattice unit */
  unit: { velocity_m_s: number; stress_Pa: number; area_m2: number };
  /** along the channel */
  release: { from_m: number; to_m: number };
  skim: { from_m: number; to_m: number };
}

/** Standard gravity, m/s2. */
const GRAVITY_m_s2 = 9.80665;

/** Interface width W, cells, and mobility M: what held in trials of air and water. */
const INTERFACE_WIDTH = 5;
const MOBILITY = 0.1;

/** Share of a section's surplus flux taken out per step: sound along a channel of 0.1 m is gone within some ten milliseconds. */
const SOUND_DAMPING = 0.01;

/**
 * The lattice box of a case and the numbers that go with it. The computed height is `nx * dx_m`: the asked one rounded to whole cells.
 * Buoyancy acts with the density difference of liquid and real air, whatever density the gas is computed with.
 */
export function layOut(panel: Case): { setup: Setup; derived: Derived } {
  const derived = derive(panel);
  const { nx, ny, dx_m, dt_s } = derived;
  const rhoLiquid = panel.liquid.density_kg_m3;
  const viscosity = (eta_Pa_s: number): number => (eta_Pa_s * dt_s) / (rhoLiquid * dx_m ** 2);
  const surfaceTension = (panel.surfaceTension_N_m * dt_s ** 2) / (rhoLiquid * dx_m ** 3);
  const g = (GRAVITY_m_s2 * dt_s ** 2) / dx_m;
  const gasDensity = panel.gas.density_kg_m3 / rhoLiquid;
  const setup: Setup = {
    nx,
    ny,
    sides: { left: 'wall', right: 'wall', bottom: 'periodic', top: 'periodic' },
    liquid: { density: 1, viscosity: viscosity(panel.liquid.viscosity_Pa_s), ...rheologyOf(panel.liquid.rheology, viscosity, dt_s) },
    gas: { density: gasDensity, viscosity: viscosity(panel.gas.viscosity_Pa_s) },
    surfaceTension,
    interfaceWidth: INTERFACE_WIDTH,
    mobility: MOBILITY,
    soundDamping: SOUND_DAMPING,
    contactAngle: panel.contactAngle_rad,
    ...finsOf(panel, derived),
    gravity: { x: -g * Math.cos(panel.channel.tilt_rad), y: 0 - g * Math.sin(panel.channel.tilt_rad) },
    buoyancy: (rhoLiquid - panel.gas.airDensity_kg_m3) / (rhoLiquid - panel.gas.density_kg_m3),
    drive: driveOf(panel, derived),
    skim: skimRates(panel),
    ...startOf(panel, dx_m, surfaceTension),
  };
  return { setup, derived };
}

/** Shear rates times the step make lattice rates, viscosities go with `viscosity`. */
function rheologyOf(
  rheology: Rheology | undefined,
  viscosity: (eta_Pa_s: number) => number,
  dt_s: number,
): Pick<Setup['liquid'], 'rheology'> {
  if (rheology === undefined) return {};
  const { consistency_Pa_sn, index, yieldStress_Pa, least_Pa_s } = rheology;
  const consistency = viscosity(consistency_Pa_sn) * dt_s ** (1 - index);
  return { rheology: { consistency, index, yieldStress: viscosity(yieldStress_Pa) * dt_s, least: viscosity(least_Pa_s) } };
}

function finsOf({ fins }: Case, { nx, ny, dx_m }: Derived): Pick<Setup, 'solid' | 'bodies' | 'solidDistance'> {
  if (fins.length === 0) return {};
  return { solid: solidCells(fins, nx, ny, dx_m), bodies: finNumbers(fins, nx, ny, dx_m), solidDistance: finDistance(fins, dx_m) };
}

function driveOf({ channel }: Case, { nx, unit }: Derived): NonNullable<Setup['drive']> {
  if ('upflow_m_s' in channel.return) return { kind: 'upflow', target: channel.return.upflow_m_s / unit.velocity_m_s };
  return { kind: 'loss', coefficient: channel.return.loss / (2 * nx) };
}

/** Bubbles at the start: the equilibrium profile of each, and the Laplace pressure in it. */
function startOf({ gas }: Case, dx_m: number, surfaceTension: number): Pick<Setup, 'initial'> {
  if (gas.start.length === 0) return {};
  const circles = gas.start.map(({ across_m, along_m, diameter_m }) => ({
    x: along_m / dx_m - 0.5,
    y: across_m / dx_m - 0.5,
    radius: diameter_m / 2 / dx_m,
  }));
  const liquid = (x: number, y: number, circle: { x: number; y: number; radius: number }): number =>
    0.5 + 0.5 * Math.tanh((2 * (Math.hypot(x - circle.x, y - circle.y) - circle.radius)) / INTERFACE_WIDTH);
  return {
    initial: {
      phi: (x, y) => circles.reduce((least, circle) => Math.min(least, liquid(x, y, circle)), 1),
      pressure: (x, y) => circles.reduce((sum, circle) => sum + (surfaceTension / circle.radius) * (1 - liquid(x, y, circle)), 0),
    },
  };
}

function derive(panel: Case): Derived {
  const { channel, liquid, gas, surfaceTension_N_m } = panel;
  const { nx, ny, dx_m, dt_s } = gridOf(panel);
  const { sampleEvery, settle, span } = stepsOf(panel);
  const tau = (eta_Pa_s: number, density_kg_m3: number): number => 0.5 + (3 * (eta_Pa_s / density_kg_m3) * dt_s) / dx_m ** 2;
  const diameter_m = gas.bubble.diameter_m;
  const difference_kg_m3 = liquid.density_kg_m3 - gas.airDensity_kg_m3;
  const meanSupply_m_s = gas.supply_m_s * onShare(gas);
  const gasVelocity_m_s = (meanSupply_m_s * channel.membranes.length * gas.serves_m) / channel.gap_m;
  const area_m2 = gas.bubble.kinds.reduce((sum, kind) => sum + kind.share * meanArea_m2(kind, fitting_m(panel)), 0);
  return {
    nx,
    ny,
    dx_m,
    dt_s,
    steps: settle + span,
    sampleEvery,
    tauLiquid: tau(liquid.viscosity_Pa_s, liquid.density_kg_m3),
    tauGas: tau(gas.viscosity_Pa_s, gas.density_kg_m3),
    ...thickestOf(liquid, dx_m, dt_s),
    densityRatio: liquid.density_kg_m3 / gas.density_kg_m3,
    Re: (liquid.density_kg_m3 * riseSpeed_m_s(panel) * diameter_m) / liquid.viscosity_Pa_s,
    Eo: (difference_kg_m3 * GRAVITY_m_s2 * diameter_m ** 2) / surfaceTension_N_m,
    Mo: (GRAVITY_m_s2 * liquid.viscosity_Pa_s ** 4 * difference_kg_m3) / (liquid.density_kg_m3 ** 2 * surfaceTension_N_m ** 3),
    meanSupply_m_s,
    bubblesPerSecond: (gasVelocity_m_s * channel.gap_m) / area_m2,
    gasVelocity_m_s,
    cellsPerBubble: Math.min(...gas.bubble.kinds.map((kind) => kind.diameter_m)) / dx_m,
    unit: { velocity_m_s: dx_m / dt_s, stress_Pa: liquid.density_kg_m3 * (dx_m / dt_s) ** 2, area_m2: dx_m ** 2 },
    ...bandsOf(panel),
  };
}

/** Most kinematic viscosity the solver carries beside gas, lattice units. */
const MOST_NU = 0.16;

function thickestOf({ rheology, density_kg_m3 }: Case['liquid'], dx_m: number, dt_s: number): Pick<Derived, 'thickest'> {
  if (rheology === undefined) return {};
  const viscosity_Pa_s = (MOST_NU * density_kg_m3 * dx_m ** 2) / dt_s;
  return { thickest: { viscosity_Pa_s, below_1_s: rateOf_1_s(rheology, viscosity_Pa_s) } };
}

/**
 * What a plane bubble is expected to rise with: the slower of a cap, 0.5 sqrt(g R) (Collins 1965, from memory), and a long bubble
 * that fills the gap, 0.23 sqrt(g gap) (Vanden-Broeck 1984, Phys. Fluids 27, 2604), g along the channel.
 */
function riseSpeed_m_s({ channel, gas }: Case): number {
  const g = GRAVITY_m_s2 * Math.cos(channel.tilt_rad);
  return Math.min(0.5 * Math.sqrt((g * gas.bubble.diameter_m) / 2), 0.23 * Math.sqrt(g * channel.gap_m));
}
