import { balanceMatrix } from './balance';
import { nativeEigenvalues } from '../core/native-eigenvalues';
import { reduceToHessenberg } from './hessenberg';
import { hessenbergEigenvalues, pairEigenvalues } from './shifted-qr';

/** Size from which the compiled core gains more than copying costs; the bench has the row. */
const NATIVE_FROM = 12;

export interface Eigenvalues {
  /** Real parts, falling; of a conjugate pair the one with positive imaginary part comes first. */
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** False where the matrix holds non-finite numbers or the iteration failed; then all are NaN. */
  readonly converged: boolean;
}

/** Buffers for the eigenvalues of many matrices of one size; see `eigenvaluesInto`. */
export interface EigenWorkspace {
  readonly n: number;
  readonly matrix: Float64Array;
  readonly vector: Float64Array;
}

export function createEigenWorkspace(n: number): EigenWorkspace {
  return { n, matrix: new Float64Array(n * n), vector: new Float64Array(n) };
}

/**
 * All eigenvalues of a real matrix: balancing, Hessenberg form, shifted QR; by formula for n <= 2.
 * Backward stable: they are exact for a matrix within a few n * 1e-16 * |A| of A.
 *
 * @param a n*n, row-major; not written to.
 * @returns New arrays, ordered by falling real part. Failure is `converged: false`.
 */
export function eigenvalues(a: Float64Array, n: number): Eigenvalues {
  const re = new Float64Array(n);
  const im = new Float64Array(n);
  const converged = eigenvaluesInto(a, createEigenWorkspace(n), re, im);
  return { re, im, converged };
}

/** As `eigenvalues`, without allocating: writes length n to `re` and `im`; returns whether it converged. */
export function eigenvaluesInto(
  a: Float64Array,
  workspace: EigenWorkspace,
  re: Float64Array,
  im: Float64Array,
): boolean {
  const { n, matrix, vector } = workspace;
  let found = n;
  for (let k = 0; k < n * n; k += 1) {
    if (!Number.isFinite(a[k])) found = -1;
    matrix[k] = a[k];
  }
  if (found === n && n >= NATIVE_FROM) {
    const converged = nativeEigenvalues(a, n, re, im);
    if (converged !== null) {
      if (converged) orderByRealPart(re, im, n);
      else failInto(re, im, n);
      return converged;
    }
  }
  if (found === n && n > 2) {
    balanceMatrix(matrix, n);
    reduceToHessenberg(matrix, n, vector);
    found = hessenbergEigenvalues(matrix, n, re, im);
  } else if (n === 2) {
    pairEigenvalues(a[3], a[0], a[1] * a[2], 0, 1, re, im);
  } else if (n === 1) {
    re[0] = a[0];
    im[0] = 0;
  }
  if (found !== n) {
    failInto(re, im, n);
    return false;
  }
  orderByRealPart(re, im, n);
  return true;
}

function failInto(re: Float64Array, im: Float64Array, n: number): void {
  re.fill(Number.NaN, 0, n);
  im.fill(Number.NaN, 0, n);
}

/** Insertion sort: n is small and the order is often nearly right. Stable, so pairs stay together. */
function orderByRealPart(re: Float64Array, im: Float64Array, n: number): void {
  for (let k = 1; k < n; k += 1) {
    const x = re[k];
    const y = im[k];
    let at = k - 1;
    while (at >= 0 && re[at] < x) {
      re[at + 1] = re[at];
      im[at + 1] = im[at];
      at -= 1;
    }
    re[at + 1] = x;
    im[at + 1] = y;
  }
}
