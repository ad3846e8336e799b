import { describe, expect, it } from 'vitest';

import { onlyResult } from '../support/study';

interface MapSide {
  readonly status: string;
  readonly quantity: string;
  readonly x: { key: string; cells: number; centres: number[] };
  readonly y: { key: string; cells: number; centres: number[] };
  readonly values: readonly (readonly (number | null)[])[];
  readonly kinds: readonly { label: string; kind: string; extinct: string[]; cells: number }[];
  readonly computed: number;
  readonly summary: { lowest?: number | null; highest?: number | null; withoutAnswer: number };
}
interface MapTaskResult {
  readonly status: string;
  readonly split: MapSide;
  readonly twin: MapSide | null;
}

describe('maps in batch', () => {
  it('of the margin hold one row for each value of the second parameter, at the centres of cells', () => {
    // The logistic equation rests at K with eigenvalue -r: the margin is r, whatever K is.
    const { split, twin } = onlyResult<MapTaskResult>({
      preset: {
        equations: ["x' = r*x*(1 - x/K)"],
        parameters: { r: 1, K: 2 },
        init: { x: 1 },
        sign: 'nonnegative',
      },
      tasks: [
        {
          task: 'map',
          x: { parameter: 'K', from: 1, to: 3, cells: 4 },
          y: { parameter: 'r', from: 0.5, to: 1.5, cells: 5 },
        },
      ],
    });
    expect(split).toMatchObject({ status: 'complete', quantity: 'margin', computed: 20 });
    expect(split.x).toMatchObject({ key: 'K', centres: [1.25, 1.75, 2.25, 2.75] });
    expect(split.values).toHaveLength(5);
    split.values.forEach((row, iy) => {
      expect(row).toHaveLength(4);
      row.forEach((margin) => expect(margin).toBeCloseTo(split.y.centres[iy], 9));
    });
    expect(split.summary.withoutAnswer).toBe(0);
    expect(split.summary.lowest).toBeCloseTo(0.6, 9);
    expect(split.summary.highest).toBeCloseTo(1.4, 9);
    expect(twin).toBeNull();
  });

  it('of start values tell which attractor each leads to, and count cells', () => {
    // Two stocks with Allee thresholds 0.3 and 0.5: each dies out from below its own, and grows to 1 from above.
    const { split } = onlyResult<MapTaskResult>({
      preset: {
        equations: ["x' = x*(x - 0.3)*(1 - x)", "y' = y*(y - 0.5)*(1 - y)"],
        init: { x: 0.8, y: 0.8 },
        sign: 'nonnegative',
      },
      tasks: [
        {
          task: 'basins',
          x: { state: 'x', from: 0, to: 1, cells: 10 },
          y: { state: 'y', from: 0, to: 1, cells: 10 },
          transient: 200,
          observed: 50,
          extinctBelow: 1e-6,
        },
      ],
    });
    expect(split).toMatchObject({ status: 'complete', quantity: 'basin' });
    split.values.forEach((row, iy) =>
      row.forEach((value, ix) => {
        const kind = split.kinds[value ?? -1];
        const dying = [
          ...(split.x.centres[ix] < 0.3 ? ['x'] : []),
          ...(split.y.centres[iy] < 0.5 ? ['y'] : []),
        ];
        expect([...kind.extinct].sort()).toEqual(dying);
      }),
    );
    expect(split.kinds.reduce((sum, kind) => sum + kind.cells, 0)).toBe(100);
    const [both] = split.kinds.filter((kind) => kind.extinct.length === 0);
    expect(both.cells).toBe(35);
  });
});
