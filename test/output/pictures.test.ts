import { PNG } from 'pngjs';
import { describe, expect, test } from 'vitest';
import { drawHistogram, drawShearMap, framePainter, measure } from '../../output/index.ts';
import { differenceFromGolden } from './golden.ts';
import { makeRecording } from './recordings.ts';
import { makeSnapshot } from './snapshots.ts';

const TILT_RAD = (20 * Math.PI) / 180;

type Rgb = [number, number, number];
function pixels(png: Buffer): { width: number; height: number; at(x: number, y: number): Rgb } {
  const { width, height, data } = PNG.sync.read(png);
  return {
    width,
    height,
    at: (x, y) => {
      const i = (Math.round(y) * width + Math.round(x)) * 4;
      return [data[i], data[i + 1], data[i + 2]];
    },
  };
}

/** Bubbles are drawn almost white, with a hint of blue: no other colour of a frame is this one. */
const GAS: Rgb = [250, 251, 252];

/** Mean place of all pixels of a colour. */
function centreOf(picture: ReturnType<typeof pixels>, colour: Rgb): { x: number; y: number; count: number } {
  let [x, y, count] = [0, 0, 0];
  for (let row = 0; row < picture.height; row++) {
    for (let column = 0; column < picture.width; column++) {
      if (picture.at(column, row).some((value, c) => value !== colour[c])) continue;
      x += column;
      y += row;
      count++;
    }
  }
  return { x: x / count, y: y / count, count };
}

const panel = (tilt_rad: number) =>
  makeRecording({ elements: 150, across: 30, samples: 2, tilt_rad, membrane: { first: 15, end: 135 }, membranes: ['right'] });

describe('a frame', () => {
  test('shows a bubble with its true area', () => {
    const { case: upright, derived } = panel(0);
    const picture = pixels(framePainter({ case: upright, derived, scale: 4 })(makeSnapshot(150, 30, [{ x: 100, y: 15, radius: 8 }])));
    const { count } = centreOf(picture, GAS);
    // the edge line covers 1.8 pixels around the edge, half of it and the blended rim inside
    const inner = 8 * 4 - 1.4;
    expect(count).toBeGreaterThan(0.95 * Math.PI * inner ** 2);
    expect(count).toBeLessThan(1.05 * Math.PI * inner ** 2);
  });

  test('stands upright with the top above and the right wall on the right', () => {
    const { case: upright, derived } = panel(0);
    const style = { case: upright, derived, scale: 4 };
    const place = (x: number, y: number) => centreOf(pixels(framePainter(style)(makeSnapshot(150, 30, [{ x, y, radius: 6 }]))), GAS);
    const low = place(40, 10);
    const high = place(110, 10);
    const right = place(40, 20);
    expect(low.y - high.y).toBeCloseTo(70 * 4, 0);
    expect(high.x).toBeCloseTo(low.x, 0);
    expect(right.x - low.x).toBeCloseTo(10 * 4, 0);
    expect(right.y).toBeCloseTo(low.y, 0);
  });

  test('of a positive tilt leans to the left, so that the right wall faces down', () => {
    const { case: tilted, derived } = panel(TILT_RAD);
    const style = { case: tilted, derived, scale: 4 };
    const place = (x: number, y: number) => centreOf(pixels(framePainter(style)(makeSnapshot(150, 30, [{ x, y, radius: 6 }]))), GAS);
    const low = place(40, 10);
    const high = place(110, 10);
    const right = place(40, 20);
    expect(high.x - low.x).toBeCloseTo(-70 * 4 * Math.sin(TILT_RAD), 0);
    expect(low.y - high.y).toBeCloseTo(70 * 4 * Math.cos(TILT_RAD), 0);
    expect(right.x - low.x).toBeCloseTo(10 * 4 * Math.cos(TILT_RAD), 0);
    // towards the right wall is upward: that wall is the ceiling gas rides along
    expect(low.y - right.y).toBeCloseTo(10 * 4 * Math.sin(TILT_RAD), 0);
  });

  test('keeps its size whatever the state, so that frames make a film', () => {
    const { case: tilted, derived } = panel(-TILT_RAD);
    const style = { case: tilted, derived };
    const first = pixels(framePainter(style)(makeSnapshot(150, 30, [], false, 0)));
    const last = pixels(framePainter(style)(makeSnapshot(150, 30, [{ x: 149, y: 29, radius: 12 }], false, 123.456)));
    expect([last.width, last.height]).toEqual([first.width, first.height]);
  });

  test('shows nothing of the frame drawn before it', () => {
    const { case: tilted, derived } = panel(TILT_RAD);
    const paint = framePainter({ case: tilted, derived });
    const last = makeSnapshot(150, 30, [{ x: 60, y: 20, radius: 7 }], false, 0.5);
    const alone = framePainter({ case: tilted, derived })(last);
    expect(paint(makeSnapshot(150, 30, [{ x: 90, y: 10, radius: 12 }], false, 123.456)).equals(alone)).toBe(false);
    expect(paint(last).equals(alone)).toBe(true);
  });

  test('is enlarged by whole cells up to a readable size, and never shrunk', () => {
    const sizes = [150, 600, 3000].map((nx) => {
      const { case: upright, derived } = makeRecording({ elements: nx, across: 8, samples: 1 });
      return pixels(framePainter({ case: upright, derived })(makeSnapshot(nx, 8, []))).height;
    });
    expect(sizes).toEqual([150 * 6 + 32, 600 * 3 + 32, 3000 + 32]);
  });

  test.each([
    ['frame-upright', 0],
    ['frame-tilted', TILT_RAD],
    ['frame-leaning-right', -TILT_RAD],
  ])('looks like the stored %s', (name, tilt_rad) => {
    const { case: shown, derived } = panel(tilt_rad);
    const snapshot = makeSnapshot(
      150,
      30,
      [
        { x: 40, y: 14, radius: 9 },
        { x: 115, y: 25, radius: 8 },
      ],
      true,
    );
    expect(differenceFromGolden(name, framePainter({ case: shown, derived, scale: 3 })(snapshot))).toBe('');
  });
});

