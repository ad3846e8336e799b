import type { BoundaryScope } from './boundary-scope';
import { loadPoint, packPoint, scaledBlock, type DefiningSystem } from './defining-system';
import { complexEigenvector } from '../linalg/eigenvectors';
import { nullspace2 } from './pair-plane';

/**
 * Points with a pair of eigenvalues +- i omega, with kappa = omega^2 as an unknown:
 *
 *     f_a(u, p) = 0,   (A^2 + kappa W^2) v = 0,   <v_0, v> = 1,   <l, v> = 0,
 *
 * A the scaled Jacobian of the active states, W a fixed rate that makes kappa dimensionless, l any vector across
 * v_0 in the plane of the pair (Roose & Hlavacek 1985, Kuznetsov chapter 10, from memory). Regular also where kappa
 * passes zero, at a Bogdanov-Takens point; beyond it two real eigenvalues sum to zero, which is no Hopf point.
 */
export class HopfSystem implements DefiningSystem {
  readonly size: number;
  private readonly buffer: Float64Array;
  private readonly A: Float64Array;
  private readonly Av: Float64Array;
  private v0: Float64Array;
  private l: Float64Array;

  constructor(
    readonly scope: BoundaryScope,
    readonly active: readonly number[],
    /** Rate of the pair at the start, per time unit. */
    private readonly rate: number,
  ) {
    const m = active.length;
    this.size = 2 * m + 3;
    this.buffer = new Float64Array(scope.n);
    this.A = new Float64Array(m * m);
    this.Av = new Float64Array(m);
    this.v0 = new Float64Array(m);
    this.l = new Float64Array(m);
  }

  /** The point at an equilibrium with a pair near i omega (omega = 0 at a Bogdanov-Takens point). */
  pack(u: Float64Array, first: number, second: number, omega: number): Float64Array | null {
    const m = this.active.length;
    const x = packPoint(this, u, first, second);
    if (!loadPoint(this, x, this.buffer)) return null;
    scaledBlock(this.scope, this.active, this.A);
    const plane = omega > 0 ? complexEigenvector(this.A, m, 0, omega) : nullspace2(this.A, m);
    // A vector between the two: the null vector alone would solve these equations all along the fold as well.
    const v = unit(sum(unit(plane.re), unit(plane.im)));
    x.set(v, m);
    x[2 * m] = (omega / this.rate) ** 2;
    this.setPlane(v, plane.re);
    return x;
  }

  /** omega^2, negative where the two eigenvalues are real. */
  kappaOf(x: Float64Array): number {
    return x[2 * this.active.length] * this.rate ** 2;
  }

  refer(x: Float64Array): void {
    const m = this.active.length;
    if (!loadPoint(this, x, this.buffer)) return;
    scaledBlock(this.scope, this.active, this.A);
    const v = x.slice(m, 2 * m);
    // The plane of the pair is spanned by v and A v, but at a Bogdanov-Takens point A v may vanish: the old
    // vector serves where it does.
    const w = new Float64Array(m);
    multiply(this.A, m, v, w);
    const size = Math.sqrt(dot(w, w) / dot(v, v));
    this.setPlane(v, size > 1e-3 * this.rate ? w : this.l);
  }

  residual(x: Float64Array, out: Float64Array): boolean {
    const { scope, active, A, Av, rate } = this;
    if (!loadPoint(this, x, this.buffer)) return false;
    const m = active.length;
    for (let a = 0; a < m; a += 1) out[a] = scope.f[active[a]] / scope.stateScale[active[a]];
    scaledBlock(scope, active, A);
    const v = x.subarray(m, 2 * m);
    multiply(A, m, v, Av);
    const squared = rate * rate;
    for (let a = 0; a < m; a += 1) {
      let sum = 0;
      for (let b = 0; b < m; b += 1) sum += A[a * m + b] * Av[b];
      out[m + a] = sum / squared + x[2 * m] * v[a];
    }
    out[2 * m] = dot(this.v0, v) - 1;
    out[2 * m + 1] = dot(this.l, v);
    return true;
  }

  /** v_0 = v over its square, and l the part of w across v. */
  private setPlane(v: Float64Array, w: Float64Array): void {
    const along = dot(v, w) / dot(v, v);
    this.l = unit(w.map((value, a) => value - along * v[a]));
    this.v0 = v.map((value) => value / dot(v, v));
  }
}

function multiply(A: Float64Array, m: number, v: Float64Array, out: Float64Array): void {
  for (let a = 0; a < m; a += 1) {
    let sum = 0;
    for (let b = 0; b < m; b += 1) sum += A[a * m + b] * v[b];
    out[a] = sum;
  }
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < a.length; k += 1) sum += a[k] * b[k];
  return sum;
}

function sum(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((value, k) => value + b[k]);
}

function unit(v: Float64Array): Float64Array {
  const length = Math.sqrt(dot(v, v)) || 1;
  return v.map((value) => value / length);
}
