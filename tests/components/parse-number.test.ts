import fc from 'fast-check';
import { describe, expect, it } from 'vitest';

import { parseNumber, showNumber } from '@/lib/parse-number';

describe('parseNumber', () => {
  it.each([
    ['0.001', 0.001],
    ['0,001', 0.001],
    ['1e-3', 0.001],
    ['1E−3', 0.001],
    [' 12 ', 12],
    ['.5', 0.5],
    ['5.', 5],
    ['+2', 2],
    ['-3', -3],
    ['−3,5', -3.5],
    ['1,23', 1.23],
    ['1,2345', 1.2345],
    ['1,234,567', 1234567],
    ['1.234.567', 1234567],
    ['1,234.5', 1234.5],
    ['1.234,5', 1234.5],
    ['1 200', 1200],
    ['12 345,6', 12345.6],
    ['1.234', 1.234],
  ])('understands %s', (text, value) => {
    expect(parseNumber(text)).toEqual({ value });
  });

  it.each([
    ['', /needed/],
    ['abc', /is not a number/],
    ['1,234', /could mean 1\.234 or 1234/],
    ['12,345', /could mean/],
    ['1..2', /do not fit together/],
    ['1,2,3', /do not fit together/],
    ['1 2', /space inside/],
    ['1e999', /too large/],
    ['Infinity', /is not a number/],
    ['50%', /Write 0\.5 instead/],
    ['.', /is not a number/],
    ['0x10', /is not a number/],
  ])('refuses %s and says why', (text, reason) => {
    const parsed = parseNumber(text);
    expect('problem' in parsed ? parsed.problem : '').toMatch(reason);
  });

  it('reads back what it shows', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const parsed = parseNumber(showNumber(value, 17));
        expect('value' in parsed && Math.abs(parsed.value - value) <= 1e-15 * Math.abs(value)).toBe(true);
      }),
    );
  });

  it('shows a true minus and no rounding dust', () => {
    expect(showNumber(-0.5)).toBe('−0.5');
    expect(showNumber(0.1 + 0.2)).toBe('0.3');
    expect(showNumber(1e-7)).toBe('1e−7');
  });
});
