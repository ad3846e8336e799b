/** LU with partial pivoting in complex arithmetic; real and imaginary parts in separate arrays. */
export interface ComplexMatrix {
  readonly n: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly pivots: Int32Array;
}

export function createComplexMatrix(n: number): ComplexMatrix {
  return { n, re: new Float64Array(n * n), im: new Float64Array(n * n), pivots: new Int32Array(n) };
}

/**
 * Factorises in place. Pivots below `smallestPivot` are replaced by it, so that inverse iteration
 * with an exact eigenvalue still has factors to work with.
 */
export function complexLuFactor(matrix: ComplexMatrix, smallestPivot: number): void {
  const { n, re, im, pivots } = matrix;
  for (let k = 0; k < n; k += 1) {
    let row = k;
    let largest = -1;
    for (let i = k; i < n; i += 1) {
      const size = Math.hypot(re[i * n + k], im[i * n + k]);
      if (size > largest) {
        largest = size;
        row = i;
      }
    }
    pivots[k] = row;
    if (row !== k) swapRows(matrix, k, row);
    const kk = k * n + k;
    if (largest < smallestPivot) {
      re[kk] = smallestPivot;
      im[kk] = 0;
    }
    const squared = re[kk] * re[kk] + im[kk] * im[kk];
    for (let i = k + 1; i < n; i += 1) {
      const ik = i * n + k;
      const fr = (re[ik] * re[kk] + im[ik] * im[kk]) / squared;
      const fi = (im[ik] * re[kk] - re[ik] * im[kk]) / squared;
      re[ik] = fr;
      im[ik] = fi;
      for (let j = k + 1; j < n; j += 1) {
        const kj = k * n + j;
        re[i * n + j] -= fr * re[kj] - fi * im[kj];
        im[i * n + j] -= fr * im[kj] + fi * re[kj];
      }
    }
  }
}

/** Solves in place from the factors: (xr, xi) becomes the solution. */
export function complexLuSolve(matrix: ComplexMatrix, xr: Float64Array, xi: Float64Array): void {
  const { n, re, im, pivots } = matrix;
  for (let k = 0; k < n; k += 1) {
    const row = pivots[k];
    const r = xr[row];
    const i = xi[row];
    xr[row] = xr[k];
    xi[row] = xi[k];
    xr[k] = r;
    xi[k] = i;
  }
  for (let i = 1; i < n; i += 1) subtractRow(matrix, i, 0, i, xr, xi);
  for (let i = n - 1; i >= 0; i -= 1) {
    subtractRow(matrix, i, i + 1, n, xr, xi);
    const dr = re[i * n + i];
    const di = im[i * n + i];
    const squared = dr * dr + di * di;
    const r = (xr[i] * dr + xi[i] * di) / squared;
    xi[i] = (xi[i] * dr - xr[i] * di) / squared;
    xr[i] = r;
  }
}

function subtractRow(
  matrix: ComplexMatrix,
  i: number,
  from: number,
  to: number,
  xr: Float64Array,
  xi: Float64Array,
): void {
  const { n, re, im } = matrix;
  let sr = xr[i];
  let si = xi[i];
  for (let j = from; j < to; j += 1) {
    const ij = i * n + j;
    sr -= re[ij] * xr[j] - im[ij] * xi[j];
    si -= re[ij] * xi[j] + im[ij] * xr[j];
  }
  xr[i] = sr;
  xi[i] = si;
}

function swapRows({ n, re, im }: ComplexMatrix, a: number, b: number): void {
  for (let j = 0; j < n; j += 1) {
    const r = re[a * n + j];
    const i = im[a * n + j];
    re[a * n + j] = re[b * n + j];
    im[a * n + j] = im[b * n + j];
    re[b * n + j] = r;
    im[b * n + j] = i;
  }
}
