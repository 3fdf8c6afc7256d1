import { describe, expect, it } from 'vitest';
import { count, duration, percent, plain, size } from '../../cli/numbers.ts';

describe('numbers for people', () => {
  it('keep three digits and no exponent where none is needed', () => {
    expect([0, 0.0123456, 1.23456, 12.3456, 1234.56, -0.5, 1e-5, 2.5e-11, 1e8].map((value) => plain(value))).toEqual([
      '0',
      '0.0123',
      '1.23',
      '12.3',
      '1235',
      '-0.5',
      '1.00e-5',
      '2.50e-11',
      '1.00e+8',
    ]);
  });

  it('show what is not there as a dash', () => {
    expect([plain(null), plain(Number.NaN), percent(null), percent(undefined)]).toEqual(['-', '-', '-', '-']);
  });

  it('write shares, counts, times and sizes', () => {
    expect(percent(0.4567)).toBe('45.7 %');
    expect(count(1234567)).toBe('1 234 567');
    expect([duration(0.781), duration(2.34), duration(65), duration(7260)]).toEqual(['0.8s', '2.3s', '1m 5s', '2h 1m']);
    expect([size(0), size(999), size(1500), size(2.5e9)]).toEqual(['0 B', '999 B', '1.5 kB', '2.5 GB']);
  });
});
