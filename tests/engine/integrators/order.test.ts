import { describe, expect, it } from 'vitest';

import { createMethod, methodSetting } from '../../../src/engine/integrators/choose-method';
import { ExplicitRungeKutta } from '../../../src/engine/integrators/explicit-runge-kutta';
import { RosenbrockRodas } from '../../../src/engine/integrators/rosenbrock-rodas';
import { DORMAND_PRINCE_54 } from '../../../src/engine/integrators/tableaus/dormand-prince-54';
import { DORMAND_PRINCE_853 } from '../../../src/engine/integrators/tableaus/dormand-prince-853';
import { compileProblem } from '../../problems/initial-value-problems';

/** y' = -y cos t / ... with explicit time and coupling: y = exp(sin t), z = cos t at all times. */
const TIMED = { equations: ["y' = y*z", "z' = -sin(t) + (y - exp(sin(t)))*z"], parameters: {} };
const exact = (t: number) => [Math.exp(Math.sin(t)), Math.cos(t)];

/** Largest error at t = 1, and halfway within the last step, for so many equal steps. */
function errorsOf(name: 'dormand-prince-54' | 'dormand-prince-853' | 'rodas', steps: number) {
  const system = compileProblem(TIMED);
  const method = createMethod(name, methodSetting(system));
  method.begin(0, Float64Array.from(exact(0)));
  const h = 1 / steps;
  const between = new Float64Array(2);
  let inner = 0;
  for (let k = 0; k < steps; k += 1) {
    method.attempt(k * h, h);
    method.accept();
    for (const theta of [0.3, 0.7]) {
      method.interpolate(theta, between);
      exact((k + theta) * h).forEach((value, i) => (inner = Math.max(inner, Math.abs(between[i] - value))));
    }
  }
  const end = exact(1);
  return { end: Math.max(...end.map((value, i) => Math.abs(method.state[i] - value))), inner };
}

describe('measured order of convergence', () => {
  it.each([
    ['dormand-prince-54', 16, 5, 4],
    ['dormand-prince-853', 3, 8, 7],
    ['rodas', 32, 4, 3],
  ] as const)('of %s', (name, steps, order, denseOrder) => {
    const coarse = errorsOf(name, steps);
    const fine = errorsOf(name, 2 * steps);
    expect(Math.log2(coarse.end / fine.end)).toBeGreaterThan(order - 0.35);
    expect(Math.log2(coarse.inner / fine.inner)).toBeGreaterThan(denseOrder + 0.55);
    expect(fine.end).toBeLessThan(1e-7);
  });
});

describe('identities of coefficients', () => {
  it.each([
    ['dormand-prince-54', DORMAND_PRINCE_54],
    ['dormand-prince-853', DORMAND_PRINCE_853],
  ])('%s: rows sum to nodes, quadrature is exact to the order, errors cancel', (_, tableau) => {
    const sum = (row: readonly number[]) => row.reduce((total, x) => total + x, 0);
    tableau.a.forEach((row, i) => expect(sum(row)).toBeCloseTo(tableau.c[i], 13));
    tableau.denseA.forEach((row, i) => expect(sum(row)).toBeCloseTo(tableau.denseC[i], 13));
    for (let q = 1; q <= tableau.order; q += 1)
      expect(sum(tableau.b.map((b, i) => b * tableau.c[i] ** (q - 1)))).toBeCloseTo(1 / q, 13);
    expect(sum(tableau.error)).toBeCloseTo(0, 13);
    if (tableau.lowOrderError) expect(sum(tableau.lowOrderError)).toBeCloseTo(0, 13);
    tableau.dense.forEach((row) => expect(sum(row)).toBeCloseTo(0, 11));
  });
});

describe('error estimates', () => {
  it.each(['dormand-prince-54', 'dormand-prince-853', 'rodas'] as const)(
    'of %s keep the error within reach of the tolerance',
    (name) => {
      const system = compileProblem(TIMED);
      for (const relativeTolerance of [1e-5, 1e-8, 1e-10]) {
        const setting = methodSetting(system, { relativeTolerance, absoluteTolerance: relativeTolerance });
        const method = createMethod(name, setting);
        method.begin(0, Float64Array.from(exact(0)));
        // The largest step that passes keeps its promise within a factor of ten.
        let h = 1;
        while (method.attempt(0, h) > 1) h /= 1.3;
        method.accept();
        exact(h).forEach((value, i) =>
          expect(Math.abs(method.state[i] - value)).toBeLessThan(
            10 * relativeTolerance * (1 + Math.abs(value)),
          ),
        );
      }
    },
  );

  it('are made by different classes', () => {
    const setting = methodSetting(compileProblem(TIMED));
    expect(createMethod('rodas', setting)).toBeInstanceOf(RosenbrockRodas);
    expect(createMethod('auto', setting)).toBeInstanceOf(ExplicitRungeKutta);
    expect(createMethod('auto', setting).order).toBe(8);
    expect(createMethod('auto', { ...setting, relativeTolerance: 1e-4 }).order).toBe(5);
  });
});
