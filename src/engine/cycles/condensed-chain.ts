import { luFactor, luSolve } from '../linalg/lu';

/** Pivots of this size and below make the chain singular. */
const SINGULAR = Number.MIN_VALUE;

/**
 * Solver of the linear systems of collocation after the interior nodes of each interval are eliminated:
 *
 *     X_{k+1} = G_k X_k + H_k d + rho_k  (k = 0 .. N-1),   X_N = X_0,
 *     sum_k B_k X_k + D d = g,
 *
 * with n values X_k at each mesh point, E extra unknowns d (parameter, and logarithm of the period) and E
 * border rows (arclength, and phase). Inner X_k are eliminated one by one from two neighbouring block rows
 * with pivoting over both, which is stable where the product of the G_k is not (Ascher, Mattheij & Russell,
 * section 7.2, from memory). Cost O(N n^3). Owns its buffers.
 */
export class CondensedChain {
  private readonly width: number;
  private readonly work: Float64Array;
  /** Eliminated rows of each inner mesh point: upper triangular in X_k, then X_0, X_{k+1}, d, right-hand side. */
  private readonly kept: Float64Array;
  private readonly border: Float64Array;
  private readonly matrix: Float64Array;
  private readonly pivots: Int32Array;
  private readonly right: Float64Array;
  private readonly column: Float64Array;
  private regular = false;
  /**
   * Determinant of the last factorisation up to a positive factor of the mesh, as sign and logarithm: it
   * changes sign along a branch where another one crosses.
   */
  determinantSign = 0;
  determinantLog = 0;

  constructor(
    readonly N: number,
    readonly n: number,
    readonly extras: number,
  ) {
    this.width = 3 * n + extras + 1;
    this.work = new Float64Array(2 * n * this.width);
    this.kept = new Float64Array(N * n * this.width);
    this.border = new Float64Array(extras * this.width);
    const size = n + extras;
    this.matrix = new Float64Array(size * size);
    this.pivots = new Int32Array(size);
    this.right = new Float64Array(size);
    this.column = new Float64Array(size);
  }

  /**
   * Factorises.
   *
   * @param transfer row-major [G_k | H_k | rho_k], n rows of n + E + 1 columns for each k
   * @param rows B_k as rows[(e*(N+1) + k)*n + i]
   * @param corner D, E*E, row-major. @param g right-hand sides of the border, E
   * @returns false where the system is singular or not finite; the last solution then means nothing
   */
  factor(transfer: Float64Array, rows: Float64Array, corner: Float64Array, g: Float64Array): boolean {
    const { N, n, extras: E, width, work, border } = this;
    this.determinantSign = 1;
    this.determinantLog = 0;
    this.startChain(transfer);
    border.fill(0);
    for (let e = 0; e < E; e += 1) {
      for (let i = 0; i < n; i += 1) border[e * width + n + i] = rows[e * (N + 1) * n + i];
      for (let f = 0; f < E; f += 1) border[e * width + 3 * n + f] = corner[e * E + f];
      border[e * width + 3 * n + E] = g[e];
    }
    for (let k = 1; k < N; k += 1) {
      this.appendRows(transfer, k);
      for (let e = 0; e < E; e += 1)
        for (let i = 0; i < n; i += 1) border[e * width + i] += rows[(e * (N + 1) + k) * n + i];
      this.eliminate(k);
    }
    // The last step left X_N in the first n columns of the border and of the upper rows of the work.
    const size = n + E;
    for (let r = 0; r < n; r += 1) {
      const row = r * width;
      for (let i = 0; i < n; i += 1) this.matrix[r * size + i] = work[row + i] + work[row + n + i];
      for (let f = 0; f < E; f += 1) this.matrix[r * size + n + f] = work[row + 3 * n + f];
      this.right[r] = work[row + 3 * n + E];
    }
    for (let e = 0; e < E; e += 1) {
      const row = e * width;
      for (let i = 0; i < n; i += 1)
        this.matrix[(n + e) * size + i] =
          border[row + i] + border[row + n + i] + rows[(e * (N + 1) + N) * n + i];
      for (let f = 0; f < E; f += 1) this.matrix[(n + e) * size + n + f] = border[row + 3 * n + f];
      this.right[n + e] = border[row + 3 * n + E];
    }
    const sign = luFactor(this.matrix, size, this.pivots);
    this.determinantSign *= sign;
    for (let j = 0; j < size; j += 1) this.countPivot(this.matrix[j * size + j]);
    this.regular = sign !== 0;
    return this.regular;
  }

  /** Solves with the right-hand sides given to `factor`: X into `x` ((N+1)*n), extras into `d`. */
  solve(x: Float64Array, d: Float64Array): boolean {
    this.column.set(this.right);
    return this.finish(x, d, 1);
  }

  /** Solves with zero right-hand sides but for the border row `e`, where it is 1. */
  solveHomogeneous(e: number, x: Float64Array, d: Float64Array): boolean {
    this.column.fill(0);
    this.column[this.n + e] = 1;
    return this.finish(x, d, 0);
  }

