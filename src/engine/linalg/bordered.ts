import { luFactor, luSolve, luSolveTransposed } from './lu';

/**
 * Solver of bordered systems
 *
 *     [ A   B ] [x]   [f]
 *     [ C'  D ] [y] = [g]
 *
 * with A n*n, B n*k, C n*k, D k*k (all row-major), by LU with pivoting over the whole matrix: regular
 * also where A alone is singular, which is what borders are for. Buffers are kept between calls.
 */
export class BorderedSolver {
  private readonly size: number;
  private readonly matrix: Float64Array;
  private readonly pivots: Int32Array;
  private readonly column: Float64Array;

  constructor(
    readonly n: number,
    readonly borders = 1,
  ) {
    this.size = n + borders;
    this.matrix = new Float64Array(this.size * this.size);
    this.pivots = new Int32Array(this.size);
    this.column = new Float64Array(this.size);
  }

  /** Factorises; returns the sign of the permutation, 0 where the bordered matrix is singular too. */
  factor(a: Float64Array, b: Float64Array, c: Float64Array, d: Float64Array): number {
    const { n, borders: k, size: m, matrix } = this;
    for (let i = 0; i < n; i += 1) {
      for (let j = 0; j < n; j += 1) matrix[i * m + j] = a[i * n + j];
      for (let j = 0; j < k; j += 1) {
        matrix[i * m + n + j] = b[i * k + j];
        matrix[(n + j) * m + i] = c[i * k + j];
      }
    }
    for (let i = 0; i < k; i += 1) for (let j = 0; j < k; j += 1) matrix[(n + i) * m + n + j] = d[i * k + j];
    return luFactor(matrix, m, this.pivots);
  }

  /** Solves for one right-hand side; writes x (n) and y (k). False where it is not finite. */
  solve(f: Float64Array, g: Float64Array, x: Float64Array, y: Float64Array): boolean {
    this.load(f, g);
    luSolve(this.matrix, this.size, this.pivots, this.column);
    return this.unload(x, y);
  }

  /** The same with the transposed matrix. */
  solveTransposed(f: Float64Array, g: Float64Array, x: Float64Array, y: Float64Array): boolean {
    this.load(f, g);
    luSolveTransposed(this.matrix, this.size, this.pivots, this.column);
    return this.unload(x, y);
  }

  private load(f: Float64Array, g: Float64Array): void {
    for (let i = 0; i < this.n; i += 1) this.column[i] = f[i];
    for (let j = 0; j < this.borders; j += 1) this.column[this.n + j] = g[j];
  }

  private unload(x: Float64Array, y: Float64Array): boolean {
    let finite = true;
    for (let i = 0; i < this.size; i += 1) {
      const value = this.column[i];
      if (!Number.isFinite(value)) finite = false;
      if (i < this.n) x[i] = value;
      else y[i - this.n] = value;
    }
    return finite;
  }
}

export interface BorderedSolution {
  readonly x: Float64Array;
  readonly y: number;
}

/** One solve with a single border, [A b; c' d][x; y] = [f; g]; null where that matrix is singular. */
export function solveBordered(
  a: Float64Array,
  n: number,
  b: Float64Array,
  c: Float64Array,
  d: number,
  f: Float64Array,
  g: number,
): BorderedSolution | null {
  const solver = new BorderedSolver(n);
  if (solver.factor(a, b, c, Float64Array.of(d)) === 0) return null;
  const x = new Float64Array(n);
  const y = new Float64Array(1);
  return solver.solve(f, Float64Array.of(g), x, y) ? { x, y: y[0] } : null;
}
