import { luFactor, luSolve, luSolveTransposed } from './lu';
import { infinityNorm, transpose } from './solve';

export interface NullVector {
  /** Unit length; its largest entry is positive. */
  readonly vector: Float64Array;
  /** |A v|, about the smallest singular value of A: zero where A is singular. */
  readonly residual: number;
}

/** Each step gains the squared ratio of the two smallest singular values. */
const ITERATIONS = 4;
const GOLDEN = 0.6180339887498949;

/**
 * Right null vector of a nearly singular matrix: the singular vector of the smallest singular value,
 * by inverse iteration with A'A through the LU factors of A. Zero pivots are lifted to rounding size.
 *
 * @param a n*n, row-major; not written to. Where A is far from singular the residual says so.
 */
export function nullVector(a: Float64Array, n: number): NullVector {
  const factors = a.slice(0, n * n);
  const pivots = new Int32Array(n);
  const smallest = Math.max(Number.EPSILON * infinityNorm(a, n), Number.MIN_VALUE / Number.EPSILON);
  luFactor(factors, n, pivots);
  for (let k = 0; k < n; k += 1) {
    const pivot = factors[k * n + k];
    if (Math.abs(pivot) < smallest) factors[k * n + k] = pivot < 0 ? -smallest : smallest;
  }
  const v = new Float64Array(n);
  for (let i = 0; i < n; i += 1) v[i] = 1 + ((i * GOLDEN) % 1);
  for (let k = 0; k < ITERATIONS; k += 1) {
    luSolveTransposed(factors, n, pivots, v);
    scaleToUnit(v, n);
    luSolve(factors, n, pivots, v);
    scaleToUnit(v, n);
  }
  let sum = 0;
  for (let i = 0; i < n; i += 1) {
    let r = 0;
    for (let j = 0; j < n; j += 1) r += a[i * n + j] * v[j];
    sum += r * r;
  }
  return { vector: v, residual: Math.sqrt(sum) };
}

/** Left null vector, A' v = 0. */
export function leftNullVector(a: Float64Array, n: number): NullVector {
  const transposed = new Float64Array(n * n);
  transpose(a, n, transposed);
  return nullVector(transposed, n);
}

function scaleToUnit(v: Float64Array, n: number): void {
  let largest = 0;
  let at = 0;
  for (let i = 0; i < n; i += 1) {
    if (Math.abs(v[i]) > largest * (1 + 1e-9)) {
      largest = Math.abs(v[i]);
      at = i;
    }
  }
  if (!(largest > 0) || largest === Infinity) return;
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += (v[i] / largest) ** 2;
  const length = (v[at] < 0 ? -largest : largest) * Math.sqrt(sum);
  for (let i = 0; i < n; i += 1) v[i] /= length;
}
