import { describe, expect, it } from 'vitest';
import { caseSchema, caseText, galleryNames, galleryText, layOut, readCase } from '../../cases/index.ts';
import { CaseError, UsageError } from '../../solver/index.ts';

const base = '# a comment to keep\nchannel:\n  gap: 8 mm # narrow\n  height: 100 mm\ngas: {supply: 0.4 m3/(m2 h)}\n';
const refusal = (text: string, sets: string[] = []): string => {
  try {
    readCase(text, 'panel.yaml', sets);
  } catch (error) {
    if (error instanceof CaseError) return error.message;
    throw error;
  }
  return 'accepted';
};

describe('a case text', () => {
  it('fills in what it does not say', () => {
    const panel = readCase(base, 'panel.yaml');
    expect(panel.channel.membranes).toEqual(['left', 'right']);
    expect(panel.channel.return).toEqual({ loss: 1.5 });
    expect(panel.contactAngle_rad).toBeCloseTo(Math.PI / 3, 12);
    expect(panel.gas.serves_m).toBeCloseTo(0.1, 12);
    expect(panel.gas.across).toEqual({ at_m: [0.004] });
    expect(panel.gas.softened).toBe(false);
    expect(panel.gas.density_kg_m3).toBeCloseTo(1.2041, 4);
    expect(panel.gas.viscosity_Pa_s * 1e6).toBeCloseTo(18.13, 2);
    expect(panel.liquid.density_kg_m3).toBeCloseTo(998.207, 3);
    expect(panel.grid).toEqual({ across: 40, speed_m_s: 0.3 });
    expect(panel.swept).toEqual({ above_Pa: 0.5, within_s: 1 });
  });

  it('takes a custom liquid', () => {
    const { liquid, surfaceTension_N_m } = readCase(
      `${base}liquid: {kind: custom, density: 1.01 kg/L, viscosity: 3 mPa s, surface tension: 60 mN/m}\n`,
      'panel.yaml',
    );
    expect(liquid.density_kg_m3).toBeCloseTo(1010, 9);
    expect(liquid.viscosity_Pa_s).toBeCloseTo(3e-3, 12);
    expect(surfaceTension_N_m).toBeCloseTo(0.06, 12);
  });

  it('gives way to overrides, which may add what is not there', () => {
    const panel = readCase(base, 'panel.yaml', [
      'channel.tilt=25 deg',
      'grid.across=20',
      'channel.membranes=[right]',
      'gas.bubble.diameter=4 mm',
    ]);
    expect(panel.channel.tilt_rad).toBeCloseTo((25 * Math.PI) / 180, 12);
    expect(panel.channel.membranes).toEqual(['right']);
    expect(panel.grid.across).toBe(20);
    expect(panel.gas.bubble).toEqual({ diameter_m: 0.004, kinds: [{ diameter_m: 0.004, spread: 0.15, share: 1 }] });
    const fin = '{from: 40 mm, across: 2 mm, length: 4 mm, thickness: 1 mm}';
    expect(readCase(`${base}fins: [${fin}]\n`, 'panel.yaml', ['fins.0.from=50 mm']).fins[0]?.[0]?.[1]).toBeCloseTo(0.048, 9);
  });

  it('names the override in the message where the override is at fault', () => {
    expect(refusal(base, ['channel.tilt=25'])).toBe(
      '--set channel.tilt:1:1: channel.tilt: has no unit (read: 25); allowed: -60 deg to 60 deg. Write an angle as in "20 deg"',
    );
    expect(refusal(base, ['chanel.tilt=25 deg'])).toContain('--set chanel.tilt:1:1: chanel: is not a known key');
    expect(refusal(base, ['channel.tild=25 deg'])).toContain('--set channel.tild:1:1: channel.tild: is not a known key (read: 25 deg)');
    expect(refusal(base, ['tilt'])).toBe(
      '--set tilt:1:1: is not of the form path=value (read: tilt). Write for example "channel.tilt=25 deg"',
    );
    expect(refusal(base, ['title.x=3'])).toContain('--set title.x:1:1: title: is a map, not a single value');
    expect(refusal(`${base}title: A\n`, ['title.x=3'])).toContain('does not lead to a place in this case');
    expect(refusal(base, ['channel.gap='])).toContain('has no value');
    expect(refusal(base, ['grid={across: 30'])).toContain('--set grid:1:');
    // a fault of the file stays a fault of the file
    expect(refusal(base.replace('8 mm', '8'), ['channel.tilt=25 deg'])).toContain('panel.yaml:3:8: channel.gap');
  });

  it('as run holds the overrides and the comments, and reads as the same case', () => {
    const sets = ['channel.tilt=25 deg', 'gas.seed=7', 'fins=[{from: 40 mm, across: 2 mm, length: 4 mm, thickness: 1 mm}]'];
    const text = caseText(base, sets);
    expect(text).toContain('# a comment to keep');
    expect(text).toContain('# narrow');
    expect(readCase(text, 'case.yaml')).toEqual(readCase(base, 'panel.yaml', sets));
    expect(caseText(base)).toBe(base);
    expect(caseText(base, [])).toBe(base);
  });

  it('is refused as a whole with every fault in it', () => {
    const message = refusal('channel: {gap: 8, height: 1 kg}\ngas: {supply: 1 m, seed: x}\n');
    expect(message.split('\n')).toHaveLength(4);
  });
});

describe('the schema for editors', () => {
  it('requires what a case must say and knows ranges and words', () => {
    const schema = caseSchema() as {
      required: string[];
      additionalProperties: boolean;
      properties: Record<string, { required?: string[]; description?: string }>;
    };
    expect(schema.required).toEqual(['channel', 'gas']);
    expect(schema.additionalProperties).toBe(false);
    expect(schema.properties.channel?.required).toEqual(['gap', 'height']);
    expect(schema.properties.gas?.required).toEqual(['supply']);
    expect(JSON.stringify(schema.properties.channel)).toContain('a length with its unit, 1 mm to 100 mm');
    expect(JSON.stringify(schema.properties.channel)).toContain('"enum":["left","right"]');
    expect(JSON.stringify(schema.properties.grid)).toContain('"type":"integer","minimum":12,"maximum":400');
  });

  it('takes every quantity of the gallery by its pattern', () => {
    const pattern = new RegExp(
      (caseSchema() as { properties: { channel: { properties: { gap: { pattern: string } } } } }).properties.channel.properties.gap.pattern,
    );
    expect(pattern.test('8 mm')).toBe(true);
    expect(pattern.test('0.4 m3/(m2 h)')).toBe(true);
    expect(pattern.test('8')).toBe(false);
  });
});

describe('the gallery', () => {
  it('holds the six cases of the Brackenfold works', () => {
    expect(galleryNames()).toEqual(['finned-panel', 'single-bubble', 'staggered-fins', 'tilted-panel', 'vertical-panel', 'wide-gap']);
    expect(() => galleryText('tiled-panel')).toThrow(UsageError);
  });

  it.each(galleryNames())('%s can be laid out, is of true air, and has 16 cells to a bubble', (name) => {
    const panel = readCase(galleryText(name), `${name}.yaml`);
    const { derived } = layOut(panel);
    expect(panel.gas.softened).toBe(false);
    expect(panel.gas.density_kg_m3).toBeCloseTo(panel.gas.airDensity_kg_m3, 9);
    expect(derived.cellsPerBubble).toBeGreaterThanOrEqual(16);
    // less than two minutes at 50 million cell updates a second
    expect(derived.nx * derived.ny * derived.steps).toBeLessThan(5e9);
  });
});
