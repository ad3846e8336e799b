import { describe, expect, it } from 'vitest';

import type { MethodName } from '../../../src/engine/integrators/contract';
import { integrateTo } from '../../../src/engine/integrators/driver';
import {
  ARENSTORF,
  BRUSSELATOR,
  CLASSIC_PREDATOR_PREY,
  compileProblem,
  GROWTH_LAWS,
  ROBERTSON,
  SPLIT_PREDATORS,
  type InitialValueProblem,
} from '../../problems/initial-value-problems';

const NONSTIFF: MethodName[] = ['auto', 'dormand-prince-54', 'dormand-prince-853', 'odex'];
const TIGHT = { relativeTolerance: 1e-11, absoluteTolerance: 1e-13 };

function solve(problem: InitialValueProblem, method: MethodName, options = {}) {
  const times = Float64Array.from([0, ...problem.states.map(([t]) => t)]);
  const run = integrateTo(compileProblem(problem), Float64Array.from(problem.start), times, {
    method,
    ...options,
  });
  expect(run.status).toBe('complete');
  expect(run.times).toEqual(times);
  return problem.states.map((_, k) => run.states.subarray((k + 1) * run.dimension, (k + 2) * run.dimension));
}

describe.each(NONSTIFF)('%s', (method) => {
  it.each(GROWTH_LAWS)('keeps to the closed form of $name', (law) => {
    const system = compileProblem(law);
    const times = Float64Array.from({ length: 61 }, (_, k) => k / 5);
    const { status, states } = integrateTo(system, Float64Array.from(law.start), times, { method, ...TIGHT });
    expect(status).toBe('complete');
    times.forEach((t, k) => expect(Math.abs(states[k] / law.exact(t) - 1)).toBeLessThan(2e-9));
    law.states.forEach(([t, [n]]) => expect(Math.abs(n / law.exact(t) - 1)).toBeLessThan(1e-12));
  });

  it.each(GROWTH_LAWS)('returns along $name backwards in time', (law) => {
    const system = compileProblem(law);
    const times = Float64Array.from([8, 5, 2, 0]);
    const start = Float64Array.of(law.exact(8));
    const { status, states } = integrateTo(system, start, times, { method, ...TIGHT });
    expect(status).toBe('complete');
    times.forEach((t, k) => expect(Math.abs(states[k] / law.exact(t) - 1)).toBeLessThan(2e-6));
  });

  it.each([CLASSIC_PREDATOR_PREY, BRUSSELATOR, ...SPLIT_PREDATORS])('solves the $name', (problem) => {
    const found = solve(problem, method, TIGHT);
    problem.states.forEach(([, state], k) =>
      state.forEach((value, i) => expect(Math.abs(found[k][i] - value)).toBeLessThan(1e-8)),
    );
  });

  it('closes the orbit of the restricted three-body problem', () => {
    const found = solve(ARENSTORF, method, { relativeTolerance: 1e-12, absoluteTolerance: 1e-14 });
    const limits = [1e-7, 1e-7, 1e-4];
    ARENSTORF.states.forEach(([, state], k) =>
      state.forEach((value, i) => expect(Math.abs(found[k][i] - value)).toBeLessThan(limits[k])),
    );
  });

  it('keeps the constant of motion of predator and prey, backwards as well', () => {
    const system = compileProblem(CLASSIC_PREDATOR_PREY);
    for (const end of [100, -100]) {
      const times = Float64Array.from({ length: 401 }, (_, k) => (k * end) / 400);
      const { states } = integrateTo(system, Float64Array.of(0.5, 0.5), times, { method, ...TIGHT });
      for (let k = 0; k < times.length; k += 1) {
        const [x, y] = states.subarray(2 * k);
        // 1 + 2 log 2 at the start.
        expect(Math.abs(x - Math.log(x) + y - Math.log(y) - 2.386294361119891)).toBeLessThan(1e-8);
      }
    }
  });
});

describe('stiff kinetics', () => {
  it.each(['rodas', 'auto'] as const)('%s reaches t = 1e11', (method) => {
    const found = solve(ROBERTSON, method, { relativeTolerance: 1e-8, absoluteTolerance: 1e-18 });
    ROBERTSON.states.forEach(([t, state], k) =>
      state.forEach((value, i) =>
        expect(Math.abs(found[k][i] / value - 1), `t = ${t}, state ${i}`).toBeLessThan(t > 1e6 ? 1e-4 : 1e-5),
      ),
    );
  });

  it('changes to the stiff method where the explicit pair would crawl', () => {
    const system = compileProblem(ROBERTSON);
    const start = Float64Array.from(ROBERTSON.start);
    const run = integrateTo(system, start, Float64Array.of(0, 4000), { relativeTolerance: 1e-6 });
    expect(run.status).toBe('complete');
    expect(run.steps).toBeLessThan(2000);
    const explicit = integrateTo(system, start, Float64Array.of(0, 4000), {
      relativeTolerance: 1e-6,
      method: 'dormand-prince-54',
      maximumSteps: 20_000,
    });
    expect(explicit.status).toBe('steps-spent');
    expect(explicit.message).toMatch(/budget/);
    expect(explicit.times).toEqual(Float64Array.of(0));
  });
});
