import { describe, expect, it } from 'vitest';
import { type Measure, readQuantity } from '../../cases/units.ts';

const value = (text: string, measure: Measure): number => {
  const found = readQuantity(text, measure);
  if (!('value' in found)) throw new Error(`${text}: ${found.problem}`);
  return found.value;
};
const problem = (text: string, measure: Measure): string => {
  const found = readQuantity(text, measure);
  return 'value' in found ? `read as ${found.value}` : found.problem;
};

describe('a quantity', () => {
  it.each<[string, Measure, number]>([
    ['8 mm', 'length', 0.008],
    ['8mm', 'length', 0.008],
    ['0.8 cm', 'length', 0.008],
    ['-2.5e3 um', 'length', -0.0025],
    ['+.5 m', 'length', 0.5],
    ['0.4 m3/(m2 h)', 'supply', 0.4 / 3600],
    ['0.4 m3/m2/h', 'supply', 0.4 / 3600],
    ['400 L/(m2 h)', 'supply', 0.4 / 3600],
    ['10 g/L', 'density', 10],
    ['998 kg/m3', 'density', 998],
    ['20 deg', 'angle', Math.PI / 9],
    ['0.5 rad', 'angle', 0.5],
    ['20 degC', 'temperature', 293.15],
    ['293.15 K', 'temperature', 293.15],
    ['2e-4 Pa s', 'viscosity', 2e-4],
    ['1 mPa s', 'viscosity', 1e-3],
    ['72 mN/m', 'tension', 0.072],
    ['2 min', 'time', 120],
    ['15 %', 'share', 0.15],
    ['0.15', 'share', 0.15],
  ])('%s reads as SI', (text, measure, expected) => {
    expect(value(text, measure)).toBeCloseTo(expected, 12);
  });

  it('reads signs that look alike: raised and full-width digits, micro and degree sign, long minus', () => {
    expect(value('0.4 m³/(m² h)', 'supply')).toBeCloseTo(0.4 / 3600, 15);
    expect(value('８ mm', 'length')).toBeCloseTo(0.008, 15);
    expect(value('5 µm', 'length')).toBeCloseTo(5e-6, 15);
    expect(value('5 μm', 'length')).toBeCloseTo(5e-6, 15);
    expect(value('20 °C', 'temperature')).toBeCloseTo(293.15, 10);
    expect(value('20°', 'angle')).toBeCloseTo(Math.PI / 9, 12);
    expect(value('−3 mm', 'length')).toBeCloseTo(-0.003, 15);
    expect(value('2 mPa·s', 'viscosity')).toBeCloseTo(0.002, 15);
  });

  it('is refused without a unit, with a wrong or an unknown one', () => {
    expect(problem('8', 'length')).toBe('has no unit');
    expect(problem('8 kg', 'length')).toBe('has the unit "kg", which does not measure a length');
    expect(problem('8 mmm', 'length')).toBe('has an unknown unit "mmm"');
    expect(problem('0.4 m3/m2 h', 'supply')).toContain('does not measure a gas flow');
    expect(problem('20 deg', 'temperature')).toContain('does not measure a temperature');
    expect(problem('3 mm', 'share')).toContain('plain number');
  });

  it('is refused when it is not finite or not a number', () => {
    expect(problem('1e999 mm', 'length')).toBe('is not finite');
    expect(problem('NaN mm', 'length')).toBe('is not a number with a unit');
    expect(problem('Infinity mm', 'length')).toBe('is not a number with a unit');
    expect(problem('.inf', 'length')).toBe('is not a number with a unit');
    expect(problem('0x10 mm', 'length')).toContain('unknown unit');
    expect(problem('8,5 mm', 'length')).toBe('has a decimal comma');
    expect(problem('8 mm 3 mm', 'length')).toContain('unknown unit');
    expect(problem('', 'length')).toBe('is not a number with a unit');
  });
});
