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

/** Solves A x = b in place: A is overwritten, b becomes x. False where A is singular. */
export function solveDense(A: Float64Array, b: Float64Array, m: number): boolean {
  const order = new Int32Array(m);
  if (!factorise(A, order, m)) return false;
  b.set(substitute(A, order, b, m));
  return true;
}

/** Newton step of J d = -f; null where J is singular to rounding. */
export function newtonStep(J: Float64Array, f: Float64Array, m: number): NewtonStep | null {
  const factors = Float64Array.from(J);
  const order = new Int32Array(m);
  if (!factorise(factors, order, m)) return null;
  const solve = (b: Float64Array): Float64Array => substitute(factors, order, b, m);
  const direction = solve(f);
  for (let i = 0; i < m; i += 1) direction[i] = -direction[i];
  return { direction, solve };
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
  if (!solveDense(A, d, m)) d.fill(Number.NaN);
  return d;
}

/** LU with row equilibration in the choice of pivots; `A` becomes the factors, `order` the row order. */
function factorise(A: Float64Array, order: Int32Array, m: number): boolean {
  const rowSize = new Float64Array(m);
  for (let i = 0; i < m; i += 1) {
    order[i] = i;
    for (let j = 0; j < m; j += 1) rowSize[i] = Math.max(rowSize[i], Math.abs(A[i * m + j]));
    if (!(rowSize[i] > 0) || !Number.isFinite(rowSize[i])) return false;
  }
  for (let k = 0; k < m; k += 1) {
    let best = -1;
    let bestSize = 0;
    for (let i = k; i < m; i += 1) {
      const size = Math.abs(A[order[i] * m + k]) / rowSize[order[i]];
      if (size > bestSize) {
        bestSize = size;
        best = i;
      }
    }
    if (best < 0 || bestSize < SMALLEST_PIVOT) return false;
    const pivotRow = order[best];
    order[best] = order[k];
    order[k] = pivotRow;
    const pivot = A[pivotRow * m + k];
    for (let i = k + 1; i < m; i += 1) {
      const row = order[i];
      const factor = A[row * m + k] / pivot;
      A[row * m + k] = factor;
      if (factor !== 0)
        for (let j = k + 1; j < m; j += 1) A[row * m + j] -= factor * A[pivotRow * m + j];
    }
  }
  return true;
}

function substitute(A: Float64Array, order: Int32Array, b: Float64Array, m: number): Float64Array {
  const x = new Float64Array(m);
  for (let i = 0; i < m; i += 1) {
    let sum = b[order[i]];
    for (let j = 0; j < i; j += 1) sum -= A[order[i] * m + j] * x[j];
    x[i] = sum;
  }
  for (let i = m - 1; i >= 0; i -= 1) {
    let sum = x[i];
    for (let j = i + 1; j < m; j += 1) sum -= A[order[i] * m + j] * x[j];
    x[i] = sum / A[order[i] * m + i];
  }
  return x;
}
