import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { layOut, readCase } from '../../cases/index.ts';
import { warnings } from '../../cli/warnings.ts';
import { Bench, TINY } from './swathe.ts';

/** Warnings of the tiny case with some values changed. */
function warningsOf(...sets: string[]): string[] {
  const panel = readCase(TINY, 'tiny.yaml', sets);
  return warnings(panel, layOut(panel).derived);
}

/** Settings that take all warnings away: true air, many bubbles, fine cells. */
const SOUND = ['record.span=10 s', 'grid.across=40'];

describe('warnings', () => {
  it('name the softened gas of a sound case and nothing else', () => {
    expect(warningsOf(...SOUND)).toEqual([expect.stringContaining('the gas is softened: 200 kg/m3')]);
  });

  it('name a gap below 1.694 capillary lengths, 4.62 mm in water at 20 C, and none above', () => {
    // derived there from Bretherton 1961, plane form
    expect(warningsOf(...SOUND, 'channel.gap=4.5 mm', 'gas.bubble.diameter=3 mm', 'gas.start=[]').join('\n')).toContain(
      'gap 4.5 mm is below 4.62 mm',
    );
    expect(warningsOf(...SOUND, 'channel.gap=4.8 mm', 'gas.bubble.diameter=3 mm', 'gas.start=[]').join('\n')).not.toContain('is below');
  });

  it('name a bubble of fewer than 16 cells, with the grid that has them', () => {
    const coarse = warningsOf('record.span=10 s').find((text) => text.includes('cells, fewer than 16'));
    expect(coarse).toContain('8 cells');
    expect(coarse).toContain('grid.across to 32');
    expect(warningsOf('record.span=10 s', 'grid.across=32').join('\n')).not.toContain('fewer than 16');
  });

  it('name a recording of fewer than two swept windows', () => {
    expect(warningsOf(...SOUND, 'swept.within=6 s').join('\n')).toContain('record.span 10 s holds fewer than two separate windows');
  });

  it('name a recording that holds broken periods of air on and off, with the span that holds whole ones', () => {
    const pulse = 'gas.pulse={on: 2 s, off: 1.5 s}';
    const broken = warningsOf(...SOUND, pulse).find((text) => text.includes('gas.pulse'));
    expect(broken).toContain('record.span 10 s is no whole number of periods of gas.pulse (3.5 s)');
    expect(broken).toContain('Set record.span to 10.5 s');
    expect(warningsOf(...SOUND, pulse, 'record.span=10.5 s').join('\n')).not.toContain('gas.pulse');
    expect(warningsOf(...SOUND, pulse, 'record.span=1.2 s', 'swept.within=0.2 s').join('\n')).toContain('Set record.span to 3.5 s');
  });

  it('name a recording of few bubbles, with the time that has enough', () => {
    const few = warningsOf('grid.across=40', 'record.span=100 ms').find((text) => text.includes('bubbles are let in'));
    const needed_s = /record\.span to (\d+) s/.exec(few ?? '')?.[1];
    expect(warningsOf('grid.across=40', `record.span=${needed_s} s`).join('\n')).not.toContain('bubbles are let in');
  });
});

describe('swathe check', () => {
  const bench = new Bench();
  beforeAll(() => {
    bench.file('tiny.yaml', TINY);
  });
  afterAll(() => bench.remove());

  it('prints the numbers that follow from a case', async () => {
    const { exit, out } = await bench.swathe('check', 'tiny.yaml');
    expect(exit).toBe(0);
    for (const text of [
      'Short piece for tests',
      '8 mm x 36 mm',
      'tilted 10 deg',
      'Re ',
      'Eo ',
      'Mo ',
      'tau ',
      '16 across x 72 along = 1 152 cells of 0.5 mm',
    ]) {
      expect(out).toContain(text);
    }
    expect(out).toMatch(/memory +[\d.]+ [kM]B/);
    expect(out).toMatch(/wall time +about /);
    expect(out).toContain('warning: a bubble of 4 mm has 8 cells');
  });

  it('says what the air costs, and what a cubic metre of permeate takes where a flux is given', async () => {
    const { out } = await bench.swathe('check', 'tiny.yaml', '--set', 'air.flux=25 L/(m2 h)');
    // by hand: 0.8 m3/(m2 h) of 1.204 kg/m3 at 42.6 kJ/kg are 11.4 W/m2; by 25 L/(m2 h) 0.456 kWh/m3
    expect(out).toMatch(/^air +0\.8 m3\/\(m2 h\) against 34\.3 kPa, blower 60 %: 11\.4 W\/m2, 0\.45\d kWh per m3 of permeate$/m);
    expect((await bench.swathe('check', 'tiny.yaml')).out).toMatch(/W\/m2$/m);
  });

  it('prints the same as JSON', async () => {
    const { exit, out } = await bench.swathe('check', 'tiny.yaml', '--json', '--set', 'channel.tilt=0 deg');
    expect(exit).toBe(0);
    const read = JSON.parse(out);
    expect(read.case.channel).toMatchObject({ gap_m: 0.008, tilt_rad: 0 });
    expect(read.derived).toMatchObject({ nx: 72, ny: 16 });
    expect(read.forecast.cells).toBe(1152);
    expect(read.forecast.updates).toBe(1152 * read.forecast.steps);
    expect(read.forecast.wallTime_s).toBeCloseTo(read.forecast.updates / read.forecast.updatesPerSecond, 9);
    expect(read.warnings.length).toBeGreaterThan(0);
  });

  // other work on the machine may come or go between the two
  it('foretells the time a run takes within a factor of three', { retry: 2 }, async () => {
    const forecast = JSON.parse((await bench.swathe('check', 'tiny.yaml', '--json', '--set', 'record.span=1 s')).out).forecast;
    const start = performance.now();
    const { exit } = await bench.swathe('run', 'tiny.yaml', '--no-frames', '--quiet', '--set', 'record.span=1 s');
    const took_s = (performance.now() - start) / 1000;
    expect(exit).toBe(0);
    // start and end of a process included; the machine may be shared
    expect(took_s).toBeGreaterThan(forecast.wallTime_s / 3);
    expect(took_s).toBeLessThan(3 * forecast.wallTime_s + 3);
  });
});
