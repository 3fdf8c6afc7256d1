import { describe, expect, it } from 'vitest';
import { type Case, layOut, readCase } from '../../cases/index.ts';
import { crossesItself, distanceTo, inside, overlap, signedArea } from '../../cases/polygon.ts';

const base = 'channel: {gap: 8 mm, height: 100 mm}\ngas: {supply: 0.4 m3/(m2 h)}\n';
const withFins = (fins: string): Case => readCase(`${base}fins:\n  - ${fins}\n`, 'fins.yaml');
const solidOf = (panel: Case): { solid: Uint8Array; nx: number; ny: number } => {
  const { setup } = layOut(panel);
  return { solid: setup.solid ?? new Uint8Array(0), nx: setup.nx, ny: setup.ny };
};
const square: [number, number][] = [
  [0, 0],
  [2, 0],
  [2, 2],
  [0, 2],
];

describe('a fin of a group', () => {
  it('is a rectangle along the channel when its angle is zero', () => {
    const [fin] = withFins('{from: 40 mm, across: 3 mm, length: 4 mm, thickness: 0.8 mm}').fins;
    const expected = [
      [2.6, 38],
      [3.4, 38],
      [3.4, 42],
      [2.6, 42],
    ];
    fin?.forEach(([across, along], i) => {
      expect(across * 1000).toBeCloseTo(expected[i]?.[0] as number, 9);
      expect(along * 1000).toBeCloseTo(expected[i]?.[1] as number, 9);
    });
  });

  it('turns its upper end to the right for a positive angle', () => {
    const [fin] = withFins('{from: 40 mm, across: 3 mm, length: 4 mm, thickness: 0.8 mm, angle: 30 deg}').fins;
    const upper = fin?.filter(([, along]) => along > 0.04) ?? [];
    expect(upper).toHaveLength(2);
    for (const [across] of upper) expect(across).toBeGreaterThan(0.003);
    expect(Math.abs(signedArea(fin ?? []))).toBeCloseTo(4e-3 * 0.8e-3, 12);
  });

  it('comes back at every pitch, and mirrored across the middle of the gap where it alternates', () => {
    const { fins } = withFins(
      '{from: 30 mm, pitch: 15 mm, count: 3, across: 2 mm, length: 3 mm, thickness: 0.8 mm, angle: 30 deg, alternate: true}',
    );
    const [first, second, third] = fins.map((fin) => fin.map(([across, along]) => [across * 1000, along * 1000] as const));
    expect(fins).toHaveLength(3);
    const mirrored = first?.map(([across, along]) => [8 - across, along + 15] as const) ?? [];
    for (const [across, along] of second ?? []) {
      expect(Math.min(...mirrored.map(([a, b]) => Math.hypot(a - across, b - along)))).toBeLessThan(1e-9);
    }
    third?.forEach(([across, along], i) => {
      expect(Math.hypot(across - (first?.[i]?.[0] ?? 0), along - 30 - (first?.[i]?.[1] ?? 0))).toBeLessThan(1e-9);
    });
  });

  it('fills as many cells as its area holds, at any angle', () => {
    for (const angle of [0, 17, 30, 45, 80, -60]) {
      const { solid } = solidOf(withFins(`{from: 50 mm, across: 4 mm, length: 5 mm, thickness: 1.2 mm, angle: ${angle} deg}`));
      const cells = solid.reduce((sum, cell) => sum + cell, 0);
      // 150 cells of 0.2 mm; off by at most the cells on half of the rim (62 cell sides long): 6 seen
      expect(Math.abs(cells - 150)).toBeLessThan(15);
    }
  });

  it('that reaches past a wall is cut off there and covers the wall', () => {
    const { solid, nx } = solidOf(withFins('{from: 50 mm, across: 1 mm, length: 4 mm, thickness: 0.8 mm, angle: 90 deg}'));
    const wall = Array.from(solid.slice(0, nx)).flatMap((cell, x) => (cell === 1 ? [x] : []));
    expect(wall[0]).toBe(248);
    expect(wall.at(-1)).toBe(251);
    expect(wall).toHaveLength(4);
  });
});

describe('an outline', () => {
  it('is taken as written', () => {
    const { fins } = withFins('{outline: [[1 mm, 30 mm], [3 mm, 34 mm], [1 mm, 34 mm]]}');
    expect(fins[0]?.map(([across, along]) => [Math.round(across * 1e6), Math.round(along * 1e6)])).toEqual([
      [1000, 30000],
      [3000, 34000],
      [1000, 34000],
    ]);
  });

  it('holds the points inside it and no others', () => {
    expect(inside(square, 1, 1)).toBe(true);
    expect(inside(square, 3, 1)).toBe(false);
    expect(inside(square, 1, -0.1)).toBe(false);
    expect(distanceTo(square, 1, 1)).toBe(0);
    expect(distanceTo(square, 5, 6)).toBeCloseTo(5, 12);
  });

  it('overlaps another when edges cross or one lies within the other', () => {
    const moved = (a: number, b: number, size = 1) => square.map(([x, y]) => [size * x + a, size * y + b] as [number, number]);
    expect(overlap(square, moved(1, 1))).toBe(true);
    expect(overlap(square, moved(0.5, 0.5, 0.2))).toBe(true);
    expect(overlap(moved(0.5, 0.5, 0.2), square)).toBe(true);
    expect(overlap(square, moved(3, 0))).toBe(false);
    expect(overlap(square, moved(0, 2.1))).toBe(false);
  });

  it('crosses itself when its corners are listed out of order', () => {
    expect(crossesItself(square)).toBe(false);
    expect(crossesItself([square[0], square[2], square[1], square[3]] as [number, number][])).toBe(true);
  });
});
