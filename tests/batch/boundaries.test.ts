import { describe, expect, it } from 'vitest';

import { onlyResult, studyResults } from '../support/study';

interface CurveJson {
  readonly kind: string;
  readonly from: { first: number; second: number };
  readonly start: { first: number; second: number; reason: string; message: string };
  readonly end: { first: number; second: number; reason: string; message: string };
  readonly points: number;
  readonly first?: readonly number[];
  readonly second: readonly number[];
  readonly states: Record<string, number[]>;
  readonly omega: readonly (number | null)[];
}
interface BoundariesSide {
  readonly status: string;
  readonly message: string;
  readonly curves: readonly CurveJson[];
  readonly specialPoints: readonly {
    kind: string;
    first: number;
    second: number;
    state: Record<string, number>;
    meaning: string;
  }[];
}
interface BoundariesTaskResult {
  readonly status: string;
  readonly first: { parameter: string };
  readonly split: BoundariesSide;
  readonly twin: BoundariesSide | null;
}

// x' = x (1 - x/K) - x y/(1 + x), y' = x y/(1 + x) - m y: invasion at K = m/(1 - m), cycles from (1 + m)/(1 - m).
const rosenzweig = {
  equations: ["x' = x*(1 - x/K) - x*y/(1 + x)", "y' = x*y/(1 + x) - m*y"],
  parameters: { K: 2, m: 0.4 },
  init: { x: 1, y: 1 },
  sign: 'nonnegative',
};
const overKAndM = {
  task: 'boundaries',
  first: { parameter: 'K', from: 0.3, to: 4 },
  second: { parameter: 'm', from: 0.25, to: 0.55 },
};

describe('boundaries in batch', () => {
  it('follow the closed forms of onset and invasion point by point', () => {
    const result = onlyResult<BoundariesTaskResult>({ preset: rosenzweig, tasks: [overKAndM] });
    expect(result).toMatchObject({ status: 'complete', first: { parameter: 'K' }, twin: null });
    const [hopf] = result.split.curves.filter((curve) => curve.kind === 'Hopf');
    expect(hopf.first).toHaveLength(hopf.points);
    expect(hopf.points).toBeGreaterThan(5);
    hopf.first?.forEach((K, k) => {
      const m = hopf.second[k];
      expect(K).toBeCloseTo((1 + m) / (1 - m), 7);
      expect(hopf.states['x'][k]).toBeCloseTo(m / (1 - m), 7);
      expect(hopf.omega[k]).toBeGreaterThan(0);
    });
    const [low, high] = [hopf.start.second, hopf.end.second].sort();
    expect(low).toBeCloseTo(0.25, 12);
    expect(high).toBeCloseTo(0.55, 12);
    const [invasion] = result.split.curves.filter((curve) => curve.kind === 'transcritical');
    invasion.first?.forEach((K, k) =>
      expect(K).toBeCloseTo(invasion.second[k] / (1 - invasion.second[k]), 7),
    );
  });

  it('hold their special points and ends where points are not wanted, and trace one point alone', () => {
    // The budworm's folds: k = 2 x^3/(x^2 - 1), r = 2 x^3/(1 + x^2)^2, with a cusp at x = sqrt 3.
    const preset = {
      equations: ["x' = r*x*(1 - x/k) - x^2/(1 + x^2)"],
      parameters: { r: 0.5, k: 10 },
      init: { x: 1 },
      box: { x: [0, 20] },
      sign: 'nonnegative',
    };
    const x = 1.5;
    const along = {
      task: 'boundaries',
      first: { parameter: 'r', from: 0.2, to: 0.8 },
      second: { parameter: 'k', from: 4, to: 12 },
    };
    const [all, alone] = studyResults<BoundariesTaskResult>({
      preset,
      tasks: [
        { ...along, branches: false },
        {
          ...along,
          point: {
            kind: 'fold',
            first: (2 * x ** 3) / (1 + x ** 2) ** 2,
            second: (2 * x ** 3) / (x ** 2 - 1),
            state: { x },
          },
        },
      ],
    });
    for (const { split } of [all, alone]) {
      const [cusp] = split.specialPoints.filter((point) => point.kind === 'cusp');
      expect(cusp.first).toBeCloseTo((3 * Math.sqrt(3)) / 8, 7);
      expect(cusp.second).toBeCloseTo(3 * Math.sqrt(3), 6);
      expect(cusp.state['x']).toBeCloseTo(Math.sqrt(3), 5);
      expect(cusp.meaning.length).toBeGreaterThan(20);
    }
    const folds = all.split.curves.filter((curve) => curve.kind === 'fold');
    folds.forEach((curve) => {
      expect(curve.first).toBeUndefined();
      expect(curve.end.message).toMatch(/\.$/);
    });
    expect(alone.split.curves).toHaveLength(1);
    const [curve] = alone.split.curves;
    curve.first?.forEach((r, k) => {
      const at = curve.states['x'][k];
      expect(r).toBeCloseTo((2 * at ** 3) / (1 + at ** 2) ** 2, 7);
      expect(curve.second[k]).toBeCloseTo((2 * at ** 3) / (at ** 2 - 1), 5);
    });
  });
});
