import { describe, expect, it } from 'vitest';

import {
  compileProgram,
  differentiate,
  differentiateByStates,
  ExpressionGraph,
  type NodeId,
} from '@/engine/expression';

import { graphOf } from './compiled-formula';

/** d formula / d x and the given closed form, at (x, y) with a, b. */
function pair(
  text: string,
  known: string,
  x: number,
  y = 0.7,
  a = 1.3,
  b = 2.5,
  variable = 'x',
): [number, number] {
  const { graph, nodes } = graphOf([text, known, variable]);
  const [formula, closed, by] = nodes as [NodeId, NodeId, NodeId];
  const [derivative] = differentiate(graph, [formula], by);
  const program = compileProgram(graph, [[derivative as NodeId, closed]], 2, 2, 'closure');
  const out = new Float64Array(2);
  program.prepare(Float64Array.of(a, b));
  program.evaluate(0, 0.4, Float64Array.of(x, y), out);
  return [out[0] as number, out[1] as number];
}

describe('known derivatives', () => {
  it.each([
    ['x^5', '5*x^4'],
    ['x^b', 'b*x^(b - 1)'],
    ['b^x', 'b^x*log(b)'],
    ['x^x', 'x^x*(log(x) + 1)'],
    ['1/(1 + x^2)', '-2*x/(1 + x^2)^2'],
    ['a*x*y/(1 + a*b*x)', 'a*y/(1 + a*b*x)^2'],
    ['x*(1 - (x/a)^b)', '1 - (1 + b)*(x/a)^b'],
    ['exp(-a*x^2)', '-2*a*x*exp(-a*x^2)'],
    ['log(x/(1 + x))', '1/(x*(1 + x))'],
    ['sqrt(1 + x^2)', 'x/sqrt(1 + x^2)'],
    ['sin(a*x)*cos(x)', 'a*cos(a*x)*cos(x) - sin(a*x)*sin(x)'],
    ['tanh(a*x)', 'a*(1 - tanh(a*x)^2)'],
    ['x*y/(x + y)', '(y/(x + y))^2'],
    ['sin(t*x)', 't*cos(t*x)'],
  ])('of %s', (text, known) => {
    for (const x of [0.2, 0.9, 1.7, 3.1]) {
      const [value, expected] = pair(text, known, x);
      expect(value).toBeCloseTo(expected, 12);
    }
  });
});

describe('active branches', () => {
  it.each([
    ['min(x^2, 4)', 1, 2],
    ['min(x^2, 4)', 3, 0],
    ['min(x, x^2)', 1, 1],
    ['max(x^2, 4)', 3, 6],
    ['abs(x^3)', -2, -12],
    ['abs(x)', 0, 1],
    ['x < 1 ? x^2 : 3*x', 0.5, 1],
    ['x < 1 ? x^2 : 3*x', 1, 3],
    ['(x > 1)*x', 2, 1],
    ['x >= 2 ? log(x - 1) : 0', 0, 0],
  ])('d/dx of %s at %d is %d', (text, x, expected) => {
    expect(pair(text, '0', x)[0]).toBeCloseTo(expected, 14);
  });
});

describe('powers at zero', () => {
  it.each([
    ['x^2', 2, 0],
    ['x^1', 2, 1],
    ['x^b', 2.5, 0],
    ['x^b', 1, 1],
    ['x^b', 0, 0],
    ['x^2.5', 9, 0],
    ['y*x^b', 2, 0],
    ['x*y^b', 2.5, 0.7 ** 2.5],
  ])('d/dx of %s with b = %d is %d', (text, b, expected) => {
    expect(pair(text, '0', 0, 0.7, 1.3, b)[0]).toBeCloseTo(expected, 14);
  });

  it('has no false singularity in the exponent', () => {
    expect(pair('x^b', '0', 0, 0.7, 1.3, 2.5, 'b')[0]).toBe(0);
    expect(pair('x^b', 'x^b*log(x)', 0.3, 0.7, 1.3, 2.5, 'b')[0]).toBeCloseTo(0.3 ** 2.5 * Math.log(0.3), 14);
  });

  it('is infinite where the slope truly is', () => {
    expect(pair('sqrt(x)', '0', 0)[0]).toBe(Infinity);
    expect(pair('x^b', '0', 0, 0.7, 1.3, 0.5)[0]).toBe(Infinity);
  });
});

describe('Jacobians', () => {
  it('lie row by row', () => {
    const { graph, nodes } = graphOf(['x*y^2', 'a*x']);
    const jacobian = differentiateByStates(graph, nodes, 2);
    const program = compileProgram(graph, [jacobian], 2, 2);
    const out = new Float64Array(4);
    program.prepare(Float64Array.of(7, 0));
    program.evaluate(0, 0, Float64Array.of(2, 3), out);
    expect([...out]).toEqual([9, 12, 7, 0]);
  });

  it('stays small for a community of thirty: parts are shared', () => {
    const n = 30;
    const graph = new ExpressionGraph();
    const total = graph.sum(Array.from({ length: n }, (_, i) => graph.state(i)));
    const equations = Array.from({ length: n }, (_, i) => {
      const growth = graph.subtract(graph.parameter(i), graph.divide(total, graph.parameter(n)));
      return graph.multiply(graph.state(i), growth);
    });
    const before = graph.size;
    differentiateByStates(graph, equations, n);
    expect(graph.full).toBe(false);
    expect(graph.size - before).toBeLessThan(4 * n * n);
  });
});
