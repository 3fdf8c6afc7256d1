import { describe, expect, it } from 'vitest';
import { longBubble, RISING, STILL, stalled } from './checks/slot.ts';

describe('a bubble that fills a slot', () => {
  it('stands still below the stall limit and rises above it', async () => {
    // seen 0.0055 and 0.23 at 24 cells; at 16 it no longer stalls
    expect(Math.abs(await stalled(24, 2.4, 0.02))).toBeLessThan(STILL);
    expect(await stalled(24, 3.6, 0.02)).toBeGreaterThan(RISING);
  });

  it('rises as long bubbles do where it is long, roughly at 32 cells', async () => {
    // seen 0.20 on 40 cells; 0.23 is published
    expect(Math.abs((await longBubble(32)).froude - 0.23)).toBeLessThan(0.05);
  });
});
