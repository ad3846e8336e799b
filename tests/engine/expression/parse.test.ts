import fc from 'fast-check';
import { describe, expect, it } from 'vitest';

import { parseFormula, symbolsOf, type FormulaNode } from '@/engine/expression';
import { LIMITS } from '@/engine/schema/limits';

import { formulas } from './formula-arbitrary';

function tree(text: string): FormulaNode {
  const result = parseFormula(text);
  if (!result.ok) throw new Error(result.failure.message);
  return result.tree;
}

function refusal(text: string) {
  const result = parseFormula(text);
  if (result.ok) throw new Error(`accepted: ${text}`);
  return result.failure;
}

/** Fully parenthesised, to show the grouping. */
function grouped(node: FormulaNode): string {
  switch (node.kind) {
    case 'number':
      return String(node.value);
    case 'symbol':
      return node.name;
    case 'negate':
      return `(-${grouped(node.operand)})`;
    case 'binary':
    case 'compare':
      return `(${grouped(node.left)}${node.operator}${grouped(node.right)})`;
    case 'call':
      return `${node.name}(${node.arguments.map(grouped).join(',')})`;
    case 'conditional':
      return `(${grouped(node.condition)}?${grouped(node.then)}:${grouped(node.otherwise)})`;
  }
}

describe('grouping', () => {
  it.each([
    ['a+b*c^d', '(a+(b*(c^d)))'],
    ['a-b-c', '((a-b)-c)'],
    ['a/b*c', '((a/b)*c)'],
    ['a^b^c', '(a^(b^c))'],
    ['-a^2', '(-(a^2))'],
    ['2^-x', '(2^(-x))'],
    ['-a*b', '((-a)*b)'],
    ['a<b ? c : d<e ? f : g', '((a<b)?c:((d<e)?f:g))'],
    ['a+b>=c-d ? 1 : 0', '(((a+b)>=(c-d))?1:0)'],
    ['max(x, y, 2)/3', '(max(x,y,2)/3)'],
    ['3.*x + .5 + 2e-3', '(((3*x)+0.5)+0.002)'],
  ])('%s is %s', (text, expected) => {
    expect(grouped(tree(text))).toBe(expected);
  });

  it('takes e, i, pi and words of other languages as ordinary symbols', () => {
    const text = 'e*i*pi + in*mod - end/true + null*Infinity + and + not';
    expect(symbolsOf(tree(text))).toEqual([
      'e',
      'i',
      'pi',
      'in',
      'mod',
      'end',
      'true',
      'null',
      'Infinity',
      'and',
      'not',
    ]);
  });
});

describe('ranges', () => {
  it('gives each node its place in the text', () => {
    const text = ' 2 * ( (m_y1 + k) ) - max(x, (y))';
    const root = tree(text);
    if (root.kind !== 'binary' || root.left.kind !== 'binary' || root.right.kind !== 'call')
      throw new Error('shape');
    expect(text.slice(root.from, root.to)).toBe(text.trim());
    expect(text.slice(root.left.from, root.left.to)).toBe('2 * ( (m_y1 + k) )');
    expect(text.slice(root.left.right.from, root.left.right.to)).toBe('m_y1 + k');
    expect(text.slice(root.right.from, root.right.to)).toBe('max(x, (y))');
    const second = root.right.arguments[1] as FormulaNode;
    expect(text.slice(second.from, second.to)).toBe('y');
  });

  it('reads the text of any node as that node again', () => {
    fc.assert(
      fc.property(formulas({ smooth: false }), (text) => {
        const visitAll = (node: FormulaNode): void => {
          expect(grouped(tree(text.slice(node.from, node.to)))).toBe(grouped(node));
          if (node.kind === 'binary') [node.left, node.right].forEach(visitAll);
          if (node.kind === 'call') node.arguments.forEach(visitAll);
          if (node.kind === 'negate') visitAll(node.operand);
          if (node.kind === 'conditional') [node.condition, node.then, node.otherwise].forEach(visitAll);
        };
        visitAll(tree(text));
      }),
      { numRuns: 100 },
    );
  });
});

