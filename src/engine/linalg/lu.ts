/**
 * LU factors with partial pivoting, P A = L U, for small dense matrices (row-major Float64Array).
 * Nothing here allocates. Source: Golub & Van Loan, Matrix Computations, algorithm 3.4.1 (from memory).
 */

/**
 * Factorises A in place: L below the diagonal (unit diagonal not stored), U on and above it.
 *
 * @param a n*n, overwritten by the factors.
 * @param pivots length n, written: row swapped with row k at step k.
 * @returns Sign of the permutation (1 or -1), or 0 where a pivot is exactly zero or not finite. The
 *   factorisation goes on past a zero pivot, so that the factors can still be mended or inspected.
 */
export function luFactor(a: Float64Array, n: number, pivots: Int32Array): number {
  let sign = 1;
  let singular = false;
  for (let k = 0; k < n; k += 1) {
    let pivotRow = k;
    let largest = Math.abs(a[k * n + k]);
    for (let i = k + 1; i < n; i += 1) {
      const size = Math.abs(a[i * n + k]);
      if (size > largest) {
        largest = size;
        pivotRow = i;
      }
    }
    pivots[k] = pivotRow;
    if (!(largest > 0) || largest === Infinity) {
      singular = true;
      continue;
    }
    if (pivotRow !== k) {
      sign = -sign;
      for (let j = 0; j < n; j += 1) {
        const kept = a[k * n + j];
        a[k * n + j] = a[pivotRow * n + j];
        a[pivotRow * n + j] = kept;
      }
    }
    const pivot = a[k * n + k];
    for (let i = k + 1; i < n; i += 1) {
      const factor = a[i * n + k] / pivot;
      a[i * n + k] = factor;
      if (factor === 0) continue;
      for (let j = k + 1; j < n; j += 1) a[i * n + j] -= factor * a[k * n + j];
    }
  }
  return singular ? 0 : sign;
}

/** Solves A x = b from the factors of A; b (length n) becomes x. Not finite where a pivot is zero. */
export function luSolve(lu: Float64Array, n: number, pivots: Int32Array, b: Float64Array): void {
  for (let k = 0; k < n; k += 1) {
    const row = pivots[k];
    const kept = b[row];
    b[row] = b[k];
    b[k] = kept;
  }
  for (let i = 1; i < n; i += 1) {
    let sum = b[i];
    for (let j = 0; j < i; j += 1) sum -= lu[i * n + j] * b[j];
    b[i] = sum;
  }
  for (let i = n - 1; i >= 0; i -= 1) {
    let sum = b[i];
    for (let j = i + 1; j < n; j += 1) sum -= lu[i * n + j] * b[j];
    b[i] = sum / lu[i * n + i];
  }
}

/** Solves A' x = b from the factors of A; b (length n) becomes x. */
export function luSolveTransposed(lu: Float64Array, n: number, pivots: Int32Array, b: Float64Array): void {
  for (let i = 0; i < n; i += 1) {
    let sum = b[i];
    for (let j = 0; j < i; j += 1) sum -= lu[j * n + i] * b[j];
    b[i] = sum / lu[i * n + i];
  }
  for (let i = n - 2; i >= 0; i -= 1) {
    let sum = b[i];
    for (let j = i + 1; j < n; j += 1) sum -= lu[j * n + i] * b[j];
    b[i] = sum;
  }
  for (let k = n - 1; k >= 0; k -= 1) {
    const row = pivots[k];
    const kept = b[row];
    b[row] = b[k];
    b[k] = kept;
  }
}

export interface LuDeterminant {
  /** 1, -1, or 0 where singular. */
  readonly sign: number;
  /** log |det A|; -Infinity where singular. */
  readonly logSize: number;
}

/** Determinant of A from its factors, as sign and logarithm so that it cannot overflow. */
export function luDeterminant(lu: Float64Array, n: number, permutationSign: number): LuDeterminant {
  let sign = permutationSign;
  let logSize = 0;
  for (let k = 0; k < n; k += 1) {
    const pivot = lu[k * n + k];
    if (pivot < 0) sign = -sign;
    logSize += Math.log(Math.abs(pivot));
  }
  return sign === 0 ? { sign: 0, logSize: -Infinity } : { sign, logSize };
}
