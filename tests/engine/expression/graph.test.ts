import fc from 'fast-check';
import { describe, expect, it } from 'vitest';

import {
  addTree,
  compileProgram,
  dependsOn,
  ExpressionGraph,
  kinksOf,
  parseFormula,
  substitute,
  type NodeId,
} from '@/engine/expression';

function build(text: string, graph = new ExpressionGraph()) {
  const names = new Map<string, NodeId>([
    ['x', graph.state(0)],
    ['y', graph.state(1)],
    ['a', graph.parameter(0)],
    ['b', graph.parameter(1)],
  ]);
  const parsed = parseFormula(text);
  if (!parsed.ok) throw new Error(parsed.failure.message);
  const added = addTree(graph, parsed.tree, (symbol) => names.get(symbol) ?? null);
  return { graph, added, names };
}

function node(text: string, graph?: ExpressionGraph): NodeId {
  const { added } = build(text, graph);
  if (!added.ok) throw new Error(added.failure.message);
  return added.node;
}

describe('sharing and simplification', () => {
  it.each([
    ['x + y', 'y + x'],
    ['x*y', 'y*x'],
    ['x*x', 'x^2'],
    ['0 + x', 'x'],
    ['x*1/1', 'x'],
    ['x - (-y)', 'x + y'],
    ['-(-x)', 'x'],
    ['-(x - y)', 'y - x'],
    ['x - x', '0'],
    ['0*x', '0'],
    ['x^0', '1'],
    ['x^1', 'x'],
    ['x^-2', '1/(x*x)'],
    ['x^0.5', 'sqrt(x)'],
    ['2*3 + exp(0)', '7'],
    ['1 < 2 ? x : y', 'x'],
    ['min(x, x)', 'x'],
    ['x > y ? a : b', 'y < x ? a : b'],
    ['(-x)*y', '-(x*y)'],
  ])('%s is the node of %s', (one, other) => {
    const graph = new ExpressionGraph();
    expect(node(one, graph)).toBe(node(other, graph));
  });

  it.each(['0/x', 'x/x', 'x/0', 'x^a', '0^x'])('%s is left as it is, being undefined somewhere', (text) => {
    const graph = new ExpressionGraph();
    expect(graph.isConstant(node(text, graph))).toBe(false);
  });

  it('keeps one node for equal expressions among thousands', () => {
    const graph = new ExpressionGraph();
    const first = Array.from({ length: 5000 }, (_, k) =>
      graph.multiply(graph.state(k), graph.constant(k + 2)),
    );
    const { size } = graph;
    const second = Array.from({ length: 5000 }, (_, k) =>
      graph.multiply(graph.constant(k + 2), graph.state(k)),
    );
    expect(second).toEqual(first);
    expect(graph.size).toBe(size);
  });
});

describe('queries', () => {
  it('knows what a node depends on', () => {
    const graph = new ExpressionGraph();
    const mixed = node('a*x + sin(t)', graph);
    expect([
      graph.dependsOnState(mixed),
      graph.dependsOnParameter(mixed),
      graph.dependsOnTime(mixed),
    ]).toEqual([true, true, true]);
    expect(graph.dependsOnState(node('a + b', graph))).toBe(false);
    expect(dependsOn(graph, [mixed], graph.parameter(0))).toBe(true);
    expect(dependsOn(graph, [mixed], graph.parameter(1))).toBe(false);
  });

  it('counts kinks of state and time, not of parameters', () => {
    const graph = new ExpressionGraph();
    expect(kinksOf(graph, [node('max(a, b)*x', graph)])).toHaveLength(0);
    expect(kinksOf(graph, [node('max(a, x)', graph)])).toHaveLength(1);
    expect(kinksOf(graph, [node('x < y ? x : y', graph)])).toHaveLength(2);
    expect(kinksOf(graph, [node('abs(t)', graph)])).toHaveLength(1);
  });

  it('reports an unknown symbol with its place', () => {
    const { added } = build('x + 2*unknown');
    expect(added).toMatchObject({
      ok: false,
      failure: { message: 'The symbol unknown is unknown.', range: { from: 6, to: 13 } },
    });
  });
});

describe('limits', () => {
  it('answers a full graph with a refusal', () => {
    const graph = new ExpressionGraph(12);
    const { added } = build('x*y + x/y + exp(x) - log(y)*sin(x*a*b)', graph);
    expect(graph.full).toBe(true);
    expect(graph.size).toBe(12);
    expect(added).toMatchObject({
      ok: false,
      failure: { message: expect.stringMatching(/more than 12 parts/) as string },
    });
  });
});

describe('substitute', () => {
  it('equals the formula with the replacement written in', () => {
    const graph = new ExpressionGraph();
    const original = node('a*x/(1 + a*y^2) + exp(-a)', graph);
    const replacement = node('x + b', graph);
    const [replaced] = substitute(graph, [original], (each) =>
      each === graph.parameter(0) ? replacement : null,
    );
    expect(replaced).toBe(node('(x + b)*x/(1 + (x + b)*y^2) + exp(-(x + b))', graph));
  });

  it('leaves values alone when parameters become numbers', () => {
    const number = fc.double({ min: 0.1, max: 3, noNaN: true });
    fc.assert(
      fc.property(number, number, number, number, (x, y, a, b) => {
        const graph = new ExpressionGraph();
        const original = node('a^b*x - log(a + y)/(b*x)', graph);
        const [folded] = substitute(graph, [original], (each) =>
          each === graph.parameter(0)
            ? graph.constant(a)
            : each === graph.parameter(1)
              ? graph.constant(b)
              : null,
        );
        const out = new Float64Array(2);
        const program = compileProgram(graph, [[original, folded as NodeId]], 2, 2);
        program.prepare(Float64Array.of(a, b));
        program.evaluate(0, 0, Float64Array.of(x, y), out);
        expect(graph.dependsOnParameter(folded as NodeId)).toBe(false);
        expect(out[1]).toBe(out[0]);
      }),
    );
  });
});