describe('refusals', () => {
  it.each([
    ['2x', /write 2\*x/, '2*x'],
    ['x y', /no operator between x and y/, 'x*y'],
    ['2 cm', /write 2\*cm/, '2*cm'],
    ['(x)(y)', /write \(\.\.\.\)\*\(\.\.\.\)/, ')*('],
    ['x(1)', /x is no function/, null],
    ['ex(x)', /exp may be meant/, 'exp'],
    ['f(x) = x', /assigns nothing/, '=='],
    ['x = 3', /assigns nothing/, '=='],
    ['2,5*x', /Decimals are written with a point/, '2.5'],
    ['x, y', /comma separates the arguments/, null],
    ['50%', /percent sign/, null],
    ['5!', /factorial/, null],
    ['a.b', /dot belongs inside a number/, null],
    ['a .* b', /dot before an operator/, ''],
    ['"a"', /quotation marks/, null],
    ['[1, 2]', /Lists, matrices/, null],
    ['1:3', /no question mark before it/, null],
    ['a; b', /single expression/, ''],
    ['a ** b', /written with \^/, '^'],
    ['a − b', /minus sign of the keyboard/, '-'],
    ['x²', /written with \^/, '^2'],
    ['α*x', /letters A to Z/, null],
    ['_x', /starts with a letter/, null],
    ['a && b', /nesting them/, null],
    ['x and y', /joins no conditions/, null],
    ['a < b < c', /cannot be chained/, null],
    ['a ? b', /no colon/, null],
    ['(a', /never closed/, null],
    ['a)', /no opening one/, ''],
    ['a +', /ends after \+/, null],
    ['* a', /value is missing before \*/, null],
    ['a * / b', /missing between \* and \//, null],
    ['exp()', /value is missing/, null],
    ['', /empty/, null],
    ['   ', /empty/, null],
    ['sin + 1', /needs its argument in parentheses/, null],
    ['exp(a, b)', /exp takes one argument, and 2 are given/, null],
    ['max(a)', /max takes 2 to 16 arguments, and only one is given/, null],
    ['1e999', /too large/, null],
    ['😀', /not part of the formula language/, ''],
    ['x \\frac{1}', /not part of the formula language/, ''],
    ['x'.repeat(LIMITS.symbolLength + 1), /at most 32 characters/, null],
  ])('%s', (text, message, suggestion) => {
    const failure = refusal(text);
    expect(failure.message).toMatch(message);
    expect(failure.suggestion).toBe(suggestion);
    expect(failure.range.from).toBeLessThanOrEqual(failure.range.to);
    expect(failure.range.to).toBeLessThanOrEqual(text.length);
  });

  it('marks the place of the fault', () => {
    expect(refusal('a + 2x*b').range).toEqual({ from: 4, to: 6 });
    expect(refusal('a + max(b)*c').range).toEqual({ from: 4, to: 10 });
  });
});

describe('limits', () => {
  it.each([
    ['(', '('.repeat(100_000)],
    ['parentheses within the length', '('.repeat(900) + 'x' + ')'.repeat(900)],
    ['calls', 'exp('.repeat(400) + 'x' + ')'.repeat(400)],
    ['signs', '-'.repeat(1900) + 'x'],
    ['conditionals', 'a?b:'.repeat(450) + 'c'],
    ['powers', 'a^'.repeat(900) + 'a'],
    ['a very long sum', 'a+'.repeat(900) + 'a'],
  ])('refuses a bomb of %s instead of failing', (_name, text) => {
    expect(refusal(text).message).toMatch(
      /nested more than 64 deep|at most 2000 are allowed|at most 1200 are allowed/,
    );
  });

  it('accepts a long sum and a deep but lawful nest', () => {
    expect(parseFormula(`${'a+'.repeat(550)}a`).ok).toBe(true);
    expect(parseFormula('('.repeat(60) + 'x' + ')'.repeat(60)).ok).toBe(true);
    expect(parseFormula('('.repeat(64) + 'x' + ')'.repeat(64)).ok).toBe(false);
  });

  it('answers any text with a tree or a refusal', () => {
    const text = fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom(...'ab2.(),?:<=!+-*/^ t') }));
    fc.assert(
      fc.property(text, (input) => {
        const result = parseFormula(input);
        if (!result.ok) expect(result.failure.message).toMatch(/\.$/);
      }),
      { numRuns: 2000 },
    );
  });
});
