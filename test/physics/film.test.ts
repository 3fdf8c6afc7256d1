import { describe, expect, it } from 'vitest';
import { film } from './checks/film.ts';

describe('a film of liquid falling beside air', () => {
  it('pulls at its wall with its weight', async () => {
    const { shear } = await film(12, 0.01);
    // 0.2 % too much was seen, which is the weight of the air: 24/832 of a cell of liquid
    expect(Math.abs(shear - 1)).toBeLessThan(0.005);
  });
});
