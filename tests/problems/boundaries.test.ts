import { describe, expect, it } from 'vitest';

import { sweep } from '@/engine/continuation/sweep';
import { compileModel } from '@/engine/system/compile-model';
import { runAnalysis } from '@/engine/analyses/run-analysis';
import { boundariesTaskSchema } from '@/engine/schema/analysis-tasks';
import { STARTER_PRESETS } from '@/presets/index';

import { boundariesOf, onlyCurve, pairsOf } from '../engine/boundaries/run-boundaries';
import { finish, textbook } from '../support/equations';
import { titleOf } from './catalogue';

describe(titleOf('E1'), () => {
  // K_transcritical = m/(1 - m), K_Hopf = (1 + m)/(1 - m) with unit rates; derived from the textbook model.
  it('both curves at every point', () => {
    const system = textbook(["x' = x*(1-x/K) - x*y/(1+x)", "y' = x*y/(1+x) - m*y"], { K: 2, m: 0.4 });
    const result = boundariesOf(system, ['K', 0.3, 4], ['m', 0.25, 0.55]);
    for (const [K, m] of pairsOf(onlyCurve(result, 'Hopf')))
      expect(Math.abs(K - (1 + m) / (1 - m))).toBeLessThan(1e-9);
    for (const [K, m] of pairsOf(onlyCurve(result, 'transcritical')))
      expect(Math.abs(K - m / (1 - m))).toBeLessThan(1e-9);
  });
});

describe(titleOf('E2'), () => {
  // Folds at r = 2 x^3/(1 + x^2)^2, k = 2 x^3/(x^2 - 1); cusp at x = sqrt(3): k = 3 sqrt(3), r = 3 sqrt(3)/8.
  it('the fold curve and its cusp', () => {
    const system = textbook(["x' = r*x*(1-x/k) - x^2/(1+x^2)"], { r: 0.5, k: 10 });
    const result = boundariesOf(system, ['r', 0.1, 1], ['k', 3, 20], { starts: [Float64Array.of(1)] });
    const curve = onlyCurve(result, 'fold');
    curve.states.forEach((x, k) => {
      expect(Math.abs(curve.first[k]! - (2 * x ** 3) / (1 + x * x) ** 2)).toBeLessThan(1e-9);
      expect(Math.abs(curve.second[k]! / ((2 * x ** 3) / (x * x - 1)) - 1)).toBeLessThan(1e-8);
    });
    const [cusp] = result.specialPoints;
    expect(cusp?.kind).toBe('cusp');
    expect(cusp?.first).toBeCloseTo((3 * Math.sqrt(3)) / 8, 8);
    expect(cusp?.second).toBeCloseTo(3 * Math.sqrt(3), 7);
  });
});

/**
 * Predator-prey with saturation and competition in both (Bazykin 1985; the example of Kuznetsov, chapter 8, with
 * gamma = 1, epsilon = 0.01): x' = x - x y/(1 + a x) - e x^2, y' = -y + x y/(1 + a x) - d y^2.
 */
