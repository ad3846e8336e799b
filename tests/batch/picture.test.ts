import { describe, expect, it } from 'vitest';

import { onlyResult } from '../support/study';

interface PictureJson {
  readonly status: string;
  readonly summary: readonly { of: string; what: string; parameter: number | null; note: string }[];
  readonly split: {
    readonly equilibria: { equilibria: readonly { state: Record<string, number> }[] };
    readonly sweep: {
      specialPoints: readonly { kind: string; parameter: number }[];
      branches: readonly { points: number; parameters?: number[] }[];
    };
    readonly cycles: {
      status: string;
      branches: readonly { points: number; parameters?: number[]; end: { parameter: number } }[];
    };
  };
  readonly twin: unknown;
}

// x' = r x (1 - x/K) - x y / (1 + x), y' = x y / (1 + x) - m y: cycles begin at K = 2 m/(1 - m) + 1.
const study = (branches: boolean) => ({
  preset: {
    equations: ["x' = x*(1 - x/K) - x*y/(1 + x)", "y' = x*y/(1 + x) - m*y"],
    parameters: { K: 2, m: 0.4 },
    init: { x: 1, y: 1 },
    sign: 'nonnegative',
  },
  tasks: [{ task: 'picture', parameter: 'K', from: 0.2, to: 4, branches }],
});

describe('the full picture in batch', () => {
  it('holds equilibria, the sweep, cycles and the table of both', () => {
    const picture = onlyResult<PictureJson>(study(true));
    expect(picture.status).toBe('complete');
    expect(picture.twin).toBeNull();
    const states = picture.split.equilibria.equilibria.map((one) => Object.values(one.state));
    expect(states).toHaveLength(3);
    const coexistence = states.find((state) => state.every((value) => value > 0)) ?? [];
    // x* = m/(1 - m), y* = (1 - x*/K)(1 + x*).
    [2 / 3, 10 / 9].forEach((value, i) => expect(coexistence[i]).toBeCloseTo(value, 9));
    const [hopf] = picture.split.sweep.specialPoints.filter((point) => point.kind === 'Hopf');
    expect(hopf.parameter).toBeCloseTo(7 / 3, 9);
    const [cycles] = picture.split.cycles.branches;
    expect(cycles.parameters?.[0]).toBeCloseTo(7 / 3, 6);
    expect(cycles.end.parameter).toBe(4);
    const [row] = picture.summary.filter((one) => one.what === 'Hopf');
    expect(row.parameter).toBe(hopf.parameter);
  });

  it('leaves the points of branches out where they are not wanted', () => {
    const { split } = onlyResult<PictureJson>(study(false));
    expect(split.sweep.branches.length).toBeGreaterThan(2);
    for (const branch of [...split.sweep.branches, ...split.cycles.branches]) {
      expect(branch.points).toBeGreaterThan(3);
      expect(branch.parameters).toBeUndefined();
    }
  });
});
