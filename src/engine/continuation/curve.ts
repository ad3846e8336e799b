import { luFactor, luSolve } from '../linalg/lu';
import type { CompiledSystem } from '../system/contract';

/** Newton corrections before a point is given up, and the scaled step at which it is taken. */
export const CORRECTOR_DEFAULTS = { iterations: 10, tolerance: 1e-11, accepted: 1e-8 } as const;

/**
 * Equilibria on one face of the state space as a curve: F(w) = f(u, p_k) restricted to the active states,
 * with w = (u_a / S_a, p_k / L), m active states and one parameter, so that units do not matter.
 * Absent states are held at exactly 0. The matrix of the corrector is [F_u S, F_p L; c'] for a
 * constraint c'w = target (pseudo-arclength: c the tangent; Keller 1977, from memory).
 */
export class Curve {
  readonly n: number;
  readonly m: number;
  /** u of the last evaluation, all n states. */
  readonly u: Float64Array;
  /** Jacobian of all n states at the last evaluation, row-major. */
  readonly jacobian: Float64Array;
  readonly parameters: Float64Array;
  /** Changes sign at a branch point; of the last tangent. */
  lastDeterminant = NaN;
  private readonly f: Float64Array;
  private readonly fp: Float64Array;
  private readonly matrix: Float64Array;
  private readonly pivots: Int32Array;
  private readonly step: Float64Array;

  constructor(
    readonly system: CompiledSystem,
    parameters: Float64Array,
    readonly parameterIndex: number,
    readonly active: readonly number[],
    readonly stateScale: Float64Array,
    readonly parameterScale: number,
  ) {
    this.n = system.dimension;
    this.m = active.length;
    this.u = new Float64Array(this.n);
    this.jacobian = new Float64Array(this.n * this.n);
    this.parameters = Float64Array.from(parameters);
    this.f = new Float64Array(this.n);
    this.fp = new Float64Array(this.n);
    this.matrix = new Float64Array((this.m + 1) ** 2);
    this.pivots = new Int32Array(this.m + 1);
    this.step = new Float64Array(this.m + 1);
  }

  /** Scaled point of a state and a value of the parameter. */
  pointOf(u: ArrayLike<number>, parameter: number): Float64Array {
    const w = new Float64Array(this.m + 1);
    this.active.forEach((i, a) => (w[a] = u[i] / this.stateScale[i]));
    w[this.m] = parameter / this.parameterScale;
    return w;
  }

  parameterAt(w: Float64Array): number {
    return w[this.m] * this.parameterScale;
  }

  /** Loads w into u and the system's parameters. */
  load(w: Float64Array): void {
    const { m, u, active, stateScale } = this;
    for (let a = 0; a < m; a += 1) u[active[a]] = w[a] * stateScale[active[a]];
    this.parameters[this.parameterIndex] = this.parameterAt(w);
    this.system.setParameters(this.parameters);
  }

  /** f, its Jacobian and its derivative by the parameter at w; false where they are not finite. */
  evaluate(w: Float64Array): boolean {
    this.load(w);
    this.system.rhs(0, this.u, this.f);
    this.system.jacobian(0, this.u, this.jacobian);
    this.system.parameterDerivative(0, this.u, this.parameterIndex, this.fp);
    // A sum is finite only where every part of it is, overflow aside, which is no place to be either.
    let sum = 0;
    for (let a = 0; a < this.m; a += 1) sum += this.f[this.active[a]] + this.fp[this.active[a]];
    for (let k = 0; k < this.jacobian.length; k += 1) sum += this.jacobian[k];
    return Number.isFinite(sum);
  }

  private fill(constraint: Float64Array): void {
    const { n, m, active, matrix } = this;
    const width = m + 1;
    for (let a = 0; a < m; a += 1) {
      const row = active[a] * n;
      for (let b = 0; b < m; b += 1) {
        matrix[a * width + b] = this.jacobian[row + active[b]] * this.stateScale[active[b]];
      }
      matrix[a * width + m] = this.fp[active[a]] * this.parameterScale;
    }
    for (let b = 0; b < width; b += 1) matrix[m * width + b] = constraint[b];
  }

  /** Factorises [F_u S, F_p L; c'] of the last evaluation; 0 where singular, else the sign of the permutation. */
  private factor(constraint: Float64Array): number {
    this.fill(constraint);
    return luFactor(this.matrix, this.m + 1, this.pivots);
  }

  /**
   * Newton's method for F(w) = 0 with constraint'w = target; w is moved in place.
   * @returns iterations used; -1 where it did not converge, -2 where values were not finite.
   */
  correct(
    w: Float64Array,
    constraint: Float64Array,
    target: number,
    iterations: number = CORRECTOR_DEFAULTS.iterations,
  ): number {
    const { m, step } = this;
    let before = Infinity;
    for (let k = 1; k <= iterations; k += 1) {
      if (!this.evaluate(w)) return -2;
      this.factor(constraint);
      for (let a = 0; a < m; a += 1) step[a] = -this.f[this.active[a]];
      let along = 0;
      for (let b = 0; b <= m; b += 1) along += constraint[b] * w[b];
      step[m] = target - along;
      luSolve(this.matrix, m + 1, this.pivots, step);
      let size = 0;
      for (let b = 0; b <= m; b += 1) {
        size = Math.max(size, Math.abs(step[b]) / (1 + Math.abs(w[b])));
        w[b] += step[b];
      }
      if (!Number.isFinite(size)) return -1;
      if (size <= CORRECTOR_DEFAULTS.tolerance) return k;
      // Rounding sets the floor near singular points: a small step that no longer shrinks is the end.
      if (size <= CORRECTOR_DEFAULTS.accepted && size > 0.5 * before) return k;
      if (k > 4 && size > 10 * before) return -1;
      before = size;
    }
    return before <= CORRECTOR_DEFAULTS.accepted ? iterations : -1;
  }

  /**
   * Unit tangent at the last evaluated point, turned along `reference`; false where it is not defined.
   * It also gives det [F_u S, F_p L; tangent'], in `lastDeterminant`: the determinant is linear in its last row and
   * zero for every row that the others span, so with v the solution for `reference` (reference'v = 1) and t = v/|v|
   * it is det [F_u S, F_p L; reference'] |v|.
   */
  tangent(reference: Float64Array, out: Float64Array): boolean {
    const { m } = this;
    let product = this.factor(reference);
    for (let b = 0; b <= m; b += 1) product *= this.matrix[b * (m + 1) + b];
    out.fill(0);
    out[m] = 1;
    luSolve(this.matrix, m + 1, this.pivots, out);
    let squared = 0;
    for (let b = 0; b <= m; b += 1) squared += out[b] * out[b];
    const length = Math.sqrt(squared);
    if (!(length > 0) || !Number.isFinite(length)) return false;
    for (let b = 0; b <= m; b += 1) out[b] /= length;
    this.lastDeterminant = product * length;
    return true;
  }

  /** [F_u S, F_p L; c'] at w, unfactored, row-major; null where values are not finite. */
  borderedMatrix(w: Float64Array, constraint: Float64Array): Float64Array | null {
    if (!this.evaluate(w)) return null;
    this.fill(constraint);
    return this.matrix.slice();
  }

  /** First tangent without a reference: along the parameter where the curve is regular in it, else along the null vector. */
  firstTangent(out: Float64Array): boolean {
    const reference = new Float64Array(this.m + 1);
    for (let b = this.m; b >= 0; b -= 1) {
      reference.fill(0);
      reference[b] = 1;
      if (this.tangent(reference, out) && Math.abs(out[b]) > 1e-3) return true;
    }
    return false;
  }
}
