import { describe, expect, it } from 'vitest';

import { BorderedSolver, solveBordered } from '../../../src/engine/linalg/bordered';
import { eigenvalues } from '../../../src/engine/linalg/eigenvalues';
import {
  complexEigenvector,
  leftComplexEigenvector,
  scaleToUnitProduct,
} from '../../../src/engine/linalg/eigenvectors';
import { leftNullVector, nullVector } from '../../../src/engine/linalg/null-vector';
import { nullspace, reduceToEchelon } from '../../../src/engine/linalg/nullspace';
import { solveLinear, transpose } from '../../../src/engine/linalg/solve';
import { multiply, randomMatrix } from './random-matrix';

describe('eigenvectors', () => {
  it.each([2, 3, 6, 15])('satisfy A q = lambda q and p^H A = lambda p^H for n = %i', (n) => {
    const a = randomMatrix(n, 11 * n);
    const transposed = new Float64Array(n * n);
    transpose(a, n, transposed);
    const { re, im } = eigenvalues(a, n);
    for (let k = 0; k < n; k += 1) {
      const q = complexEigenvector(a, n, re[k], im[k]);
      expect(q.residual).toBeLessThan(1e-12);
      const ar = multiply(a, q.re, n);
      const ai = multiply(a, q.im, n);
      let length = 0;
      for (let i = 0; i < n; i += 1) {
        expect(ar[i]).toBeCloseTo(re[k] * q.re[i] - im[k] * q.im[i], 11);
        expect(ai[i]).toBeCloseTo(re[k] * q.im[i] + im[k] * q.re[i], 11);
        length += q.re[i] ** 2 + q.im[i] ** 2;
      }
      expect(length).toBeCloseTo(1, 13);
      const raw = leftComplexEigenvector(a, n, re[k], im[k]);
      const p = scaleToUnitProduct(raw, q);
      if (!p) throw new Error('a simple eigenvalue has <p,q> different from zero');
      let productRe = 0;
      let productIm = 0;
      const pr = multiply(transposed, p.re, n);
      for (let i = 0; i < n; i += 1) {
        productRe += p.re[i] * q.re[i] + p.im[i] * q.im[i];
        productIm += p.re[i] * q.im[i] - p.im[i] * q.re[i];
        // Real part of A' p = conj(lambda) p.
        expect(pr[i]).toBeCloseTo(re[k] * p.re[i] + im[k] * p.im[i], 9);
      }
      expect(productRe).toBeCloseTo(1, 11);
      expect(productIm).toBeCloseTo(0, 11);
    }
  });

  it('are real for real eigenvalues', () => {
    const q = complexEigenvector(Float64Array.of(2, 1, 1, 2), 2, 3, 0);
    expect([...q.im]).toEqual([0, 0]);
    expect(q.re[0]).toBeCloseTo(Math.SQRT1_2, 13);
    expect(q.re[1]).toBeCloseTo(Math.SQRT1_2, 13);
  });

  it('report a number that is no eigenvalue by their residual', () => {
    expect(complexEigenvector(Float64Array.of(2, 0, 0, 5), 2, 3.5, 0).residual).toBeGreaterThan(0.1);
  });

  it('of a defective eigenvalue cannot be scaled against each other', () => {
    const a = Float64Array.of(1, 1, 0, 1);
    const q = complexEigenvector(a, 2, 1, 0);
    expect(scaleToUnitProduct(leftComplexEigenvector(a, 2, 1, 0), q)).toBeNull();
  });
});

describe('null vectors', () => {
  it.each([2, 4, 9])('of a matrix made singular, n = %i', (n) => {
    const a = randomMatrix(n, 5 * n);
    // Last column becomes the sum of the others, so that (1, ..., 1, -1) is the null vector.
    for (let i = 0; i < n; i += 1) {
      let sum = 0;
      for (let j = 0; j < n - 1; j += 1) sum += a[i * n + j];
      a[i * n + n - 1] = sum;
    }
    const { vector, residual } = nullVector(a, n);
    expect(residual).toBeLessThan(1e-14);
    for (let i = 0; i < n; i += 1) expect(vector[i] / vector[n - 1]).toBeCloseTo(i === n - 1 ? 1 : -1, 9);
    const left = leftNullVector(a, n).vector;
    const transposed = new Float64Array(n * n);
    transpose(a, n, transposed);
    multiply(transposed, left, n).forEach((value) => expect(value).toBeCloseTo(0, 13));
  });

  it('of a regular matrix report the smallest singular value', () => {
    const { vector, residual } = nullVector(Float64Array.of(3, 0, 0, 0.25), 2);
    expect(residual).toBeCloseTo(0.25, 12);
    expect(Math.abs(vector[1])).toBeCloseTo(1, 12);
  });

  it('of the zero matrix are finite', () => {
    expect(nullVector(new Float64Array(4), 2).vector.every(Number.isFinite)).toBe(true);
  });
});

