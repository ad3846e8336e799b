import { describe, expect, it } from 'vitest';

import { eigenvalues } from '../../../src/engine/linalg/eigenvalues';
import type { MapAxis, MapResult } from '../../../src/engine/maps/contract';
import { axisValues } from '../../../src/engine/maps/map-sheet';
import { marginMap } from '../../../src/engine/maps/margin-map';
import type { CompiledSystem } from '../../../src/engine/system/contract';
import { finish, textbook } from '../../support/equations';

/** Rosenzweig-MacArthur: x' = x(1 - x/K) - a x y/(1 + x), y' = a x y/(1 + x) - m y. */
const ENRICHED = ["x' = x*(1 - x/K) - a*x*y/(1 + x)", "y' = a*x*y/(1 + x) - m*y"];
const enriched = (): CompiledSystem => textbook(ENRICHED, { K: 3, a: 2, m: 1 });

function map(system: CompiledSystem, x: MapAxis, y: MapAxis, starts: readonly number[]): MapResult {
  const columns = [x.key, y.key].map((key) => system.parameterKeys.indexOf(key));
  return finish(
    marginMap(system, system.defaults.slice(), {
      x,
      y,
      columns: [columns[0], columns[1]],
      starts: Float64Array.from(starts),
    }),
  );
}

describe('the margin map of enriched predator and prey', () => {
  const x = { key: 'K', from: 0.5, to: 5, cells: 90 };
  const y = { key: 'm', from: 0.6, to: 1.2, cells: 61 };
  const found = map(enriched(), x, y, [1, 0.5]);
  const [xs, ys] = [axisValues(x), axisValues(y)];

  it('has the exact margin in every cell, and none where the predator cannot live', () => {
    expect(found.status).toBe('complete');
    expect(found.computed).toBe(x.cells * y.cells);
    expect(found.state.every((one) => one === 2)).toBe(true);
    ys.forEach((m, iy) => {
      xs.forEach((K, ix) => {
        const value = found.values[iy * x.cells + ix];
        // x* = m/(a - m), y* = (1 - x*/K)(1 + x*)/a.
        const rest = m / (2 - m);
        const predator = ((1 - rest / K) * (1 + rest)) / 2;
        if (predator < 1e-6) {
          if (predator < -1e-6) expect(value).toBeNaN();
          return;
        }
        const bend = (2 * predator) / (1 + rest) ** 2;
        const J = Float64Array.of(1 - (2 * rest) / K - bend, (-2 * rest) / (1 + rest), bend, 0);
        expect(value).toBeCloseTo(-eigenvalues(J, 2).re[0], 9);
      });
    });
  });

  it('changes sign exactly where cycles begin: K = 1 + 2 x*, from one cell to the next', () => {
    ys.forEach((m, iy) => {
      const exact = 1 + (2 * m) / (2 - m);
      xs.forEach((K, ix) => {
        const value = found.values[iy * x.cells + ix];
        if (Number.isFinite(value)) expect(Math.sign(value)).toBe(Math.sign(exact - K));
      });
    });
  });

  it('interpolated between cells crosses zero at the exact onset', () => {
    const iy = 30;
    const row = found.values.slice(iy * x.cells, (iy + 1) * x.cells);
    const k = row.findIndex((value, ix) => value > 0 && row[ix + 1] <= 0);
    const crossing = xs[k] + ((xs[k + 1] - xs[k]) * row[k]) / (row[k] - row[k + 1]);
    expect(crossing).toBeCloseTo(1 + (2 * ys[iy]) / (2 - ys[iy]), 3);
  });
});

describe('coarse cells first', () => {
  it('every cell shows something after the first level, and partial maps grow', () => {
    const system = enriched();
    const run = marginMap(system, system.defaults.slice(), {
      x: { key: 'K', from: 2, to: 5, cells: 83 },
      y: { key: 'm', from: 0.6, to: 1, cells: 50 },
      columns: [0, 2],
      starts: Float64Array.of(1, 0.5),
    });
    const partials = [...run].flatMap(({ partial }) => (partial ? [partial] : []));
    expect(partials.length).toBeGreaterThan(5);
    const coarse = partials.find((one) => one.state.every((state) => state > 0));
    expect(coarse?.computed).toBeLessThan(400);
    partials.reduce((before, one) => {
      expect(one.computed).toBeGreaterThanOrEqual(before);
      return one.computed;
    }, 0);
  });
});

describe('cells with several coexistence equilibria', () => {
  // Spruce budworm, case C3: both outer equilibria attract between the folds; the margin is never negative.
  it('show the one that attracts most', () => {
    const system = textbook(["x' = r*x*(1-x/k) - x^2/(1+x^2)"], { r: 0.5, k: 10 });
    const x = { key: 'r', from: 0.35, to: 0.6, cells: 60 };
    const y = { key: 'k', from: 8, to: 12, cells: 20 };
    const found = map(system, x, y, [1]);
    found.values.forEach((value, cell) => {
      const r = axisValues(x)[cell % x.cells];
      const k = axisValues(y)[Math.floor(cell / x.cells)];
      // Roots of r (1 - x/k)(1 + x^2) = x by brute force on a fine grid.
      let best = -Infinity;
      const g = (u: number): number => r * (1 - u / k) - u / (1 + u * u);
      for (let j = 0; j < 4000; j += 1) {
        const [low, high] = [(k * j) / 4000, (k * (j + 1)) / 4000];
        if (g(low) > 0 !== g(high) > 0) {
          const u = low + ((high - low) * g(low)) / (g(low) - g(high));
          best = Math.max(best, -u * (-r / k - (1 - u * u) / (1 + u * u) ** 2));
        }
      }
      expect(value).toBeCloseTo(best, 4);
    });
  });
});

describe('refusals', () => {
  it('a model with explicit time has no margin', () => {
    const system = textbook(["x' = a*x*(1 - x) + b*sin(t)"], { a: 1, b: 0.1 });
    const axis = (key: string): MapAxis => ({ key, from: 0, to: 1, cells: 4 });
    const found = map(system, axis('a'), axis('b'), [0.5]);
    expect(found.status).toBe('failed');
    expect(found.message).toMatch(/contain the time t.*Lyapunov exponent instead/);
  });

  it('where nothing coexists the message says so', () => {
    const system = textbook(["x' = x*(r - x)", "y' = y*(0.1*x - m)"], { r: 1, m: 1 });
    const found = map(
      system,
      { key: 'r', from: 1, to: 2, cells: 9 },
      { key: 'm', from: 1, to: 2, cells: 9 },
      [1, 1],
    );
    expect(found.values.every(Number.isNaN)).toBe(true);
    expect(found.message).toMatch(/No coexistence equilibrium was found in any cell/);
  });
});
