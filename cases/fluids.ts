/** Properties of water and air at 101325 Pa against temperature, from published correlations. SI; temperatures in K. */

const ICE_POINT_K = 273.15;
const CRITICAL_K = 647.096;
const CRITICAL_DENSITY_kg_m3 = 322;

/**
 * Density of air-free water, 0 to 40 degC; followed to 60 degC, where it is 0.02 kg/m3 low.
 * @see Tanaka, Girard, Davis, Peuto & Bignell 2001, Metrologia 38, 301, eq. 1 (constants from memory; checked against table values)
 */
export function waterDensity_kg_m3(temperature_K: number): number {
  const t = temperature_K - ICE_POINT_K;
  const a = t - 3.983035;
  return 999.97495 * (1 - (a * a * (t + 301.797)) / (522528.9 * (t + 69.34881)));
}

/** H_i of mu0, and [i, j, H_ij] of mu1. */
const DILUTE = [1.67752, 2.20462, 0.6366564, -0.241605];
const DENSE: readonly (readonly [number, number, number])[] = [
  [0, 0, 5.20094e-1],
  [1, 0, 8.50895e-2],
  [2, 0, -1.08374],
  [3, 0, -2.89555e-1],
  [0, 1, 2.22531e-1],
  [1, 1, 9.99115e-1],
  [2, 1, 1.88797],
  [3, 1, 1.26613],
  [5, 1, 1.20573e-1],
  [0, 2, -2.81378e-1],
  [1, 2, -9.06851e-1],
  [2, 2, -7.72479e-1],
  [3, 2, -4.89837e-1],
  [4, 2, -2.5704e-1],
  [0, 3, 1.61913e-1],
  [1, 3, 2.57399e-1],
  [0, 4, -3.25372e-2],
  [3, 4, 6.98452e-2],
  [4, 5, 8.72102e-3],
  [3, 6, -4.35673e-3],
  [5, 6, -5.93264e-4],
];

/**
 * Dynamic viscosity of water: eta = 1 uPa s * mu0(T) * mu1(T, rho), without the enhancement at the critical point.
 * @see IAPWS R12-08, eqs. 10 to 12 (constants from memory; checked against the release's own table value)
 */
export function waterViscosity_Pa_s(temperature_K: number, density_kg_m3 = waterDensity_kg_m3(temperature_K)): number {
  const t = temperature_K / CRITICAL_K;
  const d = density_kg_m3 / CRITICAL_DENSITY_kg_m3;
  const dilute = (100 * Math.sqrt(t)) / DILUTE.reduce((sum, h, i) => sum + h / t ** i, 0);
  const dense = Math.exp(d * DENSE.reduce((sum, [i, j, h]) => sum + h * (1 / t - 1) ** i * (d - 1) ** j, 0));
  return 1e-6 * dilute * dense;
}

/**
 * Surface tension of water against its vapour or air: 235.8 mN/m * x^1.256 (1 - 0.625 x), x = 1 - T/Tc.
 * @see IAPWS R1-76(2014) (from memory; checked against a table value)
 */
export function waterSurfaceTension_N_m(temperature_K: number): number {
  const x = 1 - temperature_K / CRITICAL_K;
  return 0.2358 * x ** 1.256 * (1 - 0.625 * x);
}

/** Density of dry air as an ideal gas, R = 287.055 J/(kg K). */
export function airDensity_kg_m3(temperature_K: number): number {
  return 101325 / (287.055 * temperature_K);
}

/** Dynamic viscosity of air by Sutherland's law: 1.716e-5 Pa s at 273.15 K, S = 110.4 K (common constants, from memory). */
export function airViscosity_Pa_s(temperature_K: number): number {
  return 1.716e-5 * (temperature_K / ICE_POINT_K) ** 1.5 * ((ICE_POINT_K + 110.4) / (temperature_K + 110.4));
}
