import type { Case, Recording } from '../../cases/index.ts';
import { type Estimate, exactly, NO_ESTIMATE } from './estimate.ts';

/** Gas constant, J/(mol K); molar mass of air, kg/mol; standard atmosphere, Pa; standard gravity, m/s2. */
const GAS_CONSTANT = 8.314;
const MOLAR_MASS_kg_mol = 0.02897;
const ATMOSPHERE_Pa = 101_325;
const GRAVITY_m_s2 = 9.80665;

/** (kappa - 1) / kappa of air, as blower formulas print it. */
const ADIABATIC = 0.283;

/** What the air of a panel costs, per membrane area. */
export interface AirMeasures {
  /** mean over the times with air and without, m3/(m2 s), counted at the atmosphere and the liquid's temperature */
  supply_m_s: number;
  /** that the blower has to make: depth and losses */
  overpressure_Pa: number;
  power_W_m2: number;
  /** per volume of permeate; null where the case gives no flux */
  energy_J_m3: number | null;
}

/** Pressure above the atmosphere that a blower has to make, Pa: rho g (depth + losses). */
export function overpressure_Pa(air: Pick<Case['air'], 'depth_m' | 'losses_m'>, density_kg_m3: number): number {
  return density_kg_m3 * GRAVITY_m_s2 * (air.depth_m + air.losses_m);
}

/**
 * Power of a blower that compresses adiabatically from the atmosphere: w R T1 / (M 0.283 e) ((p2/p1)^0.283 - 1).
 * @param flow w, kg/s; the power is in W, or kg/(m2 s) and W/m2
 * @param over_Pa p2 - p1
 * @see Tchobanoglous, Burton & Stensel 2003, Wastewater Engineering (Metcalf & Eddy), chapter 5 [M]; the form is in several texts [L]
 */
export function blowerPower(flow: number, over_Pa: number, { efficiency, inlet_K }: Pick<Case['air'], 'efficiency' | 'inlet_K'>): number {
  const perMass_J_kg = (GAS_CONSTANT * inlet_K) / (MOLAR_MASS_kg_mol * ADIABATIC);
  return (flow / efficiency) * perMass_J_kg * ((1 + over_Pa / ATMOSPHERE_Pa) ** ADIABATIC - 1);
}

/**
 * What the air costs. Left out: that the air is denser at the depth of the nozzles than at the atmosphere, for which supplies are told;
 * moisture; the working point of a real blower; air lost beside the panels.
 */
export function airMeasures({ case: { air, gas, liquid }, derived }: Pick<Recording, 'case' | 'derived'>): AirMeasures {
  const supply_m_s = derived.meanSupply_m_s;
  const over_Pa = overpressure_Pa(air, liquid.density_kg_m3);
  const power_W_m2 = blowerPower(supply_m_s * gas.airDensity_kg_m3, over_Pa, air);
  return { supply_m_s, overpressure_Pa: over_Pa, power_W_m2, energy_J_m3: air.flux_m_s === undefined ? null : power_W_m2 / air.flux_m_s };
}

/** Blower power per membrane area, W/m2: follows from the case alone. */
export function airPower(recording: Recording): Estimate {
  return exactly(airMeasures(recording).power_W_m2);
}

/** Blower energy per volume of permeate, J/m3; none where the case gives no flux. */
export function airEnergy(recording: Recording): Estimate {
  const { energy_J_m3 } = airMeasures(recording);
  return energy_J_m3 === null ? NO_ESTIMATE : exactly(energy_J_m3);
}

/** A measure over the air's power, which is exact; none without air. */
export function perPower(estimate: Estimate, recording: Recording): Estimate {
  const { power_W_m2 } = airMeasures(recording);
  if (estimate.value === null || power_W_m2 === 0) return NO_ESTIMATE;
  return { ...estimate, value: estimate.value / power_W_m2, at: (mean) => estimate.at(mean) / power_W_m2 };
}
