import { describe, expect, it } from 'vitest';
import { angle_deg, restingAngle, SEGMENTS } from './checks/contact-angle.ts';

const R = 16;

describe('a drop on a wall', () => {
  it('has the height and base of its segment of a circle', () => {
    for (const [asked_deg, ratio] of SEGMENTS) expect(angle_deg(ratio)).toBeCloseTo(asked_deg, 2);
  });

  // How far the angle may lie off, in degrees; seen 0.4, 0.2, 0.1, 0.1 and 1.2
  it.each([
    [30, 2],
    [60, 1],
    [90, 0.5],
    [120, 1],
    [150, 3],
  ])('comes to rest at the %d degrees asked for', async (asked_deg, limit_deg) => {
    const seen = await restingAngle(asked_deg, R);
    expect(Math.abs(seen.angle_deg - asked_deg)).toBeLessThan(limit_deg);
  });

  it('covers less wall the less the liquid wets it', async () => {
    const ratios: number[] = [];
    for (const asked_deg of [45, 75, 105, 135]) ratios.push((await restingAngle(asked_deg, R)).ratio);
    expect(ratios).toEqual([...ratios].sort((a, b) => a - b));
    expect(ratios[3]).toBeGreaterThan(3 * ratios[0]);
  });
});