describe('bordered systems', () => {
  it('stay regular where the matrix itself is singular', () => {
    const a = Float64Array.of(1, 2, 2, 4);
    const solution = solveBordered(
      a,
      2,
      Float64Array.of(1, 0),
      Float64Array.of(0, 1),
      0,
      Float64Array.of(5, 2),
      3,
    );
    if (!solution) throw new Error('the bordered matrix is regular');
    const { x, y } = solution;
    expect(x[0] + 2 * x[1] + y).toBeCloseTo(5, 12);
    expect(2 * x[0] + 4 * x[1]).toBeCloseTo(2, 12);
    expect(x[1]).toBeCloseTo(3, 12);
  });

  it('with two borders agree with the assembled matrix, transposed as well', () => {
    const n = 4;
    const whole = randomMatrix(6, 99);
    const part = (rows: [number, number], cols: [number, number]) => {
      const out: number[] = [];
      for (let i = rows[0]; i < rows[1]; i += 1)
        for (let j = cols[0]; j < cols[1]; j += 1) out.push(whole[i * 6 + j]);
      return Float64Array.from(out);
    };
    const lower = part([n, 6], [0, n]);
    const c = Float64Array.from({ length: 2 * n }, (_, k) => lower[(k % 2) * n + Math.floor(k / 2)]);
    const solver = new BorderedSolver(n, 2);
    expect(solver.factor(part([0, n], [0, n]), part([0, n], [n, 6]), c, part([n, 6], [n, 6]))).not.toBe(0);
    const right = Float64Array.of(1, -2, 3, -4, 5, -6);
    const x = new Float64Array(n);
    const y = new Float64Array(2);
    expect(solver.solve(right.slice(0, n), right.slice(n), x, y)).toBe(true);
    multiply(whole, [...x, ...y], 6).forEach((value, i) => expect(value).toBeCloseTo(right[i], 10));
    expect(solver.solveTransposed(right.slice(0, n), right.slice(n), x, y)).toBe(true);
    const transposed = new Float64Array(36);
    transpose(whole, 6, transposed);
    const expected = solveLinear(transposed, right, 6);
    [...x, ...y].forEach((value, i) => expect(value).toBeCloseTo(expected?.[i] ?? Number.NaN, 10));
  });
});

describe('null space', () => {
  it('of a wide matrix is orthonormal and annihilated', () => {
    const m = [1, 1, 1, 1, 1, -1, 1, -1];
    const basis = nullspace(m, 2, 4);
    expect(basis).toHaveLength(2);
    for (const vector of basis) {
      expect(Math.hypot(...vector)).toBeCloseTo(1, 12);
      for (const row of [0, 1]) {
        let sum = 0;
        for (let j = 0; j < 4; j += 1) sum += m[row * 4 + j] * vector[j];
        expect(sum).toBeCloseTo(0, 12);
      }
    }
  });

  it('is empty for independent columns, everything for zero, and empty for non-finite input', () => {
    expect(nullspace([1, 0, 0, 1, 1, 1], 3, 2)).toHaveLength(0);
    expect(nullspace([0, 0, 0], 1, 3)).toHaveLength(3);
    expect(nullspace([Number.NaN, 0], 1, 2)).toHaveLength(0);
  });

  it('becomes readable in echelon form', () => {
    // The span of (1, 0, 2) and (0, 1, -3), mixed.
    const vectors = [Float64Array.of(2, 1, 1), Float64Array.of(-1, 4, -14)];
    reduceToEchelon(vectors);
    const rows = vectors.map((vector) => [...vector]).sort((a, b) => b[0] - a[0]);
    [
      [1, 0, 2],
      [0, 1, -3],
    ].forEach((row, i) => row.forEach((value, j) => expect(rows[i][j]).toBeCloseTo(value, 12)));
  });
});
