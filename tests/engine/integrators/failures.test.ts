import { describe, expect, it } from 'vitest';

import type { MethodName } from '../../../src/engine/integrators/contract';
import { integrateInSlices, integrateTo } from '../../../src/engine/integrators/driver';
import { compileProblem } from '../../problems/initial-value-problems';

const ALL: MethodName[] = ['auto', 'dormand-prince-54', 'dormand-prince-853', 'rodas', 'odex'];

describe.each(ALL)('%s gives a partial trajectory with the reason', (method) => {
  it('for growth that becomes infinite in finite time', () => {
    // x = 1/(1 - t).
    const system = compileProblem({ equations: ["x' = x^2"], parameters: {} });
    const times = Float64Array.of(0, 0.5, 0.9, 2);
    const run = integrateTo(system, Float64Array.of(1), times, { method, maximumSteps: 20_000 });
    expect(['step-too-small', 'not-finite', 'steps-spent']).toContain(run.status);
    expect(run.message.length).toBeGreaterThan(10);
    expect([...run.times]).toEqual([0, 0.5, 0.9]);
    expect(run.states[1]).toBeCloseTo(2, 5);
    expect(run.states[2]).toBeCloseTo(10, 3);
    expect(run.states).toHaveLength(3);
  });

  it('for a formula without a value', () => {
    const system = compileProblem({ equations: ["x' = sqrt(1 - t) - 1"], parameters: {} });
    const run = integrateTo(system, Float64Array.of(1), Float64Array.of(0, 0.5, 3), {
      method,
      maximumSteps: 20_000,
    });
    expect(run.status).toBe('not-finite');
    expect([...run.times]).toEqual([0, 0.5]);
  });

  it('for a start that is not finite', () => {
    const system = compileProblem({ equations: ["x' = log(x)"], parameters: {} });
    const run = integrateTo(system, Float64Array.of(-1), Float64Array.of(0, 1), { method });
    expect(run.status).toBe('not-finite');
    expect([...run.times]).toEqual([0]);
  });

  it('for a spent budget', () => {
    const system = compileProblem({ equations: ["x' = y", "y' = -x"], parameters: {} });
    const run = integrateTo(system, Float64Array.of(1, 0), Float64Array.of(0, 1, 1e6), {
      method,
      maximumSteps: 300,
    });
    expect(run.status).toBe('steps-spent');
    expect([...run.times]).toEqual([0, 1]);
  });

  it('and has nothing to do for a single time', () => {
    const system = compileProblem({ equations: ["x' = -x"], parameters: {} });
    const run = integrateTo(system, Float64Array.of(3), Float64Array.of(2), { method });
    expect(run).toMatchObject({ status: 'complete', steps: 0 });
    expect([...run.states]).toEqual([3]);
  });
});

describe('slices', () => {
  it('yield growing partial trajectories and can be abandoned', () => {
    const system = compileProblem({ equations: ["x' = y", "y' = -x"], parameters: {} });
    const times = Float64Array.from({ length: 5001 }, (_, k) => k);
    const run = integrateInSlices(system, Float64Array.of(1, 0), times);
    const first = run.next();
    const second = run.next();
    if (first.done || second.done) throw new Error('five thousand time units take more than two slices');
    expect(first.value.partial?.status).toBe('cancelled');
    expect(second.value.fraction).toBeGreaterThan(first.value.fraction);
    expect(second.value.partial?.times.length).toBeGreaterThan(first.value.partial?.times.length ?? Infinity);
  });
});

describe('logarithmic scale', () => {
  const system = compileProblem({ equations: ["x' = x*(1 - y)", "y' = y*(x - 1)"], parameters: {} }, true);

  it('keeps densities of 1e-30 positive and exact', () => {
    // Decay at rate 1 to e^-100 and growth back; the logarithm is known.
    const decay = compileProblem({ equations: ["n' = -n"], parameters: {} }, true);
    const run = integrateTo(decay, Float64Array.of(1), Float64Array.of(0, 70, 600), { scale: 'log' });
    expect(run.states[1]).toBeGreaterThan(0);
    expect(run.states[1] / Math.exp(-70)).toBeCloseTo(1, 9);
    expect(run.states[2] / Math.exp(-600)).toBeCloseTo(1, 7);
  });

  it('follows deep troughs of predator and prey along their constant of motion', () => {
    const start = Float64Array.of(1, 60);
    const times = Float64Array.from({ length: 301 }, (_, k) => k / 2);
    const { status, states } = integrateTo(system, start, times, { scale: 'log' });
    expect(status).toBe('complete');
    const constant = 1 + 60 - Math.log(60);
    let lowest = Infinity;
    for (let k = 0; k < times.length; k += 1) {
      const [x, y] = states.subarray(2 * k);
      lowest = Math.min(lowest, x);
      expect(Math.abs((x - Math.log(x) + y - Math.log(y)) / constant - 1)).toBeLessThan(1e-6);
    }
    expect(lowest).toBeLessThan(1e-20);
    expect(lowest).toBeGreaterThan(0);
  });

  it('leaves an absent population absent', () => {
    const { states } = integrateTo(system, Float64Array.of(0.5, 0), Float64Array.of(0, 2), { scale: 'log' });
    expect(states[3]).toBe(0);
    expect(states[2]).toBeCloseTo(0.5 * Math.exp(2), 7);
  });

  it.each(['auto', 'rodas'] as const)('agrees with the linear scale (%s)', (method) => {
    const times = Float64Array.of(0, 5, 20);
    const log = integrateTo(system, Float64Array.of(0.5, 0.5), times, { scale: 'log', method });
    const linear = integrateTo(system, Float64Array.of(0.5, 0.5), times, { relativeTolerance: 1e-11 });
    log.states.forEach((value, k) => expect(value).toBeCloseTo(linear.states[k], 6));
  });
});
