import { describe, expect, it } from 'vitest';
import {
  airDensity_kg_m3,
  airViscosity_Pa_s,
  waterDensity_kg_m3,
  waterSurfaceTension_N_m,
  waterViscosity_Pa_s,
} from '../../cases/fluids.ts';

const kelvin = (celsius: number): number => celsius + 273.15;

describe('water and air', () => {
  it('have the viscosity of the table in IAPWS R12-08 at 298.15 K and 998 kg/m3', () => {
    // IAPWS R12-08, table of check values [L]: 889.735100 uPa s
    expect(waterViscosity_Pa_s(298.15, 998) * 1e6).toBeCloseTo(889.7351, 6);
  });

  it('have the surface tension of IAPWS R1-76(2014) at 300 K', () => {
    // check value [L]: 0.0716859625 N/m
    expect(waterSurfaceTension_N_m(300)).toBeCloseTo(0.0716859625, 10);
  });

  // Tanaka et al. 2001, Metrologia 38, 301; IAPWS R12-08 at that density; IAPWS R1-76; ideal gas; Sutherland [L, air viscosity M].
  // Tolerance: half a unit of the last figure given.
  it.each([
    [10, 999.703, 1.3059, 74.221, 1.2466, 17.65],
    [20, 998.207, 1.0016, 72.736, 1.2041, 18.13],
    [25, 997.047, 0.89002, 71.972, 1.1839, 18.37],
    [30, 995.649, 0.79722, 71.194, 1.1644, 18.61],
  ])('have the published values at %d degC', (t, rho, eta_mPa_s, sigma_mN_m, rhoAir, etaAir_uPa_s) => {
    expect(waterDensity_kg_m3(kelvin(t))).toBeCloseTo(rho, 3);
    expect(Math.abs(waterViscosity_Pa_s(kelvin(t)) * 1e3 - eta_mPa_s)).toBeLessThan(1e-5);
    expect(Math.abs(waterSurfaceTension_N_m(kelvin(t)) * 1e3 - sigma_mN_m)).toBeLessThan(6e-4);
    expect(Math.abs(airDensity_kg_m3(kelvin(t)) - rhoAir)).toBeLessThan(6e-5);
    expect(Math.abs(airViscosity_Pa_s(kelvin(t)) * 1e6 - etaAir_uPa_s)).toBeLessThan(6e-3);
  });

  it('stay near common table values at 60 degC, where the density formula is followed beyond its range', () => {
    // 983.20 kg/m3, 0.466 mPa s, 66.24 mN/m [M]
    expect(Math.abs(waterDensity_kg_m3(kelvin(60)) - 983.2)).toBeLessThan(0.1);
    expect(Math.abs(waterViscosity_Pa_s(kelvin(60)) * 1e3 - 0.466)).toBeLessThan(1e-3);
    expect(Math.abs(waterSurfaceTension_N_m(kelvin(60)) * 1e3 - 66.24)).toBeLessThan(0.02);
  });
});
