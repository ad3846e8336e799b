import { describe, expect, it } from 'vitest';

import { luDeterminant, luFactor, luSolve, luSolveTransposed } from '../../../src/engine/linalg/lu';
import { determinant, solveLinear, transpose } from '../../../src/engine/linalg/solve';
import { multiply, randomMatrix } from './random-matrix';

describe('LU factors', () => {
  it.each([1, 2, 5, 12])('solve A x = b and A^T x = b for n = %i', (n) => {
    const a = randomMatrix(n, 3 + n);
    const x = Float64Array.from({ length: n }, (_, i) => i - 1.5);
    const lu = a.slice();
    const pivots = new Int32Array(n);
    expect(Math.abs(luFactor(lu, n, pivots))).toBe(1);
    const b = multiply(a, x, n);
    luSolve(lu, n, pivots, b);
    b.forEach((value, i) => expect(value).toBeCloseTo(x[i], 10));
    const transposed = new Float64Array(n * n);
    transpose(a, n, transposed);
    const c = multiply(transposed, x, n);
    luSolveTransposed(lu, n, pivots, c);
    c.forEach((value, i) => expect(value).toBeCloseTo(x[i], 10));
  });

  it('give the determinant of a Vandermonde matrix, product of differences', () => {
    const nodes = [1, 2, 4, 7];
    const a = Float64Array.from(nodes.flatMap((x) => [1, x, x * x, x ** 3]));
    // (2-1)(4-1)(7-1)(4-2)(7-2)(7-4) = 1*3*6*2*5*3
    expect(determinant(a, 4)).toBeCloseTo(540, 9);
    // Exchanging two rows turns the sign.
    const swapped = Float64Array.from([4, 2, 1, 7].flatMap((x) => [1, x, x * x, x ** 3]));
    expect(determinant(swapped, 4)).toBeCloseTo(-540, 9);
  });

  it('report a singular matrix as a value', () => {
    const a = Float64Array.of(1, 2, 2, 4);
    const pivots = new Int32Array(2);
    const sign = luFactor(a.slice(), 2, pivots);
    expect(sign).toBe(0);
    expect(luDeterminant(a, 2, sign)).toEqual({ sign: 0, logSize: -Infinity });
    expect(solveLinear(a, Float64Array.of(1, 1), 2)).toBeNull();
    expect(solveLinear(Float64Array.of(Number.NaN, 1, 1, 1), Float64Array.of(1, 1), 2)).toBeNull();
  });
});
