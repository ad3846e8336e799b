import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';

import { formatComplex, formatNumber, formatShort, formatToTolerance } from '@/graphics/numbers';

describe('numbers for people', () => {
  it.each([
    [0, '0'],
    [0.5, '0.5000'],
    [-1.25, '−1.250'],
    [12345.678, '12350'],
    [99999.9, '1.000 × 10⁵'],
    [0.00012345, '1.234 × 10⁻⁴'],
    [-3e-9, '−3.000 × 10⁻⁹'],
    [Infinity, '∞'],
    [NaN, 'undefined'],
  ])('%s is written %s', (value, text) => {
    expect(formatNumber(value)).toBe(text);
  });

  it('drops zeros that say nothing', () => {
    expect(formatShort(0.5)).toBe('0.5');
    expect(formatShort(3)).toBe('3');
    expect(formatShort(100)).toBe('100');
    expect(formatShort(2e-7)).toBe('2 × 10⁻⁷');
  });

  it('shows only the digits that an uncertainty supports', () => {
    expect(formatToTolerance(1.23456789, 1e-3)).toBe('1.23');
    expect(formatToTolerance(1.23456789, 1e-6)).toBe('1.23457');
    expect(formatToTolerance(1.23456789, 1e-30)).toBe('1.2345679');
  });

  it('writes conjugates as a pair', () => {
    expect(formatComplex(0.032, 0.41, true, 2)).toBe('0.032 ± 0.41i');
    expect(formatComplex(-1, -2, false, 2)).toBe('−1.0 − 2.0i');
  });

  it('keeps four significant digits of any number', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e12, max: 1e12 }), (value) => {
        const [mantissa = '', power] = formatNumber(value).replace('−', '-').split(' × 10');
        const exponent = [...(power ?? '⁰')]
          .map((c) => (c === '⁻' ? '-' : String('⁰¹²³⁴⁵⁶⁷⁸⁹'.indexOf(c))))
          .join('');
        const read = Number(`${mantissa}e${exponent}`);
        expect(Math.abs(read - value)).toBeLessThanOrEqual(
          Math.abs(value) * 5.01e-4 + Number.MIN_VALUE * 1e3,
        );
      }),
    );
  });
});
