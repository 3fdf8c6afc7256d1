import { describe, expect, it } from 'vitest';
import { ANSWERS, oscillation, stepResponse } from './checks/oscillating.ts';

describe('a channel under an oscillating pressure gradient', () => {
  it.each(ANSWERS)('has the wall shear of the exact solution at Wo $Wo, closer by the square of the cell size', async (answer) => {
    const errors: { size: number; phase_deg: number }[] = [];
    for (const N of [16, 32]) {
      const seen = oscillation(await stepResponse(N), N, answer.Wo);
      errors.push({ size: Math.abs(seen.amplitude / answer.amplitude - 1), phase_deg: Math.abs(seen.phase_deg - answer.phase_deg) });
    }
    // seen at 32 cells: amplitude 1e-5, 2.3e-4, 2.2e-3; phase 0.10, 0.39, 1.48 degrees, of order 1.9 to 2
    expect(errors[1].size).toBeLessThan(3e-3);
    expect(errors[1].phase_deg).toBeLessThan(2);
    expect(Math.log2(errors[0].phase_deg / errors[1].phase_deg)).toBeGreaterThan(1.8);
  });
});
