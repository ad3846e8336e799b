import fc from 'fast-check';
import { describe, expect, it } from 'vitest';

import {
  compileDirectional,
  compileProgram,
  differentiateByStates,
  differentiate,
  type NodeId,
} from '@/engine/expression';

import { graphOf } from './compiled-formula';
import { formulas, points } from './formula-arbitrary';

function along(
  text: string,
  u: [number, number],
  v: [number, number],
  p: [number, number] = [1.3, 2.5],
): number[] {
  const { graph, nodes } = graphOf([text]);
  const taylor = compileDirectional(graph, nodes, 2, 2);
  const out = new Float64Array(3);
  taylor.prepare(Float64Array.from(p));
  taylor.evaluate(0.4, Float64Array.from(u), Float64Array.from(v), out);
  return [...out];
}

function expectClose(actual: readonly number[], expected: readonly number[]): void {
  actual.forEach((value, k) => expect(value).toBeCloseTo(expected[k] as number, 11));
}

describe('known derivatives along a direction', () => {
  it('is exact for a cubic polynomial', () => {
    // f(s) = (1 + 2s)^2 (3 - s): f' = 11, f'' = 16, f''' = -24 at s = 0.
    expect(along('x^2*y', [1, 3], [2, -1])).toEqual([11, 16, -24]);
  });

  it.each<[string, (s: number) => number[]]>([
    ['exp(x)', (x) => [Math.exp(x), Math.exp(x), Math.exp(x)]],
    ['log(x)', (x) => [1 / x, -1 / x ** 2, 2 / x ** 3]],
    ['sqrt(x)', (x) => [0.5 * x ** -0.5, -0.25 * x ** -1.5, 0.375 * x ** -2.5]],
    ['sin(x)', (x) => [Math.cos(x), -Math.sin(x), -Math.cos(x)]],
    ['cos(x)', (x) => [-Math.sin(x), -Math.cos(x), Math.sin(x)]],
    ['1/x', (x) => [-1 / x ** 2, 2 / x ** 3, -6 / x ** 4]],
    ['x^b', (x) => [2.5 * x ** 1.5, 3.75 * x ** 0.5, 1.875 * x ** -0.5]],
    ['b^x', (x) => [1, 2, 3].map((k) => Math.log(2.5) ** k * 2.5 ** x)],
    [
      'tanh(x)',
      (x) => {
        const [th, sech2] = [Math.tanh(x), Math.cosh(x) ** -2];
        return [sech2, -2 * th * sech2, sech2 * (4 * th * th - 2 * sech2)];
      },
    ],
    // Saturating response: d^k/dx^k x/(1 + b x) = k! (-b)^(k-1) / (1 + b x)^(k+1).
    [
      'x/(1 + b*x)',
      (x) =>
        [1, 2, 3].map((k) => ([0, 1, 2, 6][k] as number) * (-2.5) ** (k - 1) * (1 + 2.5 * x) ** (-k - 1)),
    ],
  ])('of %s', (text, known) => {
    for (const x of [0.3, 1.1, 2.2]) expectClose(along(text, [x, 0], [1, 0]), known(x));
  });

  it('follows the active branch', () => {
    expect(along('abs(x^3)', [-1, 0], [1, 0])).toEqual([-3, 6, -6]);
    expect(along('max(x^2, y)', [2, 1], [1, 0])).toEqual([4, 2, 0]);
    expect(along('min(x^2, y)', [2, 1], [1, 0])).toEqual([0, 0, 0]);
    expect(along('x < y ? x : x^3', [2, 1], [1, 0])).toEqual([12, 12, 6]);
  });

  it('has no false singularity at zero', () => {
    expect(along('x^b', [0, 0], [1, 0], [1, 2])).toEqual([0, 2, 0]);
    expect(along('x^b', [0, 0], [1, 0], [1, 3])).toEqual([0, 0, 6]);
    expect(along('x^b*y', [0, 1], [0, 1], [1, 2.5])).toEqual([0, 0, 0]);
  });
});

describe('against the derivatives of the graph', () => {
  it('gives the Jacobian along coordinate directions, and directional second and third derivatives', () => {
    let compared = 0;
    fc.assert(
      fc.property(formulas({ smooth: true, depth: 3 }), points, (text, { t, u, p }) => {
        const { graph, nodes } = graphOf([text]);
        const [x, y] = [graph.state(0), graph.state(1)];
        const [first] = differentiate(graph, nodes, x) as [NodeId];
        const [second] = differentiate(graph, [first], x) as [NodeId];
        const [third] = differentiate(graph, [second], x) as [NodeId];
        const [across] = differentiate(graph, nodes, y) as [NodeId];
        const [byParameter] = differentiate(graph, nodes, graph.parameter(0)) as [NodeId];
        const program = compileProgram(graph, [[first, second, third, across, byParameter]], 2, 2);
        const taylor = compileDirectional(graph, nodes, 2, 2);
        const [expected, alongX, alongY, byA] = [5, 3, 3, 1].map((n) => new Float64Array(n)) as [
          Float64Array,
          Float64Array,
          Float64Array,
          Float64Array,
        ];
        // Not a hair from a corner such as sqrt(x^2): there derivatives are differences of huge numbers.
        const state = Float64Array.from(u, (value) => (Math.abs(value) < 1e-6 ? 0 : value));
        program.prepare(Float64Array.from(p));
        taylor.prepare(Float64Array.from(p));
        program.evaluate(0, t, state, expected);
        taylor.byParameter(t, state, 0, byA);
        taylor.evaluate(t, state, Float64Array.of(1, 0), alongX);
        taylor.evaluate(t, state, Float64Array.of(0, 1), alongY);
        const actual = [...alongX, alongY[0] as number, byA[0] as number];
        const size = Math.max(1, ...[...expected].map(Math.abs));
        if (!(size < 1e6) || !actual.every(Number.isFinite)) return;
        compared += 1;
        actual.forEach((value, k) =>
          expect(Math.abs(value - (expected[k] as number))).toBeLessThan(1e-8 * size),
        );
      }),
      { numRuns: 800 },
    );
    expect(compared).toBeGreaterThan(300);
  });

  it('agrees with central differences of the value', () => {
    const { graph, nodes } = graphOf(['a*x*y/(1 + a*b*x + x^2) + exp(-y)*sin(x)', 'x^2.5*tanh(y - x)']);
    const jacobian = differentiateByStates(graph, nodes, 2);
    const program = compileProgram(graph, [nodes, jacobian], 2, 2);
    program.prepare(Float64Array.of(1.1, 0.4));
    const exact = new Float64Array(4);
    program.evaluate(1, 0, Float64Array.of(0.8, 1.7), exact);
    const h = 1e-5;
    for (let j = 0; j < 2; j += 1) {
      const [above, below] = [new Float64Array(2), new Float64Array(2)];
      const at = (sign: number) =>
        Float64Array.of(0.8 + (j === 0 ? sign * h : 0), 1.7 + (j === 1 ? sign * h : 0));
      program.evaluate(0, 0, at(1), above);
      program.evaluate(0, 0, at(-1), below);
      for (let i = 0; i < 2; i += 1) {
        const difference = ((above[i] as number) - (below[i] as number)) / (2 * h);
        expect(exact[i * 2 + j]).toBeCloseTo(difference, 8);
      }
    }
  });
});
