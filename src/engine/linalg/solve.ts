import { luDeterminant, luFactor, luSolve } from './lu';

/**
 * Solves A x = b without touching A or b.
 *
 * @param a n*n, row-major. @param b length n.
 * @returns A new array, or null where A is singular or the solution is not finite.
 */
export function solveLinear(a: Float64Array, b: Float64Array, n: number): Float64Array | null {
  const factors = a.slice(0, n * n);
  const pivots = new Int32Array(n);
  if (luFactor(factors, n, pivots) === 0) return null;
  const x = b.slice(0, n);
  luSolve(factors, n, pivots, x);
  return x.every(Number.isFinite) ? x : null;
}

/** det A; 0 where singular. Allocates a copy of A. */
export function determinant(a: Float64Array, n: number): number {
  const factors = a.slice(0, n * n);
  const pivots = new Int32Array(n);
  const { sign, logSize } = luDeterminant(factors, n, luFactor(factors, n, pivots));
  return sign === 0 ? 0 : sign * Math.exp(logSize);
}

/** Writes the transpose of A (n*n) to `out`, which must not be A itself. */
export function transpose(a: Float64Array, n: number, out: Float64Array): void {
  for (let i = 0; i < n; i += 1) for (let j = 0; j < n; j += 1) out[j * n + i] = a[i * n + j];
}

/** Largest absolute row sum of A (n*n). */
export function infinityNorm(a: Float64Array, n: number): number {
  let largest = 0;
  for (let i = 0; i < n; i += 1) {
    let sum = 0;
    for (let j = 0; j < n; j += 1) sum += Math.abs(a[i * n + j]);
    if (!(sum <= largest)) largest = sum;
  }
  return largest;
}
