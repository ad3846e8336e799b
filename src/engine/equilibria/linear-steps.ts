import { luFactor, luSolve } from '../linalg/lu';

/**
 * The linear systems of Newton's method, for the small dense Jacobians of population models
 * (n at most about 30): LU with partial pivoting, and a regularised step where that is hopeless.
 * Matrices are row-major; inputs are not written to unless said.
 */
export interface NewtonStep {
  /** d with J d = -f. */
  readonly direction: Float64Array;
  /** Solves J x = b anew; returns a new array. */
  solve(b: Float64Array): Float64Array;
}

/** Pivots below this share of the largest row entry make a matrix count as singular. */
const SMALLEST_PIVOT = 1e-15;

/** x with A x = b, a new array; null where A is singular to rounding. */
export function solveDense(A: Float64Array, b: Float64Array, m: number): Float64Array | null {
  const factors = factorise(A, m);
  return factors && substitute(factors, b, m);
}

/** Newton step of J d = -f; null where J is singular to rounding. */
export function newtonStep(J: Float64Array, f: Float64Array, m: number): NewtonStep | null {
  const factors = factorise(J, m);
  if (factors === null) return null;
  const solve = (b: Float64Array): Float64Array => substitute(factors, b, m);
  return { direction: solve(f).map((x) => -x), solve };
}

/** Regularised least-squares step (J'J + mu I) d = -J'f, mu = |f|^2 but not below rounding of J'J. */
export function leastSquaresStep(J: Float64Array, f: Float64Array, m: number): Float64Array {
  const A = new Float64Array(m * m);
  const d = new Float64Array(m);
  let size = 0;
  let mu = 0;
  for (let i = 0; i < m; i += 1) mu += f[i] * f[i];
  for (let a = 0; a < m; a += 1) {
    for (let b = 0; b < m; b += 1) {
      let sum = 0;
      for (let i = 0; i < m; i += 1) sum += J[i * m + a] * J[i * m + b];
      A[a * m + b] = sum;
    }
    size = Math.max(size, A[a * m + a]);
    for (let i = 0; i < m; i += 1) d[a] -= J[i * m + a] * f[i];
  }
  mu = Math.max(Math.min(mu, size), 1e-13 * size, Number.MIN_VALUE);
  for (let a = 0; a < m; a += 1) A[a * m + a] += mu;
  return solveDense(A, d, m) ?? d.fill(Number.NaN);
}

/** Rows brought to size 1, then LU. */
interface Factors {
  readonly lu: Float64Array;
  readonly pivots: Int32Array;
  readonly rowSize: Float64Array;
}

/** Null where A is singular to rounding. */
function factorise(A: Float64Array, m: number): Factors | null {
  const lu = A.slice(0, m * m);
  const rowSize = new Float64Array(m);
  for (let i = 0; i < m; i += 1) {
    for (let j = 0; j < m; j += 1) rowSize[i] = Math.max(rowSize[i], Math.abs(lu[i * m + j]));
    if (!(rowSize[i] > 0) || !Number.isFinite(rowSize[i])) return null;
    for (let j = 0; j < m; j += 1) lu[i * m + j] /= rowSize[i];
  }
  const pivots = new Int32Array(m);
  if (luFactor(lu, m, pivots) === 0) return null;
  for (let k = 0; k < m; k += 1) if (!(Math.abs(lu[k * m + k]) > SMALLEST_PIVOT)) return null;
  return { lu, pivots, rowSize };
}

function substitute({ lu, pivots, rowSize }: Factors, b: Float64Array, m: number): Float64Array {
  const x = b.map((value, i) => value / rowSize[i]);
  luSolve(lu, m, pivots, x);
  return x;
}
