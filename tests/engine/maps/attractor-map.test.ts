import { describe, expect, it } from 'vitest';

import { attractorMap, type AttractorMapRequest } from '../../../src/engine/maps/attractor-map';
import type { MapResult } from '../../../src/engine/maps/contract';
import { axisValues } from '../../../src/engine/maps/map-sheet';
import { finish, textbook } from '../../support/equations';

/** Rosenzweig-MacArthur: x' = x(1 - x/K) - 2 x y/(1 + x), y' = 2 x y/(1 + x) - m y. */
const enriched = textbook(["x' = x*(1 - x/K) - 2*x*y/(1 + x)", "y' = 2*x*y/(1 + x) - m*y"], { K: 3, m: 1 });
const x = { key: 'K', from: 0.5, to: 5, cells: 15 };
const y = { key: 'm', from: 0.6, to: 1.2, cells: 9 };
const [xs, ys] = [axisValues(x), axisValues(y)];

function enrichedMap(quantity: AttractorMapRequest['quantity']): MapResult {
  return finish(
    attractorMap(enriched, enriched.defaults.slice(), {
      quantity,
      x,
      y,
      columns: [0, 1],
      starts: Float64Array.of(0.5, 0.5),
      transient: 1500,
      observed: 1500,
      extinctBelow: Float64Array.of(1e-9, 1e-9),
    }),
  );
}

describe('maps of enriched predator and prey', () => {
  it('kinds of attractors change where theory says', () => {
    const found = enrichedMap('attractor');
    expect(found.status).toBe('complete');
    found.values.forEach((value, cell) => {
      const [K, m] = [xs[cell % x.cells], ys[Math.floor(cell / x.cells)]];
      const rest = m / (2 - m);
      const { kind, extinct } = found.kinds[value];
      if (K < rest * 0.99) expect(extinct).toEqual(['y']);
      else if (K < (1 + 2 * rest) * 0.99) expect(kind).toBe('rest');
      else if (K > (1 + 2 * rest) * 1.01) expect(kind).toBe('cycle');
    });
    expect(new Set(found.kinds.map(({ label }) => label))).toEqual(
      new Set(['rest', 'cycle', 'y extinct, rest otherwise']),
    );
  });

  it('lowest densities are exact at rest, and 0 where the predator dies out', () => {
    const found = enrichedMap('lowest');
    found.values.forEach((value, cell) => {
      const [K, m] = [xs[cell % x.cells], ys[Math.floor(cell / x.cells)]];
      const rest = m / (2 - m);
      const predator = ((1 - rest / K) * (1 + rest)) / 2;
      if (K < rest * 0.99) expect(value).toBe(0);
      else if (K > rest && K < 1 + 2 * rest) expect(value).toBeCloseTo(Math.min(rest, predator), 9);
      else if (K > 1 + 2 * rest) expect(value).toBeLessThan(Math.min(rest, predator));
    });
  });

  it('the largest exponent is the leading eigenvalue at rest, zero on cycles', () => {
    const found = enrichedMap('exponent');
    found.values.forEach((value, cell) => {
      const [K, m] = [xs[cell % x.cells], ys[Math.floor(cell / x.cells)]];
      const rest = m / (2 - m);
      if (K > (1 + 2 * rest) * 1.01) expect(Math.abs(value)).toBeLessThan(0.01);
      // Without the predator: its growth rate at x = K, or the return of the prey.
      else if (K < rest * 0.99) expect(value).toBeCloseTo(Math.max((2 * K) / (1 + K) - m, -1), 8);
      else if (K > rest * 1.01) expect(value).toBeLessThan(0.002);
    });
  });
});
