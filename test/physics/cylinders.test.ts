import { describe, expect, it } from 'vitest';
import { DRAG, drag } from './checks/cylinders.ts';

describe('a square array of cylinders in slow flow', () => {
  it.each([0.05, 0.2])('resists as Sangani & Acrivos list it, at the solid fraction %d', async (c) => {
    // seen 0.64 % and 0.28 % off at 32 cells a side
    expect(Math.abs((await drag(32, c)) / DRAG[c] - 1)).toBeLessThan(0.01);
  });
});
