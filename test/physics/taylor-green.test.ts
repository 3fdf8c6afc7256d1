import { describe, expect, it } from 'vitest';
import { createSimulation } from '../../solver/index.ts';
import { order, PERIODIC, settle } from './channel.ts';

/**
 * Taylor-Green vortices in a box of N cells: u = -u0 cos(kx) sin(ky), v = u0 sin(kx) cos(ky), p = -rho u0^2/4 (cos 2kx + cos 2ky),
 * velocity decays with exp(-2 nu k^2 t). REFERENCES section 3 (textbook solution).
 * Viscosity kept, u0 with 1/N, time with N^2: the same flow on finer grids, compressibility falling with the square as well.
 * @returns error of the velocity field over the amplitude at that time, and the measured decay exponent over the exact one
 */
async function taylorGreen(N: number, nu: number): Promise<{ error: number; decay: number }> {
  const k = (2 * Math.PI) / N;
  const u0 = 0.64 / N;
  const steps = Math.round(100 * (N / 16) ** 2);
  const velocity = (x: number, y: number) => ({ x: -u0 * Math.cos(k * x) * Math.sin(k * y), y: u0 * Math.sin(k * x) * Math.cos(k * y) });
  const pressure = (x: number, y: number) => (-u0 * u0 * (Math.cos(2 * k * x) + Math.cos(2 * k * y))) / 4;
  const liquid = { density: 1, viscosity: nu };
  const s = await createSimulation({ nx: N, ny: N, sides: PERIODIC, liquid, precision: 'f64', initial: { velocity, pressure } });
  settle(s, steps);
  const left = Math.exp(-2 * nu * k * k * steps);
  let squares = 0;
  let energy = 0;
  for (let y = 0; y < N; y++) {
    for (let x = 0; x < N; x++) {
      const exact = velocity(x, y);
      squares += (s.ux.get(x, y) - left * exact.x) ** 2 + (s.uy.get(x, y) - left * exact.y) ** 2;
      energy += s.ux.get(x, y) ** 2 + s.uy.get(x, y) ** 2;
    }
  }
  const amplitude = Math.sqrt((2 * energy) / (N * N));
  return { error: Math.sqrt(squares / (N * N)) / (u0 * left), decay: Math.log(amplitude / u0) / Math.log(left) };
}

describe('Taylor-Green vortices', () => {
  it.each([0.02, 0.05, 0.1])('decay with second order on 16, 32 and 64 cells, at viscosity %d', async (nu) => {
    const [a, b, c] = [await taylorGreen(16, nu), await taylorGreen(32, nu), await taylorGreen(64, nu)];
    // seen 1.998 to 2.001; error 0.9e-3 to 1.1e-3, decay 2.5e-3 off at 64 cells
    expect(Math.abs(order(a.error, b.error) - 2)).toBeLessThan(0.02);
    expect(Math.abs(order(b.error, c.error) - 2)).toBeLessThan(0.02);
    expect(c.error).toBeLessThan(2e-3);
    expect(Math.abs(c.decay - 1)).toBeLessThan(5e-3);
  });
});
