import { describe, expect, it } from 'vitest';

import { onlyResult, studyResults } from '../support/study';

interface CycleJson {
  readonly parameter: number;
  readonly period: number;
  readonly lowest: Record<string, number>;
  readonly highest: Record<string, number>;
  readonly reason: string;
  readonly message: string;
}
interface CyclesSide {
  readonly status: string;
  readonly message: string;
  readonly specialPoints: readonly {
    kind: string;
    parameter: number;
    period: number;
    lowest: Record<string, number>;
    meaning: string;
  }[];
  readonly branches: readonly {
    readonly origin: { kind: string; parameter: number };
    readonly start: CycleJson;
    readonly end: CycleJson;
    readonly points: number;
    readonly parameters?: readonly number[];
    readonly periods: readonly number[];
    readonly highest: Record<string, number[]>;
    readonly mean: Record<string, number[]>;
    readonly multipliers: readonly (readonly { re: number; im: number }[])[];
    readonly attracts: readonly string[];
    readonly orbits?: readonly { phases: number[]; states: Record<string, number[]> }[];
  }[];
}
interface CyclesTaskResult {
  readonly status: string;
  readonly message: string;
  readonly parameter: string;
  readonly split: CyclesSide;
  readonly twin: CyclesSide | null;
}

/**
 * In polar form r' = mu r + r^3 - r^5, angle' = 1: cycles of period 2 pi with mu = r^4 - r^2, a fold of cycles
 * at mu = -1/4, r^2 = 1/2, and the multiplier exp(2 pi (2 r^2 - 4 r^4)).
 */
const solvable = {
  equations: [
    "x' = mu*x - y + x*(x^2 + y^2) - x*(x^2 + y^2)^2",
    "y' = x + mu*y + y*(x^2 + y^2) - y*(x^2 + y^2)^2",
  ],
  parameters: { mu: -0.1 },
  init: { x: 0.01, y: 0 },
  box: { x: [-2, 2], y: [-2, 2] },
};
const along = { task: 'cycles', parameter: 'mu', from: -0.5, to: 0.5 };

describe('cycles in batch', () => {
  it('are printed point by point: parameter, period, extremes, mean, multipliers', () => {
    const result = onlyResult<CyclesTaskResult>({ preset: solvable, tasks: [along] });
    expect(result).toMatchObject({ status: 'complete', parameter: 'mu', twin: null });
    const [branch] = result.split.branches;
    expect(branch.origin).toMatchObject({ kind: 'Hopf' });
    expect(branch.origin.parameter).toBeCloseTo(0, 9);
    const parameters = branch.parameters ?? [];
    expect(parameters).toHaveLength(branch.points);
    expect(branch.points).toBeGreaterThan(15);
    parameters.forEach((mu, k) => {
      const r = branch.highest['x'][k];
      expect(r ** 4 - r ** 2 - mu).toBeCloseTo(0, 6);
      expect(branch.periods[k]).toBeCloseTo(2 * Math.PI, 6);
      expect(branch.mean['x'][k]).toBeCloseTo(0, 6);
      const expected = Math.exp(2 * Math.PI * (2 * r ** 2 - 4 * r ** 4));
      const [trivial, other] = branch.multipliers[k];
      expect(trivial.re).toBeCloseTo(1, 6);
      expect(other.re / expected).toBeCloseTo(1, 4);
      if (Math.abs(other.re - 1) > 1e-3) expect(branch.attracts[k]).toBe(other.re < 1 ? 'yes' : 'no');
    });
    const [fold] = result.split.specialPoints.filter((point) => point.kind === 'fold of cycles');
    expect(fold.parameter).toBeCloseTo(-0.25, 8);
    expect(fold.lowest['x']).toBeCloseTo(-Math.SQRT1_2, 5);
  });

  it('leave their points out, but never their ends, where branches are not wanted', () => {
    const [without, whole] = studyResults<CyclesTaskResult>({
      preset: solvable,
      tasks: [
        { ...along, branches: false },
        { ...along, orbits: true },
      ],
    });
    const [short] = without.split.branches;
    expect(short.parameters).toBeUndefined();
    expect(short.end).toMatchObject({ parameter: 0.5, reason: 'left the range' });
    // r^2 at mu = 1/2, the upper root of r^4 - r^2 = mu.
    expect(short.end.highest['x']).toBeCloseTo(Math.sqrt((1 + Math.sqrt(3)) / 2), 6);
    expect(short.end.lowest['y']).toBeCloseTo(-Math.sqrt((1 + Math.sqrt(3)) / 2), 6);
    expect(without.split.specialPoints).toEqual(whole.split.specialPoints);
    const [long] = whole.split.branches;
    const last = long.orbits?.[long.points - 1];
    expect(long.orbits).toHaveLength(long.points);
    expect(last?.phases[0]).toBe(0);
    expect(last?.phases[last.phases.length - 1]).toBe(1);
    last?.states['x'].forEach((x, s) =>
      expect(Math.hypot(x, last.states['y'][s])).toBeCloseTo(Math.sqrt((1 + Math.sqrt(3)) / 2), 5),
    );
  });

  it('begin from a trajectory too', () => {
    // van der Pol at mu = 1: period and amplitude, case D1 of the shared problems.
    const result = onlyResult<CyclesTaskResult>({
      preset: {
        equations: ["x' = y", "y' = mu*(1 - x^2)*y - x"],
        parameters: { mu: 1 },
        init: { x: 2, y: 0 },
      },
      tasks: [{ task: 'cycles', parameter: 'mu', from: 1, to: 2, beginFrom: 'trajectory' }],
    });
    const [branch] = result.split.branches;
    const ends = [branch.start, branch.end];
    const [at] = ends.filter((one) => one.parameter === 1);
    expect(at.period).toBeCloseTo(6.66328685932313, 7);
    expect(at.highest['x']).toBeCloseTo(2.00861986087484, 7);
    expect(ends.map((one) => one.parameter).sort()).toEqual([1, 2]);
  });

  it('that cannot be had carry their own status and reason, and the other tasks run', () => {
    const [aperiodic, fine] = studyResults<CyclesTaskResult>({
      preset: { equations: ["x' = c - x + exp(-t)"], parameters: { c: 1 }, init: { x: 1 } },
      tasks: [
        { task: 'cycles', parameter: 'c', from: 0, to: 1 },
        { task: 'trajectory', times: [1] },
      ],
    });
    expect(aperiodic.split.branches).toEqual([]);
    expect(aperiodic.message).toMatch(/no period map/);
    expect(fine.status).toBe('complete');
  });
});
