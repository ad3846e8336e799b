import { describe, expect, it } from 'vitest';

import { extremesSweep, type ExtremesRequest } from '../../../src/engine/lyapunov/extremes-sweep';
import type { ExtremesResult, ExtremesSweep } from '../../../src/engine/lyapunov/contract';
import type { CompiledSystem } from '../../../src/engine/system/contract';
import { finish, textbook } from '../../support/equations';

function extremes(
  system: CompiledSystem,
  starts: readonly number[],
  request: Pick<ExtremesRequest, 'parameterKey' | 'from' | 'to' | 'values'> & Partial<ExtremesRequest>,
): ExtremesResult {
  return finish(
    extremesSweep(system, system.defaults.slice(), {
      parameterIndex: system.parameterKeys.indexOf(request.parameterKey),
      directions: ['upward', 'downward'],
      observe: { symbol: system.stateSymbols[0], states: [0] },
      starts: Float64Array.from(starts),
      transient: 500,
      observed: 500,
      floor: 1e-9,
      ...request,
    }),
  );
}

const maximaAt = (sweep: ExtremesSweep, k: number): number[] => [
  ...sweep.maxima.slice(sweep.maximaStart[k], sweep.maximaStart[k + 1]),
];

/** Different values, apart by more than a share of their range. */
const distinct = (values: readonly number[]): number => {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted.filter((value, k) => k === 0 || value - sorted[k - 1] > 1e-3).length;
};

describe('hysteresis of the spruce budworm', () => {
  const system = textbook(["x' = r*x*(1-x/k) - x^2/(1+x^2)"], { r: 0.5, k: 10 });
  const found = extremes(system, [0.1], { parameterKey: 'r', from: 0.3, to: 0.7, values: 201 });

  it('lies between the folds, to within a step', () => {
    // Case C3, k = 10.
    const [stretch] = found.hysteresis;
    expect(found.hysteresis).toHaveLength(1);
    expect(stretch.from).toBeGreaterThan(0.3839707316274608);
    expect(stretch.from).toBeLessThan(0.3839707316274608 + 0.003);
    expect(stretch.to).toBeLessThan(0.5595250124456357);
    expect(stretch.to).toBeGreaterThan(0.5595250124456357 - 0.003);
    expect(found.message).toMatch(/there the long run depends on where it comes from/);
  });

  it('follows the exact equilibria', () => {
    found.sweeps.forEach(({ parameters, lowest, highest }) => {
      parameters.forEach((r, k) => {
        const x = highest[k];
        expect(lowest[k]).toBe(x);
        expect(r * (1 - x / 10) - x / (1 + x * x)).toBeCloseTo(0, 10);
      });
    });
    expect(found.sweeps[1].parameters[0]).toBe(0.7);
  });
});

describe('a population once lost', () => {
  // y invades x = 1 from m < 1 on.
  const system = textbook(["x' = x*(1 - x) - x*y", "y' = y*(x - m)"], { m: 1.5 });
  const request = { parameterKey: 'm', from: 0.5, to: 1.5, values: 41 };

  it('comes back where it can invade', () => {
    const { sweeps, hysteresis, message } = extremes(system, [0.5, 0.5], request);
    for (const { parameters, lowest } of sweeps)
      parameters.forEach((m, k) => {
        if (Math.abs(m - 1) > 0.03) expect(lowest[2 * k + 1]).toBeCloseTo(Math.max(0, 1 - m), 8);
      });
    expect(hysteresis).toEqual([]);
    expect(message).toMatch(/Upward and downward agree.*Densities below 1e-9 were lifted/);
  });
});

describe('the period doubling of Roessler', () => {
  // Strogatz, Nonlinear Dynamics and Chaos, sect. 12.3 (from memory): 1, 2 and 4 maxima of x, then chaos.
  it('shows in the local maxima', () => {
    const system = textbook(["x' = -y - z", "y' = x + 0.2*y", "z' = 0.2 + z*(x-c)"], { c: 2.5 }, false);
    const { sweeps } = extremes(system, [1, 1, 0], {
      parameterKey: 'c',
      from: 2.5,
      to: 5,
      values: 6,
      directions: ['upward'],
      floor: 0,
      transient: 1500,
    });
    expect(sweeps).toHaveLength(1);
    const counts = [...sweeps[0].parameters].map((_, k) => distinct(maximaAt(sweeps[0], k)));
    expect(counts[0]).toBe(1);
    expect(counts[2]).toBe(2);
    expect(counts[3]).toBe(4);
    expect(counts[5]).toBeGreaterThan(20);
    expect([...sweeps[0].settled.slice(0, 4)]).toEqual([1, 1, 1, 1]);
  });
});

describe('extremes of a cycle', () => {
  it('are those of case D1, and partial results grow', () => {
    const system = textbook(["x' = y", "y' = mu*(1-x^2)*y - x"], { mu: 1 }, false);
    const run = extremesSweep(system, system.defaults.slice(), {
      parameterIndex: 0,
      parameterKey: 'mu',
      from: 1,
      to: 5,
      values: 2,
      directions: ['upward'],
      observe: { symbol: 'x', states: [0] },
      starts: Float64Array.of(2, 0),
      transient: 100,
      observed: 100,
      floor: 0,
    });
    const partials = [...run].flatMap(({ partial }) => (partial ? [partial] : []));
    expect(partials.map(({ sweeps }) => sweeps[0].parameters.length)).toEqual([1, 2]);
    const [sweep] = partials[1].sweeps;
    expect(sweep.highest[0]).toBeCloseTo(2.0086198608748433, 6);
    expect(sweep.highest[3]).toBeCloseTo(7.637158827386026, 5);
  });

  it('a solution that leaves every bound has none', () => {
    const { sweeps } = extremes(textbook(["x' = a*x"], { a: 1 }), [1], {
      parameterKey: 'a',
      from: -1,
      to: 1,
      values: 2,
      directions: ['upward'],
    });
    expect(sweeps[0].highest[0]).toBeCloseTo(0, 8);
    expect(sweeps[0].highest[1]).toBeNaN();
    expect([...sweeps[0].settled]).toEqual([1, 0]);
  });
});