describe('Bazykin', () => {
  const e = 0.01;
  const system = textbook(["x' = x - x*y/(1+a*x) - e*x^2", "y' = -g*y + x*y/(1+a*x) - d*y^2"], {
    a: 0.3,
    d: 0.2,
    e,
    g: 1,
  });
  const result = boundariesOf(system, ['a', 0.05, 0.9], ['d', 0.0005, 0.4], {
    starts: [Float64Array.of(5, 1)],
  });
  /** Trace and determinant of the Jacobian, written out by hand. */
  const traceAndDeterminant = ([x, y]: readonly number[], a: number, d: number): [number, number] => {
    const q = 1 + a * x!;
    const [j11, j12] = [1 - y! / (q * q) - 2 * e * x!, -x! / q];
    const [j21, j22] = [y! / (q * q), -1 + x! / q - 2 * d * y!];
    return [j11 + j22, j11 * j22 - j12 * j21];
  };

  it('folds have a zero determinant, Hopf points a zero trace, by hand', () => {
    for (const curve of result.curves)
      curve.first.forEach((a, k) => {
        const state = [...curve.states.slice(2 * k, 2 * k + 2)];
        const [trace, determinant] = traceAndDeterminant(state, a, curve.second[k]!);
        if (curve.kind === 'fold') expect(Math.abs(determinant)).toBeLessThan(1e-8);
        if (curve.kind === 'Hopf') {
          expect(Math.abs(trace)).toBeLessThan(1e-8);
          expect(Math.abs(determinant - curve.omega[k]! ** 2)).toBeLessThan(1e-8);
        }
      });
  });

  it('has two Bogdanov-Takens points, at which both vanish', () => {
    const points = result.specialPoints.filter((one) => one.kind === 'Bogdanov-Takens');
    const places = new Set(points.map((one) => one.first.toFixed(6)));
    expect(places.size).toBe(2);
    for (const { first, second, state } of points) {
      const [trace, determinant] = traceAndDeterminant([...state], first, second);
      expect(Math.abs(trace)).toBeLessThan(1e-9);
      expect(Math.abs(determinant)).toBeLessThan(1e-9);
    }
    expect(points.some((one) => Math.abs(one.first - 0.4536) < 1e-3)).toBe(true);
    expect(points.some((one) => Math.abs(one.second - 0.1751) < 1e-3)).toBe(true);
  });
});

describe('the saturating predator in two sexes', () => {
  const preset = STARTER_PRESETS.find((one) => one.document.title.includes('saturating'));
  const compiled = compileModel(preset!.document);
  if (!compiled.ok) throw new Error('the preset does not compile');
  const { model } = compiled;

  it('has its onset of cycles over spread and ceiling where sweeps at several spreads find it', () => {
    const task = boundariesTaskSchema.parse({
      task: 'boundaries',
      first: { parameter: 'K', from: 0.2, to: 4 },
      second: { parameter: 'dial:spread', from: 0, to: 1.5 },
      kinds: ['Hopf'],
    });
    const { split, twin } = finish(runAnalysis(model, task));
    const curve = onlyCurve(split, 'Hopf');
    for (const spread of [0.25, 0.75, 1.25]) {
      const p = model.valuesToParameters({ 'dial:spread': spread });
      const swept = finish(
        sweep(model.system, p, {
          parameterIndex: model.parameterIndex('K'),
          from: 0.2,
          to: 4,
          starts: [model.starts],
          bands: false,
        }),
      );
      const hopf = swept.specialPoints.find((one) => one.kind === 'Hopf' && one.feasible);
      // The curve at that spread, by a point traced from there.
      const at = finish(
        runAnalysis(model, {
          ...task,
          twin: false,
          point: {
            kind: 'Hopf',
            first: hopf!.parameter,
            second: spread,
            state: Object.fromEntries(model.system.stateSymbols.map((key, i) => [key, hopf!.state[i]!])),
            omega: hopf!.hopf!.omega,
          },
        }),
      ).split;
      const nearest = onlyCurve(at, 'Hopf');
      const ends = [0, nearest.second.length - 1].map((k) => nearest.first[k]!).sort();
      const whole = [0, curve.second.length - 1].map((k) => curve.first[k]!).sort();
      ends.forEach((value, k) => expect(Math.abs(value - whole[k]!)).toBeLessThan(1e-8));
    }
    // Without spread the two communities are the same, and the twin knows no spread.
    const pooled = onlyCurve(twin!, 'Hopf');
    for (const [K] of pairsOf(pooled)) expect(K).toBeCloseTo(1.375, 8);
    const lowest = pairsOf(curve).find(([, spread]) => spread < 1e-9);
    expect(lowest?.[0]).toBeCloseTo(1.375, 7);
  });
});