  /** A vector that the nearly singular system maps to almost nothing, by two steps of inverse iteration. */
  solveNull(x: Float64Array, d: Float64Array): boolean {
    const { column } = this;
    const size = this.n + this.extras;
    for (let j = 0; j < size; j += 1) column[j] = 1 + ((j * 0.6180339887498949) % 1);
    if (!this.regular) return false;
    luSolve(this.matrix, size, this.pivots, column);
    const largest = column.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    for (let j = 0; j < size; j += 1) column[j] /= largest;
    return this.finish(x, d, 0);
  }

  private countPivot(pivot: number): void {
    if (pivot < 0) this.determinantSign = -this.determinantSign;
    this.determinantLog += Math.log(Math.abs(pivot));
  }

  private startChain(transfer: Float64Array): void {
    const { n, extras: E, width, work } = this;
    work.fill(0);
    for (let r = 0; r < n; r += 1) {
      const from = r * (n + E + 1);
      work[r * width + r] = 1;
      for (let i = 0; i < n; i += 1) work[r * width + n + i] = -transfer[from + i];
      for (let f = 0; f < E; f += 1) work[r * width + 3 * n + f] = -transfer[from + n + f];
      work[r * width + 3 * n + E] = transfer[from + n + E];
    }
  }

  private appendRows(transfer: Float64Array, k: number): void {
    const { n, extras: E, width, work } = this;
    for (let r = 0; r < n; r += 1) {
      const from = (k * n + r) * (n + E + 1);
      const row = (n + r) * width;
      for (let i = 0; i < n; i += 1) {
        work[row + i] = -transfer[from + i];
        work[row + n + i] = 0;
        work[row + 2 * n + i] = i === r ? 1 : 0;
        work[r * width + 2 * n + i] = 0;
      }
      for (let f = 0; f < E; f += 1) work[row + 3 * n + f] = -transfer[from + n + f];
      work[row + 3 * n + E] = transfer[from + n + E];
    }
  }

  /** Eliminates X_k; the rows left over and the border then hold X_{k+1} in their first columns. */
  private eliminate(k: number): void {
    const { n, extras: E, width, work, border, kept } = this;
    for (let c = 0; c < n; c += 1) {
      let pivotRow = c;
      let largest = Math.abs(work[c * width + c]);
      for (let r = c + 1; r < 2 * n; r += 1) {
        const value = Math.abs(work[r * width + c]);
        if (value > largest) {
          largest = value;
          pivotRow = r;
        }
      }
      if (pivotRow !== c) this.determinantSign = -this.determinantSign;
      if (pivotRow !== c)
        for (let j = c; j < width; j += 1) {
          const value = work[c * width + j];
          work[c * width + j] = work[pivotRow * width + j];
          work[pivotRow * width + j] = value;
        }
      const pivot = largest > SINGULAR ? work[c * width + c] : SINGULAR;
      this.countPivot(pivot);
      for (let r = c + 1; r < 2 * n; r += 1) subtract(work, r * width, work, c * width, c, width, pivot);
      for (let e = 0; e < E; e += 1) subtract(border, e * width, work, c * width, c, width, pivot);
    }
    kept.set(work.subarray(0, n * width), k * n * width);
    for (let r = 0; r < n; r += 1) {
      const to = r * width;
      const from = (n + r) * width;
      for (let i = 0; i < n; i += 1) work[to + i] = work[from + 2 * n + i];
      for (let j = n; j < 2 * n; j += 1) work[to + j] = work[from + j];
      for (let j = 3 * n; j < width; j += 1) work[to + j] = work[from + j];
    }
    for (let e = 0; e < E; e += 1)
      for (let i = 0; i < n; i += 1) {
        border[e * width + i] = border[e * width + 2 * n + i];
        border[e * width + 2 * n + i] = 0;
      }
  }

  private finish(x: Float64Array, d: Float64Array, particular: 0 | 1): boolean {
    const { N, n, extras: E, width, kept, column } = this;
    if (!this.regular) return false;
    luSolve(this.matrix, n + E, this.pivots, column);
    for (let j = 0; j < n + E; j += 1) if (!Number.isFinite(column[j])) return false;
    for (let i = 0; i < n; i += 1) x[i] = x[N * n + i] = column[i];
    for (let f = 0; f < E; f += 1) d[f] = column[n + f];
    for (let k = N - 1; k >= 1; k -= 1) {
      for (let r = n - 1; r >= 0; r -= 1) {
        const row = (k * n + r) * width;
        let sum = particular * kept[row + 3 * n + E];
        for (let i = r + 1; i < n; i += 1) sum -= kept[row + i] * x[k * n + i];
        for (let i = 0; i < n; i += 1)
          sum -= kept[row + n + i] * x[i] + kept[row + 2 * n + i] * x[(k + 1) * n + i];
        for (let f = 0; f < E; f += 1) sum -= kept[row + 3 * n + f] * d[f];
        x[k * n + r] = sum / kept[row + r];
      }
    }
    return true;
  }
}

/** row := row - (row[c] / pivot) * source, from column c on. */
function subtract(
  target: Float64Array,
  row: number,
  source: Float64Array,
  from: number,
  c: number,
  width: number,
  pivot: number,
): void {
  const factor = target[row + c] / pivot;
  if (factor === 0) return;
  for (let j = c; j < width; j += 1) target[row + j] -= factor * source[from + j];
}
