import { describe, expect, it } from 'vitest';
import { farthest, SETS, wave } from './checks/capillary-wave.ts';

describe('a capillary wave', () => {
  it.each(SETS)('swings as Prosperetti has it, the nearer the finer the grid, set $name', async (set) => {
    const [coarse, fine] = [farthest(await wave(32, set), set), farthest(await wave(64, set), set)];
    // seen 0.33 to 0.37 of the amplitude on 32 cells, an interface a sixth of a wave thick, and 0.21 to 0.27 on 64
    expect(fine).toBeLessThan(0.3);
    expect(fine).toBeLessThan(0.8 * coarse);
  });
});
