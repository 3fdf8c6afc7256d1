import { describe, expect, it } from 'vitest';
import { order } from './channel.ts';
import { inclinedFlow } from './checks/inclined.ts';

describe('liquid between two solids that lean', () => {
  it.each([
    // seen: 0.0025 and 0.0005, order 2.4; 0.0007 and 0.0002, 1.9; 0.0007 and 0.00016, 2.2
    { slope: [1, 1], viscosity: 0.125 },
    { slope: [1, 2], viscosity: 0.125 },
    { slope: [1, 4], viscosity: 0.125 },
  ] as { slope: [number, number]; viscosity: number }[])(
    'flows as between straight walls, to second order: $slope, viscosity $viscosity',
    async (channel) => {
      const coarse = (await inclinedFlow({ ...channel, width: 16 })).velocity;
      const fine = (await inclinedFlow({ ...channel, width: 32 })).velocity;
      expect(fine).toBeLessThan(0.0025);
      expect(order(coarse, fine)).toBeGreaterThan(1.8);
    },
  );

  it('feels stairs where the solver is not told of the faces', async () => {
    // seen: 0.009
    expect((await inclinedFlow({ slope: [1, 2], width: 32, viscosity: 0.125, stairs: true })).velocity).toBeGreaterThan(0.005);
  });

  it.each([
    // seen: 0.0112 against 0.0448; 0.0372 against 0.0826; 0.0130 against 0.0196
    [[1, 1], 0.4],
    [[1, 2], 0.6],
    [[1, 4], 0.8],
  ] as [[number, number], number][])('is slowed less than by stairs in a box with gas: slope %s', async (slope, share) => {
    const channel = { slope, width: 10, viscosity: 0.1, gas: { density: 0.01, viscosity: 0.0005 } };
    const faces = (await inclinedFlow(channel)).velocity;
    expect(faces).toBeLessThan(share * (await inclinedFlow({ ...channel, stairs: true })).velocity);
  });
});
