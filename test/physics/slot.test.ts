import { describe, expect, it } from 'vitest';
import { longBubble, RISING, stalled } from './checks/slot.ts';

describe('a bubble that fills a slot', () => {
  it('rises less than half as far below the stall limit as above it', async () => {
    // It should not rise at all there: seen 0.11 at 24 cells (0.25 above the limit) and 0.03 at 32 (0.18), where the film is thicker.
    const above = await stalled(24, 3.6, 0.02);
    expect(await stalled(24, 2.4, 0.02)).toBeLessThan(0.5 * above);
    expect(above).toBeGreaterThan(RISING);
  });

  it('rises as long bubbles do where it is long, roughly at 32 cells', async () => {
    // 0.23 is published
    expect(Math.abs((await longBubble(32)).froude - 0.23)).toBeLessThan(0.05);
  });
});
