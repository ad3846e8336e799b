import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { describe, expect, it } from 'vitest';

import { createEigenWorkspace, eigenvalues, eigenvaluesInto } from '../../../src/engine/linalg/eigenvalues';
import { determinant } from '../../../src/engine/linalg/solve';
import { randomMatrix } from './random-matrix';

const pairs = (re: ArrayLike<number>, im: ArrayLike<number>) =>
  Array.from(re, (x, k) => [x, im[k]] as const).sort((a, b) => b[0] - a[0] || b[1] - a[1]);

describe('eigenvalues', () => {
  it.each([3, 4, 6, 10, 25])('agree with ml-matrix for n = %i', (n) => {
    for (let seed = 1; seed <= 20; seed += 1) {
      const a = randomMatrix(n, 100 * n + seed);
      const own = eigenvalues(a, n);
      expect(own.converged).toBe(true);
      const rows = Array.from({ length: n }, (_, i) => Array.from(a.subarray(i * n, (i + 1) * n)));
      const other = new EigenvalueDecomposition(new Matrix(rows));
      const expected = pairs(other.realEigenvalues, other.imaginaryEigenvalues);
      pairs(own.re, own.im).forEach(([re, im], k) => {
        expect(re).toBeCloseTo(expected[k][0], 9);
        expect(im).toBeCloseTo(expected[k][1], 9);
      });
    }
  });

  it.each([1, 2, 3, 7, 40])('sum to the trace and multiply to the determinant for n = %i', (n) => {
    const a = randomMatrix(n, 7 * n);
    const { re, im } = eigenvalues(a, n);
    let trace = 0;
    for (let i = 0; i < n; i += 1) trace += a[i * n + i];
    expect(re.reduce((sum, x) => sum + x, 0)).toBeCloseTo(trace, 11);
    let logSize = 0;
    re.forEach((x, k) => (logSize += Math.log(Math.hypot(x, im[k]))));
    expect(logSize).toBeCloseTo(Math.log(Math.abs(determinant(a, n))), 9);
    for (let k = 1; k < n; k += 1) expect(re[k]).toBeLessThanOrEqual(re[k - 1]);
  });

  // Jacobian at the coexistence state of x' = x - x (y1 + y2), yk' = x (y1 + y2)/2 - (1 +- s) yk
  // (case B1); values derived from L^3 + (1 + s^2) L^2 + (1 - s^2) L + (1 - s^2) = 0.
  it.each([
    [0, 0, 1, -1],
    [0.1, -0.0024748439240214544, 0.9924813297139757, -1.0050503121519572],
    [0.3, -0.02036325821580087, 0.9310489159786635, -1.0492734835683983],
    [0.5, -0.044707643262208455, 0.802637659185427, -1.1605847134755831],
    [0.9, -0.023322263019518136, 0.32742203915802476, -1.7633554739609638],
  ])('are exact for a predator split by mortality, s = %f', (s, re, im, third) => {
    const x = 1 - s * s;
    const a = Float64Array.of(0, -x, -x, 0.5, x / 2 - 1 - s, x / 2, 0.5, x / 2, x / 2 - 1 + s);
    const found = eigenvalues(a, 3);
    [re, re, third].forEach((value, k) => expect(found.re[k]).toBeCloseTo(value, 13));
    [im, -im, 0].forEach((value, k) => expect(found.im[k]).toBeCloseTo(value, 13));
  });

  it('of an age-structured matrix that only shifts lie on the cube roots of one (case I4)', () => {
    const found = eigenvalues(Float64Array.of(0, 0, 6, 0.5, 0, 0, 0, 1 / 3, 0), 3);
    found.re.forEach((re, k) => expect(Math.hypot(re, found.im[k])).toBeCloseTo(1, 12));
    expect(found.re[0]).toBeCloseTo(1, 12);
    expect(found.im[1]).toBeCloseTo(Math.sqrt(0.75), 12);
  });

  it('of a badly scaled matrix keep their relative accuracy', () => {
    // diag(s)^-1 [[1,2],[3,4]] diag(s) embedded in three dimensions.
    const s = 1e9;
    const found = eigenvalues(Float64Array.of(1, 2 * s, 0, 3 / s, 4, 0, 0, 0, -7), 3);
    expect(found.re[0]).toBeCloseTo((5 + Math.sqrt(33)) / 2, 12);
    expect(found.re[1]).toBeCloseTo((5 - Math.sqrt(33)) / 2, 12);
    expect(found.re[2]).toBeCloseTo(-7, 12);
  });

  it('by formula keep the centre of a neutral pair at exactly zero', () => {
    const { re, im } = eigenvalues(Float64Array.of(0, -1, 1, 0), 2);
    expect([...re]).toEqual([0, 0]);
    expect([...im]).toEqual([1, -1]);
    expect([...eigenvalues(Float64Array.of(2, 1, 0, 2), 2).re]).toEqual([2, 2]);
  });

  it('of a zero matrix, and of a triangular one', () => {
    expect([...eigenvalues(new Float64Array(16), 4).re]).toEqual([0, 0, 0, 0]);
    const { re, im } = eigenvalues(Float64Array.of(3, 5, 7, 0, 1, 2, 0, 0, -4), 3);
    expect([...re]).toEqual([3, 1, -4]);
    expect([...im]).toEqual([0, 0, 0]);
  });

  it('refuse a matrix that is not finite, as a value, and write nothing to the input', () => {
    const a = Float64Array.of(1, Number.NaN, 0, 1);
    const kept = a.slice();
    const { converged, re } = eigenvalues(a, 2);
    expect(converged).toBe(false);
    expect(re.every(Number.isNaN)).toBe(true);
    expect(a).toEqual(kept);
    const workspace = createEigenWorkspace(1);
    expect(
      eigenvaluesInto(Float64Array.of(Infinity), workspace, new Float64Array(1), new Float64Array(1)),
    ).toBe(false);
  });
});
