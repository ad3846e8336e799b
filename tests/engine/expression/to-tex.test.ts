import fc from 'fast-check';
import katex from 'katex';
import { describe, expect, it } from 'vitest';

import { parseFormula, symbolToTex, toTex, type TexOptions } from '@/engine/expression';

import { formulas } from './formula-arbitrary';

function tex(text: string, options?: TexOptions): string {
  const parsed = parseFormula(text);
  if (!parsed.ok) throw new Error(parsed.failure.message);
  return toTex(parsed.tree, options);
}

describe('symbols', () => {
  it.each([
    ['x', 'x'],
    ['y1', 'y_{1}'],
    ['m_y1', 'm_{y1}'],
    ['a_y1_x', 'a_{y1,\\,x}'],
    ['alpha', '\\alpha'],
    ['theta0', '\\theta_{0}'],
    ['Gamma', '\\Gamma'],
    ['birth', '\\mathrm{birth}'],
    ['m_young', 'm_{\\mathrm{young}}'],
    ['beta_beta', '\\beta_{\\beta}'],
    ['x_', 'x_{\\_}'],
    ['frac', '\\mathrm{frac}'],
    ['input', '\\mathrm{input}'],
  ])('%s is %s', (symbol, expected) => {
    expect(symbolToTex(symbol)).toBe(expected);
  });

  it.each(['\\href{javascript:alert(1)}{x}', 'x}\\def\\x{', '$', '', 'x y', '<b>', 'x_{1}'])(
    'turns %s, which is no symbol, into a question mark',
    (text) => {
      expect(symbolToTex(text)).toBe('\\mathrm{?}');
    },
  );
});

describe('formulas', () => {
  it.each([
    ['r*x*(1 - x/K)', 'r \\, x \\, \\left(1 - \\frac{x}{K}\\right)'],
    ['a*x*y/(1 + a*h*x)', '\\frac{a \\, x \\, y}{1 + a \\, h \\, x}'],
    ['a - (b - c)', 'a - \\left(b - c\\right)'],
    ['a + (b - c)', 'a + b - c'],
    ['a + (-b)', 'a + \\left(-b\\right)'],
    ['-(a + b)*c', '-\\left(a + b\\right) \\, c'],
    ['2*3*x^2', '2 \\cdot 3 \\, x^{2}'],
    ['(-x)^2', '\\left(-x\\right)^{2}'],
    ['-x^2', '-x^{2}'],
    ['(a/b)^n', '\\left(\\frac{a}{b}\\right)^{n}'],
    ['y1^2', '{y_{1}}^{2}'],
    ['sqrt(abs(x))', '\\sqrt{\\left|x\\right|}'],
    ['log(x)', '\\ln\\left(x\\right)'],
    ['min(x, y)', '\\min\\left(x,\\, y\\right)'],
    ['2.5e-7*x', '2.5 \\cdot 10^{-7} \\, x'],
    ['(x <= y)*z', '\\left[x \\le y\\right] \\, z'],
    ['x > 1 ? a : b', '\\begin{cases} a & \\text{if } x > 1 \\\\ b & \\text{otherwise} \\end{cases}'],
  ])('%s', (text, expected) => {
    expect(tex(text)).toBe(expected);
  });

  it('uses the given TeX of symbols', () => {
    const symbol = (name: string) => (name === 'm_y1' ? '\\mu_{\\mathrm{f}}' : null);
    expect(tex('m_y1*x', { symbol })).toBe('\\mu_{\\mathrm{f}} \\, x');
  });

  it('is always TeX that can be typeset', () => {
    fc.assert(
      fc.property(formulas({ smooth: false }), (text) => {
        const html = katex.renderToString(tex(text), { throwOnError: true, strict: 'error', trust: false });
        expect(html).toContain('katex');
      }),
      { numRuns: 300 },
    );
  });
});
