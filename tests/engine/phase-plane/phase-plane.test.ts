import { describe, expect, it } from 'vitest';

import type { PlaneRequest } from '../../../src/engine/phase-plane/contract';
import { flowField } from '../../../src/engine/phase-plane/flow-field';
import { makePlaneSlice } from '../../../src/engine/phase-plane/plane-slice';
import { zeroGrowthLines } from '../../../src/engine/phase-plane/zero-growth-lines';
import type { CompiledSystem } from '../../../src/engine/system/contract';
import { compileProblem, SPLIT_PREDATOR_EQUATIONS } from '../../problems/initial-value-problems';

const request = (x: string, y: string, parts: Partial<PlaneRequest> = {}): PlaneRequest => ({
  x,
  y,
  xRange: [0, 4],
  yRange: [0, 3],
  cells: 48,
  arrows: 10,
  ...parts,
});

function sliceOf(system: CompiledSystem, asked: PlaneRequest, held: number[]) {
  const slice = makePlaneSlice(system, asked, Float64Array.from(held));
  if (!slice) throw new Error('the axes name two states');
  return slice;
}

/** Ends of every segment. */
const ends = (segments: Float64Array) =>
  Array.from({ length: segments.length / 2 }, (_, k) => [segments[2 * k], segments[2 * k + 1]]);

const lengthOf = (segments: Float64Array) => {
  let sum = 0;
  for (let k = 0; k < segments.length; k += 4)
    sum += Math.hypot(segments[k + 2] - segments[k], segments[k + 3] - segments[k + 1]);
  return sum;
};

/** Saturating predator: prey line y = (1 - x/K)(1 + h x), predator line x = 1/(e - h)... with these numbers x = 1. */
const SATURATING = {
  equations: ["x' = x*(1 - x/K) - x*y/(1 + h*x)", "y' = y*(c*x/(1 + h*x) - 1)"],
  parameters: { K: 3, h: 0.5, c: 1.5 },
};

describe('zero-growth lines', () => {
  it('of a saturating predator lie on their closed forms and cover the window', () => {
    const system = compileProblem(SATURATING, true);
    const asked = request('x', 'y');
    const [prey, predator] = zeroGrowthLines(sliceOf(system, asked, [1, 1]), asked);
    expect([prey.state, predator.state]).toEqual(['x', 'y']);
    for (const [x, y] of ends(prey.segments)) expect(y).toBeCloseTo((1 - x / 3) * (1 + 0.5 * x), 5);
    for (const [x] of ends(predator.segments)) expect(x).toBeCloseTo(1, 6);
    expect(lengthOf(predator.segments)).toBeCloseTo(3, 6);
    const xs = ends(prey.segments).map(([x]) => x);
    expect(Math.min(...xs)).toBeCloseTo(0, 6);
    expect(Math.max(...xs)).toBeCloseTo(3, 2);
  });

  it('are joined end to start', () => {
    const system = compileProblem({ equations: ["x' = x^2 + y^2 - 1", "y' = x*y - 0.01"], parameters: {} });
    const asked = request('x', 'y', { xRange: [-2, 2], yRange: [-1.9, 2.1] });
    const [circle, hyperbola] = zeroGrowthLines(sliceOf(system, asked, [0, 0]), asked);
    expect(lengthOf(circle.segments)).toBeCloseTo(2 * Math.PI, 1);
    for (const [x, y] of ends(circle.segments)) expect(Math.hypot(x, y)).toBeCloseTo(1, 3);
    const jumps = (segments: Float64Array) => {
      let count = 0;
      for (let k = 4; k < segments.length; k += 4)
        if (segments[k] !== segments[k - 2] || segments[k + 1] !== segments[k - 1]) count += 1;
      return count;
    };
    expect(jumps(circle.segments)).toBe(0);
    // Closed: the last end is the first start.
    expect([...circle.segments.slice(-2)]).toEqual([...circle.segments.slice(0, 2)]);
    // Two arms, each in one piece.
    expect(jumps(hyperbola.segments)).toBe(1);
  });

  it('leave out cells without values', () => {
    const system = compileProblem({ equations: ["x' = sqrt(x) - 1", "y' = y - 1"], parameters: {} });
    const asked = request('x', 'y', { xRange: [-2, 2] });
    const [x] = zeroGrowthLines(sliceOf(system, asked, [1, 1]), asked);
    expect(x.segments.length).toBeGreaterThan(0);
    for (const [at] of ends(x.segments)) expect(at).toBeCloseTo(1, 3);
  });

  it('hold the other states, or take a total with the composition of the held state', () => {
    const system = compileProblem({ equations: SPLIT_PREDATOR_EQUATIONS, parameters: { eps: 0.5 } }, true);
    const asked = request('x', 'y1');
    const slice = sliceOf(system, asked, [1, 1, 0.25]);
    expect(slice.note).toBe('Held at y2 = 0.25.');
    const [prey, first] = zeroGrowthLines(slice, asked);
    // 1 = y1 + y2.
    for (const [, y] of ends(prey.segments)) expect(y).toBeCloseTo(0.75, 9);
    // x (y1 + y2) / 2 = 1.5 y1.
    for (const [x, y] of ends(first.segments)) expect(x * (y + 0.25)).toBeCloseTo(3 * y, 4);

    const pooled: CompiledSystem = {
      ...system,
      setParameters: (p) => system.setParameters(p),
      rhs: (t, u, out) => system.rhs(t, u, out),
      populations: [
        { symbol: 'x', name: 'Prey', states: [0] },
        { symbol: 'Y', name: 'Predator', states: [1, 2] },
      ],
    };
    const total = request('x', 'Y');
    const totalSlice = sliceOf(pooled, total, [1, 0.5, 1.5]);
    expect(totalSlice.note).toMatch(/Y is a total with shares 0.25 : 0.75/);
    const [, predators] = zeroGrowthLines(totalSlice, total);
    // x Y = 1.5 Y/4 + 0.5 3Y/4.
    expect(predators.segments.length).toBeGreaterThan(0);
    for (const [x] of ends(predators.segments)) expect(x).toBeCloseTo(0.75, 9);
  });

  it('are refused for axes that name nothing, or the same twice', () => {
    const system = compileProblem(SATURATING, true);
    const held = Float64Array.of(1, 1);
    expect(makePlaneSlice(system, request('x', 'z'), held)).toBeNull();
    expect(makePlaneSlice(system, request('x', 'x'), held)).toBeNull();
  });
});

describe('flow', () => {
  it('has the direction of the right-hand side and one length', () => {
    const system = compileProblem(SATURATING, true);
    const asked = request('x', 'y');
    const flow = flowField(sliceOf(system, asked, [1, 1]), asked);
    expect(flow).toHaveLength(400);
    const f = new Float64Array(2);
    for (let k = 0; k < flow.length; k += 4) {
      const [x, y, dx, dy] = flow.subarray(k, k + 4);
      system.rhs(0, Float64Array.of(x, y), f);
      expect(Math.hypot(dx / 4, dy / 3)).toBeCloseTo(1, 12);
      expect(dx * f[1] - dy * f[0]).toBeCloseTo(0, 9);
      expect(dx * f[0] + dy * f[1]).toBeGreaterThan(0);
    }
  });

  it('leaves out where it rests', () => {
    const system = compileProblem({ equations: ["x' = 0*x", "y' = 0*y"], parameters: {} });
    const asked = request('x', 'y');
    expect(flowField(sliceOf(system, asked, [1, 1]), asked)).toHaveLength(0);
  });
});
