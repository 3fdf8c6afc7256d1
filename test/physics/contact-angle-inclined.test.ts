import { describe, expect, it } from 'vitest';
import { leaningAngle_deg } from './checks/contact-angle-inclined.ts';

describe('a drop on a face that leans against the grid', () => {
  // How far the angle may lie off, in degrees; seen 0.27, 0.21, 0.15 and 0.94 at a radius of 10 cells
  it.each([
    [30, 120, 1.5],
    [45, 60, 1.5],
    [45, 90, 1],
    [45, 150, 3],
  ])('leaning by %d degrees comes to rest at the %d degrees asked for', async (lean_deg, asked_deg, limit_deg) => {
    const seen_deg = await leaningAngle_deg({ asked_deg, R: 10, lean_deg });
    expect(Math.abs(seen_deg - asked_deg)).toBeLessThan(limit_deg);
  });

  it('wets at 30 degrees within the gate', async () => {
    // seen: 2.1; 0.0 at a radius of 16 cells
    expect(Math.abs((await leaningAngle_deg({ asked_deg: 30, R: 10, lean_deg: 30 })) - 30)).toBeLessThan(3);
  });
});