describe('a shear map', () => {
  // 48 samples of 20 pixels each, 40 elements of 16 pixels each; the plot starts at (84, 64) and is 960 x 640
  const shear = (side: 'left' | 'right', s: number, e: number) =>
    e === 20 ? Number.NaN : side === 'right' ? (s < 24 ? 1 : -1) * (e > 30 ? 1 : 0.2) : 0;
  const recording = makeRecording({ elements: 40, samples: 48, membrane: { first: 4, end: 36 }, shear });
  const cell = (picture: ReturnType<typeof pixels>, s: number, e: number) => picture.at(84 + (s + 0.5) * 20, 64 + 640 - (e + 0.5) * 16);

  test('has time across, height up, orange upward and violet downward', () => {
    const picture = pixels(drawShearMap(recording, 'right'));
    const [upR, , upB] = cell(picture, 2, 34);
    expect(upR).toBeGreaterThan(upB + 50);
    const [downR, , downB] = cell(picture, 45, 34);
    expect(downB).toBeGreaterThan(downR + 20);
    const weak = cell(picture, 2, 10);
    expect(Math.min(...weak)).toBeGreaterThan(Math.min(...cell(picture, 2, 34)));
  });

  test('is grey under a fin and pale in the bands', () => {
    const picture = pixels(drawShearMap(recording, 'right'));
    const fin = cell(picture, 10, 20);
    expect(fin).toEqual([150, 152, 156]);
    const inside = cell(picture, 40, 34);
    const inSkim = cell(picture, 40, 38);
    expect(Math.min(...inSkim)).toBeGreaterThan(Math.min(...inside) + 60);
  });

  test('of still water is the colour of zero all over', () => {
    const picture = pixels(drawShearMap(recording, 'left'));
    expect(cell(picture, 2, 10)).toEqual(cell(picture, 45, 34));
  });

  test('of a recording without samples says so instead of showing something', () => {
    const empty = drawShearMap(makeRecording({ samples: 0 }), 'left');
    expect(differenceFromGolden('shear-map-empty', empty)).toBe('');
  });

  test('looks like the stored one', () => {
    expect(differenceFromGolden('shear-map', drawShearMap(recording, 'right'))).toBe('');
  });
});

describe('the picture of the histogram', () => {
  test('looks like the stored one', () => {
    const recording = makeRecording({
      samples: 200,
      membranes: ['right'],
      shear: (side, s, e) => (side === 'right' ? 1 : 0.3) * 10 ** Math.sin(s * 0.7 + e),
    });
    expect(differenceFromGolden('histogram', drawHistogram(recording, measure(recording)))).toBe('');
  });
});
