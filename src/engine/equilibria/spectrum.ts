import { complexEigenvector, leftComplexEigenvector } from '../linalg/eigenvectors';
import { eigenvalues } from '../linalg/eigenvalues';
import { infinityNorm } from '../linalg/solve';
import type { CompiledSystem } from '../system/contract';
import { NEWTON_DEFAULTS } from './newton';

/**
 * Eigenvalues of a Jacobian with a bound on the error of each. The matrix is known up to
 * |E| = c n eps |J| + |J(u + du) - J(u)|, du the accuracy of the state; then to first order
 *
 *     |d lambda| <= kappa |E|,  kappa = |x| |y| / |y^H x|  (left and right eigenvectors),
 *
 * and never more than 2 |J| (|E|/|J|)^(1/n) (Ostrowski), which holds for defective eigenvalues too.
 * Source: Golub & Van Loan, Matrix Computations, sect. 7.2 (from memory).
 */
export interface Spectrum {
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** Bound on the error of each eigenvalue. */
  readonly error: Float64Array;
}

/** Safety on the rounding of matrix and algorithm. */
const ROUNDING = 32 * Number.EPSILON;

/** @param uncertainty how far the matrix may be from the true one, in the infinity norm. Null on failure. */
export function spectrumOf(matrix: Float64Array, n: number, uncertainty: number): Spectrum | null {
  const { re, im, converged } = eigenvalues(matrix, n);
  if (!converged) return null;
  const norm = infinityNorm(matrix, n);
  const E = ROUNDING * n * norm + uncertainty;
  const error = new Float64Array(n);
  const worst = norm === 0 ? 0 : 2 * norm * (E / norm) ** (1 / n);
  for (let k = 0; k < n; k += 1) {
    if (n === 1) {
      error[k] = E;
      continue;
    }
    const x = complexEigenvector(matrix, n, re[k], im[k]);
    const y = leftComplexEigenvector(matrix, n, re[k], im[k]);
    let real = 0;
    let imaginary = 0;
    for (let i = 0; i < n; i += 1) {
      real += y.re[i] * x.re[i] + y.im[i] * x.im[i];
      imaginary += y.re[i] * x.im[i] - y.im[i] * x.re[i];
    }
    const bound = E / Math.hypot(real, imaginary);
    error[k] = Number.isFinite(bound) ? Math.min(Math.max(bound, E), Math.max(worst, E)) : worst;
  }
  return { re, im, error };
}

/** Change of the Jacobian over the accuracy of the state: the largest over moves of single states up and down. */
export function jacobianUncertainty(
  system: CompiledSystem,
  u: Float64Array,
  J: Float64Array,
  accuracy: number,
  scale: Float64Array,
): number {
  const n = system.dimension;
  const moved = Float64Array.from(u);
  const other = new Float64Array(n * n);
  let largest = 0;
  for (let k = 0; k < n; k += 1) {
    if (u[k] === 0) continue;
    moved[k] =
      u[k] +
      Math.max(accuracy, 4 * Number.EPSILON) * Math.max(Math.abs(u[k]), NEWTON_DEFAULTS.floor * scale[k]);
    system.jacobian(0, moved, other);
    moved[k] = u[k];
    for (let a = 0; a < n * n; a += 1) other[a] -= J[a];
    const change = infinityNorm(other, n);
    if (Number.isFinite(change)) largest += change;
  }
  return largest;
}
