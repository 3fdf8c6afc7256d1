import { describe, expect, it } from 'vitest';
import { caseText, galleryText, pointCase, pointCells, pointSets, readCase, readPlan } from '../../cases/index.ts';

const BASE = galleryText('finned-panel');
const plan = (text: string) => readPlan(`base: finned-panel\n${text}`, 'plan.yaml', () => ({ text: BASE, file: 'finned-panel' }));
const cells = async (text: string) => {
  const read = await plan(text);
  return read.points.map((point) => pointCells(read, point));
};

describe('the points of a plan', () => {
  it('cross every value with every other, the last key and then the seed changing fastest', async () => {
    const read = await plan(
      'vary:\n  - {key: channel.gap, values: [8 mm, 1 cm]}\n  - {key: channel.tilt, values: [0 deg, 20 deg]}\nseeds: [1, 5]',
    );
    expect(read.keys.map(({ column }) => column)).toEqual(['channel.gap_m', 'channel.tilt_deg']);
    expect(read.points.map((point) => [point.number, ...pointCells(read, point), point.seed])).toEqual([
      [1, 0.008, 0, 1],
      [2, 0.008, 0, 5],
      [3, 0.008, 20, 1],
      [4, 0.008, 20, 5],
      [5, 0.01, 0, 1],
      [6, 0.01, 0, 5],
      [7, 0.01, 20, 1],
      [8, 0.01, 20, 5],
    ]);
  });

  it('pair the first with the first and so on', async () => {
    expect(
      await cells(
        'vary:\n  - {key: channel.gap, values: [8 mm, 10 mm]}\n  - {key: channel.tilt, values: [0 deg, 20 deg]}\ncombine: paired',
      ),
    ).toEqual([
      [0.008, 0],
      [0.01, 20],
    ]);
  });

  it('count through a range with step or count, ends included, evenly or by ratios, without the rest of binary fractions', async () => {
    const gaps = async (range: string) => (await cells(`vary: [{key: channel.gap, ${range}}]`)).flat();
    expect(await gaps('from: 7 mm, to: 1 cm, step: 1 mm')).toEqual([0.007, 0.008, 0.009, 0.01]);
    expect(await gaps('from: 7 mm, to: 7.35 mm, step: 100 um')).toEqual([0.007, 0.0071, 0.0072, 0.0073]);
    expect(await gaps('from: 7 mm, to: 8 mm, count: 3')).toEqual([0.007, 0.0075, 0.008]);
    expect(await gaps('from: 5 mm, to: 20 mm, count: 3, spacing: log')).toEqual([0.005, 0.01, 0.02]);
    expect((await cells('vary: [{key: liquid.temperature, from: 10 degC, to: 20 degC, step: 5 K}]')).flat()).toEqual([
      283.15, 288.15, 293.15,
    ]);
    expect((await cells('vary: [{key: grid.across, from: 24, to: 40, step: 8}]')).flat()).toEqual([24, 32, 40]);
  });

  it('reach into lists, and take words, lists and maps as values', async () => {
    const text = 'vary:\n  - {key: fins.0.angle, values: [10 deg]}\n  - {key: channel.membranes, values: [[left], [left, right]]}';
    expect(await cells(text)).toEqual([
      [10, '[left]'],
      [10, '[left, right]'],
    ]);
    const fins = await plan('vary: [{key: fins, values: [[], [{from: 30 mm, across: 4 mm, length: 2 mm, thickness: 1 mm}]]}]');
    expect(fins.points.map((point) => pointCase(fins, point).fins.length)).toEqual([0, 1]);
  });

  it('fill a box evenly: each slice of each range once, the same points for the same seed', async () => {
    const text = (shuffle: number) =>
      `vary:\n  - {key: channel.gap, from: 6 mm, to: 10 mm}\n  - {key: gas.supply, from: 0.1 m3/(m2 h), to: 10 m3/(m2 h), spacing: log}\n  - {key: channel.membranes, values: [[left], [right]]}\ncombine: sampled\nsamples: 16\nshuffle: ${shuffle}`;
    const found = await cells(text(1));
    expect(found).toHaveLength(16);
    const sorted = (numbers: number[]) => [...numbers].sort((a, b) => a - b);
    expect(sorted(found.map(([gap]) => Math.floor((Number(gap) - 0.006) / (0.004 / 16))))).toEqual(Array.from({ length: 16 }, (_, i) => i));
    const decades = found.map(([, supply]) => Math.floor((Math.log10(Number(supply) * 3600) + 1) * 8));
    expect(sorted(decades)).toEqual(Array.from({ length: 16 }, (_, i) => i));
    expect(found.filter(([, , walls]) => walls === '[left]')).toHaveLength(8);
    expect(await cells(text(1))).toEqual(found);
    expect(await cells(text(2))).not.toEqual(found);
  });

  it('are left out where a comparison does not hold, equal values counted as equal', async () => {
    const kept = async (where: string) =>
      (await cells(`vary: [{key: channel.gap, from: 6 mm, to: 10 mm, step: 1 mm}]\nwhere: ['${where}']`)).flat();
    // bubbles of 3.5 mm
    expect(await kept('channel.gap >= 2 * gas.bubble.diameter')).toEqual([0.007, 0.008, 0.009, 0.01]);
    expect(await kept('channel.gap > 2 * gas.bubble.diameter')).toEqual([0.008, 0.009, 0.01]);
    expect(await kept('7 mm <= channel.gap <= 0.9 cm')).toEqual([0.007, 0.008, 0.009]);
    expect(await kept('channel.gap == 3.5 mm + 3.5 mm')).toEqual([0.007]);
    expect(await kept('channel.gap * channel.height < 8e-4 m2')).toEqual([0.006, 0.007]);
    expect(await kept('-channel.gap / 2 < -(9 mm) / 2')).toEqual([0.01]);
    expect(await kept('gas.supply * 1 h < 0.2 m3/m2 / 2 * (channel.gap / 7 mm)')).toEqual([0.008, 0.009, 0.01]);
  });

  it('are the same cases that run would make of the base text with the values set', async () => {
    const read = await plan(
      'set: {grid.across: 32, "gas.bubble": {diameter: 3 mm}}\nvary:\n  - {key: channel.gap, values: [8 mm, 10 mm]}\n  - {key: fins.0.angle, values: [10 deg, 40 deg]}\nseeds: [3]',
    );
    expect(read.baseText).toContain("# Brackenfold's second idea");
    for (const point of read.points) {
      const set = pointSets(read, point);
      expect(pointCase(read, point)).toEqual(readCase(caseText(read.baseText, set), 'case'));
      expect(pointCase(read, point)).toMatchObject({ grid: { across: 32 }, gas: { seed: 3, bubble: { diameter_m: 0.003 } } });
    }
  });

  it('that contradict themselves stay in the plan and say so when their turn comes', async () => {
    const read = await plan('vary: [{key: channel.gap, values: [8 mm, 3 mm]}]');
    expect(read.points).toHaveLength(2);
    expect(() => pointCase(read, read.points[1])).toThrow(/fin/);
  });
});
