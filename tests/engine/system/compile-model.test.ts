import { describe, expect, it } from 'vitest';

import type { PresetDocument } from '@/engine/schema/preset';
import { compileModel, type CompiledModel } from '@/engine/system/compile-model';
import { splitPredator, splitPrey } from '../../support/example-models';

function compiled(document: PresetDocument): CompiledModel {
  const result = compileModel(document);
  if (!result.ok) throw new Error(result.diagnostics.map((one) => one.message).join(' '));
  return result.model;
}

function flow(model: CompiledModel, u: readonly number[], values: Record<string, number> = {}): number[] {
  const out = new Float64Array(model.system.dimension);
  model.system.setParameters(model.valuesToParameters(values));
  model.system.rhs(0, Float64Array.from(u), out);
  return [...out];
}

describe('compileModel', () => {
  it('writes the equations of the two-class predator (checks, case B1)', () => {
    const eps = 0.3;
    const [x, y1, y2] = [0.7, 0.4, 0.9];
    const model = compiled(splitPredator(eps));
    expect(model.system.stateSymbols).toEqual(['x', 'y1', 'y2']);
    const [f, g, h] = flow(model, [x, y1, y2]);
    expect(f).toBeCloseTo(x - x * (y1 + y2), 14);
    expect(g).toBeCloseTo((x * (y1 + y2)) / 2 - (1 + eps) * y1, 14);
    expect(h).toBeCloseTo((x * (y1 + y2)) / 2 - (1 - eps) * y2, 14);
  });

  it('has the closed-form equilibrium and characteristic polynomial of B1 at every eps', () => {
    for (const eps of [0, 0.1, 0.3, 0.5, 0.9]) {
      const model = compiled(splitPredator(eps));
      const u = [1 - eps ** 2, (1 - eps) / 2, (1 + eps) / 2];
      for (const value of flow(model, u)) expect(Math.abs(value)).toBeLessThan(1e-15);
      const J = new Float64Array(9);
      model.system.jacobian(0, Float64Array.from(u), J);
      const { c2, c1, c0 } = characteristic(J);
      expect(c2).toBeCloseTo(1 + eps ** 2, 12);
      expect(c1).toBeCloseTo(1 - eps ** 2, 12);
      expect(c0).toBeCloseTo(1 - eps ** 2, 12);
    }
  });

  it('has the closed-form equilibrium and characteristic polynomial of B2 at every eps', () => {
    for (const eps of [0, 0.1, 0.3, 0.5, 0.9]) {
      const model = compiled(splitPrey(eps));
      const u = [1 / (2 * (1 + eps)), 1 / (2 * (1 - eps)), 1 / (1 - eps ** 2)];
      for (const value of flow(model, u)) expect(Math.abs(value)).toBeLessThan(1e-14);
      const J = new Float64Array(9);
      model.system.jacobian(0, Float64Array.from(u), J);
      const { c2, c1, c0 } = characteristic(J);
      const d = 1 - eps ** 2;
      expect(c2).toBeCloseTo((1 + eps ** 2) / d, 12);
      expect(c1).toBeCloseTo(1 / d, 12);
      expect(c0).toBeCloseTo(1 / d, 12);
    }
  });

  it('moves traits by the common dial and by their own, as if the values had been entered', () => {
    const u = [0.7, 0.4, 0.9];
    const model = compiled(splitPredator(0.2));
    const doubled = flow(compiled(splitPredator(0.4)), u);
    const settings: Record<string, number>[] = [
      { 'dial:spread': 2 },
      { spread: 2 },
      { 'dial:m': 2 },
      { 'dial:m': 4, spread: 0.5 },
    ];
    for (const values of settings) {
      flow(model, u, values).forEach((value, i) => expect(value).toBeCloseTo(doubled[i] ?? NaN, 14));
    }
    const reversed = flow(compiled(splitPredator(-0.2)), u);
    flow(model, u, { 'dial:m': -1 }).forEach((value, i) => expect(value).toBeCloseTo(reversed[i] ?? NaN, 14));
  });

  it('orders p as parameters, trait values, dials, common dial', () => {
    const model = compiled(
      splitPredator(0.2, { parameters: [{ symbol: 'k', name: '', value: 2, min: 0, max: 3 }] }),
    );
    expect(model.system.parameterKeys).toEqual([
      'k', 'm_y1', 'm_y2', 'share_y1', 'share_y2', 'dial:m', 'dial:share', 'dial:spread',
    ]); // prettier-ignore
    expect(model.parameterIndex('spread')).toBe(7);
    expect(model.parameterIndex('nothing')).toBe(-1);
    expect([...model.valuesToParameters({ k: 9, spread: 0, nothing: 1 })].slice(0, 2)).toEqual([9, 1.2]);
  });

  it('leaves the name spread to a document that uses it', () => {
    const parameters = [{ symbol: 'spread', name: '', value: 2, min: 0, max: 3 }];
    const model = compiled(splitPredator(0.2, { parameters }));
    expect(model.parameterIndex('spread')).toBe(0);
    expect(model.parameterIndex('dial:spread')).toBe(7);
  });

  it('reads intermediate formulas in any order', () => {
    const document = splitPredator(0, {
      intermediates: [
        { symbol: 'second', formula: 'first*2' },
        { symbol: 'first', formula: 'x + Y' },
      ],
      processes: [{ id: 'p', name: 'p', rate: 'second', effects: [{ class: 'x', amount: '1' }] }],
    });
    expect(flow(compiled(document), [1, 2, 3])[0]).toBe(12);
  });
});

/** Coefficients of det(L I - J) = L^3 + c2 L^2 + c1 L + c0. */
function characteristic(J: Float64Array) {
  const at = (i: number, j: number): number => J[i * 3 + j] ?? NaN;
  const minor = (i: number, j: number): number => at(i, i) * at(j, j) - at(i, j) * at(j, i);
  const determinant =
    at(0, 0) * (at(1, 1) * at(2, 2) - at(1, 2) * at(2, 1)) -
    at(0, 1) * (at(1, 0) * at(2, 2) - at(1, 2) * at(2, 0)) +
    at(0, 2) * (at(1, 0) * at(2, 1) - at(1, 1) * at(2, 0));
  return {
    c2: -(at(0, 0) + at(1, 1) + at(2, 2)),
    c1: minor(0, 1) + minor(0, 2) + minor(1, 2),
    c0: -determinant,
  };
}
