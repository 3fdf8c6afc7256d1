import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type Case, layOut, readCase } from '../../cases/index.ts';
import { band, commonPoint, crossesItself, distanceTo, inside, signedArea } from '../../cases/polygon.ts';
import { CaseError } from '../../solver/index.ts';

const base = 'channel: {gap: 8 mm, height: 100 mm}\ngas: {supply: 0.4 m3/(m2 h)}\n';
const withFins = (fins: string): Case => readCase(`${base}fins:\n  - ${fins}\n`, 'fins.yaml');
/** The case, or undefined where it is refused. */
const accepted = (fins: string): Case | undefined => {
  try {
    return withFins(fins);
  } catch (error) {
    if (error instanceof CaseError) return undefined;
    throw error;
  }
};
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

describe('a curved fin', () => {
  const arc = Array.from({ length: 9 }, (_, i): [number, number] => [5 * Math.cos((i * Math.PI) / 16), 5 * Math.sin((i * Math.PI) / 16)]);
  const lengthOf = (path: [number, number][]): number =>
    path.slice(1).reduce((sum, [x, y], i) => sum + Math.hypot(x - (path[i]?.[0] ?? 0), y - (path[i]?.[1] ?? 0)), 0);

  it('has the area of its middle line times its thickness, and all that is nearer to the line than half of it', () => {
    for (const path of [
      arc,
      [...arc].reverse(),
      [
        [0, 0],
        [3, 0],
        [3, 4],
        [6, 4],
        [8, 3],
      ] as [number, number][],
    ]) {
      const fin = band(path, 0.8);
      expect(fin).toHaveLength(2 * path.length);
      // mitres give to one side what they take from the other [V]
      expect(signedArea(fin)).toBeCloseTo(0.8 * lengthOf(path), 12);
      expect(crossesItself(fin)).toBe(false);
    }
    for (let i = 0; i < 100; i++) {
      const [radius, angle] = [4.55 + 0.009 * i, 0.05 + (i % 7) * 0.24];
      const edge = 5 * (1 - Math.cos(Math.PI / 32)); // how far the chords lie within the arc: 0.024
      const away = Math.abs(radius - 5);
      if (away < 0.4 - edge) expect(inside(band(arc, 0.8), radius * Math.cos(angle), radius * Math.sin(angle))).toBe(true);
      if (away > 0.4 + edge) expect(inside(band(arc, 0.8), radius * Math.cos(angle), radius * Math.sin(angle))).toBe(false);
    }
  });

  it('of any line that is taken has its area on the grid, and an outline that does not cross itself', () => {
    const step = fc.record({ turn: fc.double({ min: -1.5, max: 1.5, noNaN: true }), length: fc.double({ min: 0.2, max: 4, noNaN: true }) });
    let taken = 0;
    fc.assert(
      fc.property(fc.array(step, { minLength: 1, maxLength: 6 }), (steps) => {
        let [across, along, heading] = [4, 45, Math.PI / 2];
        const line = [[across, along]];
        for (const { turn, length } of steps) {
          across += length * Math.cos(heading);
          along += length * Math.sin(heading);
          heading += turn;
          line.push([across, along]);
        }
        const path = line.map(([a, b]) => `[${a} mm, ${b} mm]`).join(', ');
        const panel = accepted(`{path: [${path}], thickness: 0.9 mm}`);
        if (panel === undefined) return;
        taken++;
        const [fin] = panel.fins as [[number, number][]];
        const area = Math.abs(signedArea(fin));
        const whole = steps.reduce((sum, { length }) => sum + length * 0.9e-6, 0);
        expect(area / whole).toBeCloseTo(1, 6);
        expect(crossesItself(fin)).toBe(false);
        if (fin.some(([a]) => a < 0 || a > 0.008)) return;
        const cells = solidOf(panel).solid.reduce((sum, cell) => sum + cell, 0);
        // off by at most the cells along half of the rim
        expect(Math.abs(cells - area / 4e-8)).toBeLessThan(1 + (whole / 0.9e-3 + 0.9e-3) / 2e-4);
      }),
      { seed: 5, numRuns: 300 },
    );
    // the rest bends too tightly, crosses itself or leaves no way
    expect(taken).toBeGreaterThan(100);
  });

  it('is the straight fin when its line is straight', () => {
    const [curved] = withFins('{path: [[2 mm, 38 mm], [3 mm, 40 mm], [4 mm, 42 mm]], thickness: 0.8 mm}').fins;
    const length = Math.hypot(2, 4);
    const angle = Math.atan2(2, 4) * (180 / Math.PI);
    const [straight] = withFins(`{from: 40 mm, across: 3 mm, length: ${length} mm, thickness: 0.8 mm, angle: ${angle} deg}`).fins;
    for (const [across, along] of straight ?? []) {
      expect(Math.min(...(curved ?? []).map(([a, b]) => Math.hypot(a - across, b - along)))).toBeLessThan(1e-12);
    }
  });

  it('comes back at every pitch, on one side in turn or on both', () => {
    const line = 'path: [[1 mm, 30 mm], [2 mm, 32 mm], [2.5 mm, 35 mm]], thickness: 0.8 mm, pitch: 15 mm, count: 3';
    const leastAcross = (panel: Case): boolean[] => panel.fins.map((fin) => Math.max(...fin.map(([across]) => across)) < 0.004);
    expect(leastAcross(withFins(`{${line}}`))).toEqual([true, true, true]);
    expect(leastAcross(withFins(`{${line}, alternate: true}`))).toEqual([true, false, true]);
    const both = withFins(`{${line}, mirrored: true}`);
    expect(leastAcross(both)).toEqual([true, false, true, false, true, false]);
    expect(both.fins[3]?.toReversed().map(([across, along]) => [0.008 - across, along - 0.015].map((v) => v.toFixed(9)))).toEqual(
      both.fins[0]?.map((corner) => corner.map((v) => v.toFixed(9))),
    );
    for (const fin of both.fins) expect(signedArea(fin) * signedArea(both.fins[0] ?? [])).toBeGreaterThan(0);
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

  it('comes back at every pitch as well', () => {
    const { fins } = withFins('{outline: [[1 mm, 30 mm], [3 mm, 34 mm], [1 mm, 34 mm]], pitch: 10 mm, count: 2, mirrored: true}');
    expect(fins.map((fin) => fin.map(([across, along]) => [Math.round(across * 1e6), Math.round(along * 1e6)]))[3]).toEqual([
      [7000, 44000],
      [5000, 44000],
      [7000, 40000],
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
    expect(commonPoint(square, moved(1.5, 1))).toEqual([2, 1]);
    expect(commonPoint(square, moved(0.5, 0.5, 0.2))).toEqual([0.5, 0.5]);
    expect(commonPoint(moved(0.5, 0.5, 0.2), square)).toEqual([0.5, 0.5]);
    expect(commonPoint(square, moved(3, 0))).toBeUndefined();
    expect(commonPoint(square, moved(0, 2.1))).toBeUndefined();
  });

  it('crosses itself when its corners are listed out of order', () => {
    expect(crossesItself(square)).toBe(false);
    expect(crossesItself([square[0], square[2], square[1], square[3]] as [number, number][])).toBe(true);
  });
});

describe('the distance told to the solver', () => {
  it('is that from the nearest face of a fin that leans, in cells, negative inside', () => {
    const { setup, derived } = layOut(withFins('{from: 40 mm, across: 4 mm, length: 6 mm, thickness: 1.2 mm, angle: 30 deg}'));
    const at = (across_mm: number, along_mm: number): number =>
      setup.solidDistance?.(along_mm / 1000 / derived.dx_m - 0.5, across_mm / 1000 / derived.dx_m - 0.5) as number;
    const cell_mm = derived.dx_m * 1000;
    // its long faces lie 0.6 mm to both sides of its middle, along (cos 30, -sin 30)
    expect(at(4, 40)).toBeCloseTo(-0.6 / cell_mm, 9);
    const away = (s_mm: number): number => at(4 + s_mm * Math.cos(Math.PI / 6), 40 - s_mm * Math.sin(Math.PI / 6));
    expect(away(0.6)).toBeCloseTo(0, 9);
    expect(away(0.7)).toBeCloseTo(0.1 / cell_mm, 9);
    expect(away(-0.5)).toBeCloseTo(-0.1 / cell_mm, 9);
    expect(at(1, 80)).toBe(Number.POSITIVE_INFINITY);
  });
});
