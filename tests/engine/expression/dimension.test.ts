import { describe, expect, it } from 'vitest';

import { describeDimension, dimensionOf, parseFormula, parseUnit, type Dimension } from '@/engine/expression';

function unit(text: string): Dimension | null {
  const result = parseUnit(text);
  if (!result.ok) throw new Error(result.message);
  return result.dimension;
}

function described(text: string): string | null {
  const dimension = unit(text);
  return dimension === null ? null : describeDimension(dimension);
}

describe('unit texts', () => {
  it.each([
    ['1/week', 'week^-1'],
    ['per week', 'week^-1'],
    ['week^-1', 'week^-1'],
    ['week⁻¹', 'week^-1'],
    ['week-1', 'week^-1'],
    ['per m²', 'm^-2'],
    ['ind/m^2', 'ind m^-2'],
    ['ind m-2', 'ind m^-2'],
    ['m² / (ind week)', 'm^2 ind^-1 week^-1'],
    ['m²/ind/week', 'm^2 ind^-1 week^-1'],
    ['individuals per hour', 'ind hour^-1'],
    ['kg^(1/2)', 'kg^0.5'],
    ['1', 'no unit'],
    ['%', 'no unit'],
    ['day/day', 'no unit'],
    ['', null],
    ['  ', null],
  ])('%s is %s', (text, expected) => {
    expect(described(text)).toBe(expected);
  });

  it('relates units of time by their lengths', () => {
    expect((unit('1/day')?.scale ?? 0) / (unit('1/week')?.scale ?? 0)).toBeCloseTo(7, 12);
    expect((unit('year')?.scale ?? 0) / (unit('month')?.scale ?? 0)).toBeCloseTo(12, 12);
    expect(unit('%')?.scale).toBe(0.01);
  });

  it.each(['/week', 'a//b', '(((', 'm^', 'a*', 'per', 'm)', '^2', '<b>', '('.repeat(60)])(
    'refuses %s',
    (text) => {
      expect(parseUnit(text)).toMatchObject({ ok: false });
    },
  );
});

describe('units of formulas', () => {
  const units: Record<string, string> = {
    r: '1/week',
    m: '1/day',
    x: 'ind/m^2',
    K: 'ind/m²',
    a: 'm^2/(ind week)',
    h: 'week',
    t: 'week',
    q: '',
  };
  const report = (text: string) => {
    const parsed = parseFormula(text);
    if (!parsed.ok) throw new Error(parsed.failure.message);
    return dimensionOf(parsed.tree, (symbol) => unit(units[symbol] ?? ''));
  };

  it.each([
    ['r*x*(1 - x/K)', 'week^-1 ind m^-2'],
    ['a*x/(1 + a*h*x)', 'week^-1'],
    ['exp(-r*t)*x', 'ind m^-2'],
    ['sqrt(x*K) - x', 'ind m^-2'],
    ['x^2/(K^2 + x^2)', 'no unit'],
    ['(x/K)^q', 'no unit'],
    ['7*m + r', 'week^-1'],
    ['q + r', 'week^-1'],
    ['max(x, 0)', 'ind m^-2'],
    ['x < K ? r : 2*r', 'week^-1'],
  ])('%s is in %s', (text, expected) => {
    const { dimension, problems } = report(text);
    expect(problems).toEqual([]);
    expect(dimension === null ? null : describeDimension(dimension)).toBe(expected);
  });

  it('knows nothing of a symbol without unit', () => {
    expect(report('q*r')).toEqual({ dimension: null, problems: [] });
  });

  it.each([
    ['2 + (r + x)*h', 'This adds ind m^-2 to week^-1.', 'r + x'],
    ['r - x', 'This subtracts ind m^-2 from week^-1.', 'r - x'],
    ['r + m', 'This adds day^-1 to week^-1; convert one of them.', 'r + m'],
    ['1 + a*x', 'This adds week^-1 to a number without unit.', '1 + a*x'],
    ['2*exp(x)', 'The argument of exp should have no unit, and this has ind m^-2.', 'x'],
    ['exp(m*h)', 'The argument of exp mixes units of one kind (a factor of 7); convert one of them.', 'm*h'],
    ['2^x', 'An exponent should have no unit, and this has ind m^-2.', 'x'],
    ['x < r ? 1 : 0', 'This compares ind m^-2 with week^-1.', 'x < r'],
    ['min(x, r)', 'This compares ind m^-2 with week^-1.', 'min(x, r)'],
    ['q > 1 ? x : r', 'This chooses between ind m^-2 and week^-1.', 'q > 1 ? x : r'],
  ])('%s: %s', (text, message, place) => {
    const { problems } = report(text);
    expect(problems.map((problem) => problem.message)).toEqual([message]);
    const range = problems[0]?.range;
    expect(text.slice(range?.from, range?.to)).toBe(place);
  });

  it('says that a power of a quantity by a symbol has no defined unit', () => {
    expect(report('x^q').problems[0]?.message).toMatch(/divide it by a reference first/);
  });
});
