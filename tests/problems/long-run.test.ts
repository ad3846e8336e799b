import { describe, expect, it } from 'vitest';

import type { LyapunovResult } from '@/engine/lyapunov/contract';
import { extremesSweep } from '@/engine/lyapunov/extremes-sweep';
import { lyapunovSpectrum } from '@/engine/lyapunov/lyapunov-spectrum';
import type { MapAxis } from '@/engine/maps/contract';
import { axisValues } from '@/engine/maps/map-sheet';
import { marginMap } from '@/engine/maps/margin-map';
import { finish, textbook } from '../support/equations';
import { problem, titleOf } from './catalogue';

/** Parts of a case that its own type leaves open. */
interface ExponentCase {
  readonly params: Record<string, number>;
  readonly init: Record<string, number>;
  readonly expected: { readonly computed: readonly number[]; readonly kaplan_yorke?: number };
}

function exponentsOf(id: 'F1' | 'F2', transient: number, horizon: number): [ExponentCase, LyapunovResult] {
  const one = problem(id) as unknown as ExponentCase & { readonly equations: readonly string[] };
  const start = Float64Array.from(Object.values(one.init));
  return [
    one,
    finish(lyapunovSpectrum(textbook(one.equations, one.params, false), start, { transient, horizon })),
  ];
}

describe('Lyapunov exponents', () => {
  it(titleOf('F1'), () => {
    const [{ expected }, found] = exponentsOf('F1', 100, 5000);
    const [first, second, third] = found.exponents;
    expect(Math.abs(first - expected.computed[0])).toBeLessThan(0.01);
    expect(Math.abs(second)).toBeLessThan(0.005);
    expect(Math.abs(third - expected.computed[2])).toBeLessThan(0.01);
    // The divergence is the same everywhere: -(s + 1 + b).
    expect(Math.abs(first + second + third + 41 / 3)).toBeLessThan(1e-4);
    expect(Math.abs(found.traceError)).toBeLessThan(1e-5);
    expect(found.dimension).toBeCloseTo(expected.kaplan_yorke ?? Number.NaN, 2);
    expect(found.reading).toBe('chaos');
    // The interval stated holds the published value, and is narrow enough to be of use: 0.15/sqrt(T) is due.
    expect(Math.abs(first - expected.computed[0])).toBeLessThan(2 * found.uncertainty[0]);
    expect(found.uncertainty[0]).toBeLessThan((4 * 0.15) / Math.sqrt(5000));
  });

  it(titleOf('F2'), () => {
    const [{ expected }, found] = exponentsOf('F2', 300, 20_000);
    expect(Math.abs(found.exponents[0] - expected.computed[0])).toBeLessThan(0.004);
    expect(Math.abs(found.exponents[1])).toBeLessThan(0.002);
    expect(Math.abs(found.exponents[2] - expected.computed[2])).toBeLessThan(0.02);
    expect(Math.abs(found.traceError)).toBeLessThan(1e-5);
    expect(found.reading).toBe('chaos');
  });

  it(titleOf('F4'), () => {
    const { expected } = problem('F4') as unknown as { expected: { vdP: number[]; 'B1_eps0.5': number[] } };
    const cycle = finish(
      lyapunovSpectrum(textbook(["x' = y", "y' = (1-x^2)*y - x"], {}, false), Float64Array.of(2, 0), {
        transient: 60,
        horizon: 2000,
      }),
    );
    expected.vdP.forEach((value, j) => expect(Math.abs(cycle.exponents[j] - value)).toBeLessThan(0.002));
    expect(cycle).toMatchObject({ reading: 'cycle', dimension: 1 });
    const predator = ["x' = x - x*(y + z)", "y' = x*(y + z)/2 - 1.5*y", "z' = x*(y + z)/2 - 0.5*z"];
    const rest = finish(
      lyapunovSpectrum(textbook(predator), Float64Array.of(0.5, 0.25, 0.25), {
        transient: 500,
        horizon: 2000,
      }),
    );
    expected['B1_eps0.5'].forEach((value, j) =>
      expect(Math.abs(rest.exponents[j] - value)).toBeLessThan(0.002),
    );
    expect(rest).toMatchObject({ reading: 'rest', dimension: 0 });
  });
});

describe('long-run extremes', () => {
  it.each(['6', '10', '20'] as const)(`${titleOf('C3')}: hysteresis between the folds at k = %s`, (k) => {
    const { expected, equations } = problem('C3') as unknown as {
      equations: string[];
      expected: { folds: Record<string, { r: number }[]> };
    };
    const [upper, lower] = expected.folds[k].map(({ r }) => r);
    const system = textbook(equations, { r: 0.5, k: Number(k) });
    const width = upper - lower;
    const [from, to, values] = [lower - width / 2, upper + width / 2, 121];
    const { hysteresis } = finish(
      extremesSweep(system, system.defaults.slice(), {
        parameterIndex: 0,
        parameterKey: 'r',
        from,
        to,
        values,
        directions: ['upward', 'downward'],
        observe: { symbol: 'x', states: [0] },
        starts: Float64Array.of(0.1),
        transient: 3000,
        observed: 300,
        floor: 0,
      }),
    );
    const step = (to - from) / (values - 1);
    expect(hysteresis).toHaveLength(1);
    for (const [found, exact] of [
      [hysteresis[0].from, lower],
      [hysteresis[0].to, upper],
    ])
      expect(Math.abs(found - exact)).toBeLessThan(1.01 * step);
  });
});

describe('margin maps', () => {
  it(`${titleOf('E1')}: zero contour and edge of coexistence`, () => {
    const { equations, params } = problem('E1') as unknown as {
      equations: string[];
      params: Record<string, number>;
    };
    const system = textbook(equations, { ...params, m: 0.4, K: 2 });
    const x: MapAxis = { key: 'm', from: 0.1, to: 0.8, cells: 70 };
    const y: MapAxis = { key: 'K', from: 0.1, to: 9, cells: 89 };
    const columns = [system.parameterKeys.indexOf('m'), system.parameterKeys.indexOf('K')] as const;
    const found = finish(
      marginMap(system, system.defaults.slice(), { x, y, columns, starts: Float64Array.of(1, 1) }),
    );
    const [ms, Ks] = [axisValues(x), axisValues(y)];
    found.values.forEach((value, cell) => {
      const [m, K] = [ms[cell % x.cells], Ks[Math.floor(cell / x.cells)]];
      const invasion = m / (1 - m);
      const onset = (1 + m) / (1 - m);
      if (K < invasion * (1 - 1e-9)) expect(value).toBeNaN();
      else if (K > invasion * (1 + 1e-9)) expect(Math.sign(value)).toBe(Math.sign(onset - K));
    });
  });
});
