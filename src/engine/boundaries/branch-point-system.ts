import { leftNullVector } from '../linalg/null-vector';
import type { BoundaryScope } from './boundary-scope';
import { loadPoint, packPoint, scaledBlock, type DefiningSystem } from './defining-system';

/**
 * Points at which two branches over the first parameter cross among the present states:
 *
 *     f_a(u, p) + alpha w = 0,   A' w = 0,   <w, f_p1> = 0,   <w_0, w> = 1.
 *
 * Such points do not persist in general: the dummy unknown alpha stays zero only where something in the model
 * (a symmetry, an invariant) keeps them (Kuznetsov chapter 10, Moore 1980, from memory).
 * Unknowns u_a, w, alpha, p1, p2.
 */
export class BranchPointSystem implements DefiningSystem {
  readonly size: number;
  private readonly buffer: Float64Array;
  private readonly A: Float64Array;
  private readonly fp: Float64Array;
  private reference: Float64Array;

  constructor(
    readonly scope: BoundaryScope,
    readonly active: readonly number[],
  ) {
    const m = active.length;
    this.size = 2 * m + 3;
    this.buffer = new Float64Array(scope.n);
    this.A = new Float64Array(m * m);
    this.fp = new Float64Array(scope.n);
    this.reference = new Float64Array(m);
  }

  pack(u: Float64Array, first: number, second: number): Float64Array | null {
    const m = this.active.length;
    const x = packPoint(this, u, first, second);
    if (!loadPoint(this, x, this.buffer)) return null;
    scaledBlock(this.scope, this.active, this.A);
    x.set(leftNullVector(this.A, m).vector, m);
    this.refer(x);
    return x;
  }

  /** How far the crossing is from persisting, relative to the rates of the model. */
  dummyOf(x: Float64Array): number {
    return x[2 * this.active.length];
  }

  refer(x: Float64Array): void {
    const m = this.active.length;
    const w = x.slice(m, 2 * m);
    const squared = w.reduce((sum, value) => sum + value * value, 0);
    this.reference = w.map((value) => value / squared);
  }

  residual(x: Float64Array, out: Float64Array): boolean {
    const { scope, active, A, fp, reference } = this;
    if (!loadPoint(this, x, this.buffer)) return false;
    const m = active.length;
    const { stateScale } = scope;
    scaledBlock(scope, active, A);
    scope.system.parameterDerivative(0, scope.u, scope.firstIndex, fp);
    const alpha = x[2 * m];
    let [slope, norm] = [0, -1];
    for (let a = 0; a < m; a += 1) {
      out[a] = scope.f[active[a]] / stateScale[active[a]] + alpha * x[m + a];
      let sum = 0;
      for (let b = 0; b < m; b += 1) sum += A[b * m + a] * x[m + b];
      out[m + a] = sum;
      slope += (x[m + a] * fp[active[a]] * scope.firstScale) / stateScale[active[a]];
      norm += reference[a] * x[m + a];
    }
    out[2 * m] = slope;
    out[2 * m + 1] = norm;
    return Number.isFinite(slope);
  }
}
