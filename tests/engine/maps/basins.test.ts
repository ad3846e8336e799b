import { describe, expect, it } from 'vitest';

import { basinsOfAttraction, type BasinsRequest } from '../../../src/engine/maps/basins';
import type { MapResult } from '../../../src/engine/maps/contract';
import { axisValues } from '../../../src/engine/maps/map-sheet';
import type { CompiledSystem } from '../../../src/engine/system/contract';
import { finish, textbook } from '../../support/equations';

function basins(
  system: CompiledSystem,
  request: Pick<BasinsRequest, 'x' | 'y'> & Partial<BasinsRequest>,
): MapResult {
  return finish(
    basinsOfAttraction(system, {
      transient: 300,
      observed: 300,
      extinctBelow: new Float64Array(system.dimension).fill(1e-9),
      startAt: (x, y) => Float64Array.of(x, y),
      ...request,
    }),
  );
}

describe('basins of two competitors of which one wins', () => {
  // Lotka-Volterra with strong competition, alike: the separatrix is x = y by symmetry.
  const system = textbook(["x' = x*(1 - x - 1.5*y)", "y' = y*(1 - y - 1.5*x)"]);

  it('meet on the diagonal', () => {
    const x = { key: 'x', from: 0.01, to: 1.41, cells: 40 };
    const y = { key: 'y', from: 0, to: 1.39, cells: 33 };
    const found = basins(system, { x, y });
    expect(found.status).toBe('complete');
    expect(found.kinds.map(({ extinct }) => extinct.join()).sort()).toEqual(['x', 'y']);
    expect(found.kinds.map(({ label }) => label.slice(3)).sort()).toEqual([
      'x extinct, rest otherwise, x = 0, y = 1',
      'y extinct, rest otherwise, x = 1, y = 0',
    ]);
    const [xs, ys] = [axisValues(x), axisValues(y)];
    found.values.forEach((value, cell) => {
      const loser = xs[cell % x.cells] > ys[Math.floor(cell / x.cells)] ? 'y' : 'x';
      expect(found.kinds[value].extinct).toEqual([loser]);
    });
    expect(found.message).toMatch(/^2 attractors/);
  });

  it('a start on the separatrix itself is not given to either', () => {
    const axis = (key: string) => ({ key, from: 0.1, to: 0.9, cells: 5 });
    const found = basins(system, { x: axis('x'), y: axis('y') });
    for (let k = 0; k < 5; k += 1) expect(found.kinds[found.values[6 * k]].kind).toBe('undecided');
  });
});

describe('basins of a rest beside a cycle', () => {
  // r' = r (r^2 - 1)(4 - r^2)/4 in the plane: rest at 0 attracts inside r = 1, the cycle r = 2 outside.
  const growth = '(x^2 + y^2 - 1)*(4 - x^2 - y^2)/4';
  const system = textbook([`x' = x*${growth} - y`, `y' = y*${growth} + x`], {}, false);

  it('meet on the unit circle, and the cycle is one attractor wherever it is entered', () => {
    const axis = (key: string) => ({ key, from: -2.5, to: 2.5, cells: 30 });
    const found = basins(system, { x: axis('x'), y: axis('y') });
    expect(found.kinds).toHaveLength(2);
    const centres = axisValues(axis('x'));
    found.values.forEach((value, cell) => {
      const radius = Math.hypot(centres[cell % 30], centres[Math.floor(cell / 30)]);
      expect(found.kinds[value].kind).toBe(radius < 1 ? 'rest' : 'cycle');
    });
    expect(found.kinds.find(({ kind }) => kind === 'cycle')?.label).toMatch(
      /cycle, x from -2 to 2, y from -2 to 2$/,
    );
  });
});
