import { describe, expect, it } from 'vitest';
import { order } from './channel.ts';
import { channel, LIQUIDS } from './checks/rheology.ts';

describe.each([
  ['one liquid', false],
  ['a box made for gas', true],
])('a channel full of a liquid that thins under shear, %s', (_, gas) => {
  // seen at 16 cells, one liquid: wall shear 1.0029 to 1.0037 of that which belongs to the mean velocity, mean velocity 0.992 to 0.996 of the
  // exact one; box for gas: 0.9993 to 1.0019, 0.9959 to 1.0011
  it.each(LIQUIDS)('pulls at its walls as it should at its speed: $name', async ({ index, plug }) => {
    const { balance, mean, shear } = await channel({ cells: 16, index, plug, gas });
    expect(Math.abs(shear - 1)).toBeLessThan(0.01);
    expect(Math.abs(mean - 1)).toBeLessThan(0.02);
    // what is left of the settling: 1.2e-5 was seen
    expect(Math.abs(balance - 1)).toBeLessThan(1e-4);
  });

  it('hardly feels the bound that stands for a viscosity without limit', async () => {
    // four times the viscosity of the wall instead of sixteen: 0.15 % and 0.10 % of the mean velocity, the walls feel 2e-7
    const [low, high] = [
      await channel({ cells: 16, index: 0.5, plug: 0, gas, most: 0.04 }),
      await channel({ cells: 16, index: 0.5, plug: 0, gas }),
    ];
    expect(Math.abs(low.mean / high.mean - 1)).toBeLessThan(0.005);
    expect(Math.abs(low.balance / high.balance - 1)).toBeLessThan(2e-6);
  });
});

describe('a channel of one liquid that thins under shear', () => {
  it('comes closer with the square of the cell size', async () => {
    const errors: number[] = [];
    for (const cells of [16, 32]) errors.push(1 - (await channel({ cells, index: 0.5, plug: 0, gas: false })).mean);
    // seen 1.99
    expect(order(errors[0], errors[1])).toBeCloseTo(2, 1);
  });

  it('does the same in f32', async () => {
    const flow = { cells: 16, index: 0.5, plug: 0, gas: false } as const;
    const [f32, f64] = [await channel({ ...flow, precision: 'f32' }), await channel(flow)];
    // seen 2.7e-5 and 3.4e-5
    expect(Math.abs(f32.mean / f64.mean - 1)).toBeLessThan(2e-4);
    expect(Math.abs(f32.shear / f64.shear - 1)).toBeLessThan(2e-4);
  });
});
