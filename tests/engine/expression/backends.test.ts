import fc from 'fast-check';
import { describe, expect, it } from 'vitest';

import { compileProgram, differentiateByStates, ExpressionGraph, type NodeId } from '@/engine/expression';
import { emitWasm } from '@/engine/expression/emit-wasm';
import { planProgram } from '@/engine/expression/program';

import { graphOf } from './compiled-formula';
import { formulas, points } from './formula-arbitrary';

/** Same bits; any two not-a-numbers count as the same. */
function expectSameBits(actual: Float64Array, expected: Float64Array): void {
  actual.forEach((value, i) => {
    if (!Object.is(value, expected[i])) expect(value).toBe(expected[i]);
  });
}

describe('WebAssembly and closures', () => {
  it('agree to the last bit on random formulas and their Jacobians', () => {
    let finite = 0;
    const any = formulas({ smooth: false });
    fc.assert(
      fc.property(any, any, points, (f, g, { t, u, p }) => {
        const { graph, nodes } = graphOf([f, g]);
        const jacobian = differentiateByStates(graph, nodes, 2);
        const groups = [nodes, jacobian];
        const [wasm, closure] = [
          compileProgram(graph, groups, 2, 2, 'wasm'),
          compileProgram(graph, groups, 2, 2, 'closure'),
        ];
        expect([wasm.backend, closure.backend]).toEqual(['wasm', 'closure']);
        const parameters = Float64Array.from(p);
        wasm.prepare(parameters);
        closure.prepare(parameters);
        groups.forEach((group, k) => {
          const [left, right] = [new Float64Array(group.length), new Float64Array(group.length)];
          wasm.evaluate(k, t, Float64Array.from(u), left);
          closure.evaluate(k, t, Float64Array.from(u), right);
          expectSameBits(left, right);
          if (left.every(Number.isFinite)) finite += 1;
        });
      }),
      { numRuns: 1500 },
    );
    // The comparison means something only where most values are numbers.
    expect(finite).toBeGreaterThan(1000);
  });

  it('agree with the formula evaluated by hand', () => {
    const { graph, nodes } = graphOf([
      'a*x/(1 + a*b*x) - sqrt(y)*exp(-t)',
      'x < y ? min(x, a) : max(y, b)^3',
    ]);
    for (const backend of ['wasm', 'closure'] as const) {
      const program = compileProgram(graph, [nodes], 2, 2, backend);
      const out = new Float64Array(2);
      program.prepare(Float64Array.of(1.2, 0.6));
      program.evaluate(0, 0.5, Float64Array.of(2, 0.9), out);
      expect(out[0]).toBeCloseTo((1.2 * 2) / (1 + 1.2 * 0.6 * 2) - Math.sqrt(0.9) * Math.exp(-0.5), 14);
      expect(out[1]).toBeCloseTo(0.9 ** 3, 14);
    }
  });

  it('serves several parameter sets in turn', () => {
    const { graph, nodes } = graphOf(['(a + b)*x', 'exp(a)*exp(b)', 'a', '3']);
    for (const backend of ['wasm', 'closure'] as const) {
      const program = compileProgram(graph, [nodes], 2, 2, backend);
      const out = new Float64Array(4);
      for (const [a, b] of [
        [1, 2],
        [-1, 0.5],
      ] as const) {
        program.prepare(Float64Array.of(a, b));
        program.evaluate(0, 0, Float64Array.of(2, 0), out);
        expect([...out]).toEqual([(a + b) * 2, Math.exp(a) * Math.exp(b), a, 3]);
      }
    }
  });
});

describe('what depends on parameters alone', () => {
  it('is computed in prepare, and only what is read is stored', () => {
    const { graph, nodes } = graphOf(['exp(a*b)*x + exp(a*b)*y', 'log(a)']);
    const plan = planProgram(graph, [nodes], 2, 2);
    expect(plan.prepared).toHaveLength(3);
    expect(plan.stored).toHaveLength(2);
    expect(plan.live[0]).toHaveLength(3);
  });
});

describe('size', () => {
  it('emits very deep expressions without exhausting the stack', () => {
    const graph = new ExpressionGraph();
    let node: NodeId = graph.state(0);
    for (let k = 0; k < 20_000; k += 1) node = graph.add(graph.sin(node), graph.parameter(0));
    const outs = (['wasm', 'closure'] as const).map((backend) => {
      const program = compileProgram(graph, [[node]], 1, 1, backend);
      expect(program.backend).toBe(backend);
      const out = new Float64Array(1);
      program.prepare(Float64Array.of(0.1));
      program.evaluate(0, 0, Float64Array.of(1), out);
      return out;
    });
    expectSameBits(outs[0] as Float64Array, outs[1] as Float64Array);
  });

  it('falls back to closures where a function would be too large', () => {
    const graph = new ExpressionGraph(200_000);
    const roots: NodeId[] = [];
    for (let k = 0; k < 41_000; k += 1) roots.push(graph.multiply(graph.state(k), graph.state(k + 1)));
    const outputs = [...roots, ...roots];
    expect(emitWasm(planProgram(graph, [outputs], 41_001, 0))).toBeNull();
    expect(compileProgram(graph, [outputs], 41_001, 0, 'wasm').backend).toBe('closure');
  });

  it('falls back to closures where the host has no WebAssembly', () => {
    const host = globalThis as { WebAssembly?: unknown };
    const kept = host.WebAssembly;
    const { graph, nodes } = graphOf(['x + a']);
    try {
      delete host.WebAssembly;
      expect(compileProgram(graph, [nodes], 2, 2, 'wasm').backend).toBe('closure');
    } finally {
      host.WebAssembly = kept;
    }
    expect(compileProgram(graph, [nodes], 2, 2, 'wasm').backend).toBe('wasm');
  });
});
