import { describe, expect, it } from 'vitest';
import { ANSWERS, rise } from './checks/rising-bubble.ts';

describe('a rising bubble', () => {
  it('rises and flattens as the benchmark has it, roughly at 40 cells', async () => {
    const seen = await rise(40);
    // seen -8.7 %, +0.5 % and -1.5 %; -2.1 % of the speed on 80 cells
    expect(Math.abs(seen.speed / ANSWERS.speed - 1)).toBeLessThan(0.1);
    expect(Math.abs(seen.circularity / ANSWERS.circularity - 1)).toBeLessThan(0.03);
    expect(Math.abs(seen.height / ANSWERS.height - 1)).toBeLessThan(0.02);
  });
});
