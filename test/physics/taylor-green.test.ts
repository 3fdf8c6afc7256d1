import { describe, expect, it } from 'vitest';
import { order } from './channel.ts';
import { taylorGreen } from './checks/taylor-green.ts';

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
