import { complexLuFactor, complexLuSolve, createComplexMatrix } from '../linalg/complex-lu';
import { complexEigenvector, leftComplexEigenvector, scaleToUnitProduct } from '../linalg/eigenvectors';
import { luFactor, luSolve } from '../linalg/lu';
import type { CompiledSystem } from '../system/contract';

/** Second and third derivatives of f along real vectors, restricted to the active states, by polarisation. */
class MultilinearForms {
  private readonly v: Float64Array;
  private readonly jet: Float64Array;

  constructor(
    private readonly system: CompiledSystem,
    private readonly u: Float64Array,
    private readonly active: readonly number[],
  ) {
    this.v = new Float64Array(system.dimension);
    this.jet = new Float64Array(3 * system.dimension);
  }

  /** D^k f (v, ..., v) on the active states. */
  power(x: Float64Array, order: 2 | 3): Float64Array {
    const n = this.system.dimension;
    this.v.fill(0);
    this.active.forEach((i, a) => (this.v[i] = x[a]));
    this.system.directional(0, this.u, this.v, this.jet);
    return Float64Array.from(this.active, (i) => this.jet[(order - 1) * n + i]);
  }

  /** B(x, y) = (D2(x + y) - D2(x - y))/4. */
  bilinear(x: Float64Array, y: Float64Array): Float64Array {
    const plus = this.power(combine(x, 1, y, 1), 2);
    const minus = this.power(combine(x, 1, y, -1), 2);
    return combine(plus, 0.25, minus, -0.25);
  }

  /** C(x, x, y) = (D3(x + y) - D3(x - y) - 2 D3(y))/6. */
  cubic(x: Float64Array, y: Float64Array): Float64Array {
    const difference = combine(
      this.power(combine(x, 1, y, 1), 3),
      1,
      this.power(combine(x, 1, y, -1), 3),
      -1,
    );
    return combine(difference, 1 / 6, this.power(y, 3), -1 / 3);
  }
}

/**
 * First Lyapunov coefficient of a Hopf point in the normalisation <q,q> = 1, <p,q> = 1:
 *   l1 = Re[ <p, C(q,q,q*)> - 2 <p, B(q, A^-1 B(q,q*))> + <p, B(q*, (2 i w - A)^-1 B(q,q))> ] / (2 w)
 * with A q = i w q, A' p = -i w p, so that l1 = Re c1 / w. Its size depends on units, its sign does not.
 * Source: Kuznetsov, Elements of Applied Bifurcation Theory, projection formula of the chapter on centre manifolds (from memory).
 *
 * @param u state at the point, all n states; parameters are those set on the system
 * @param J Jacobian of all n states there, row-major
 * @param active states that are present
 * @returns l1, or NaN where A is singular, the pair is defective, or derivatives are not finite
 */
export function firstLyapunovCoefficient(
  system: CompiledSystem,
  u: Float64Array,
  J: Float64Array,
  active: readonly number[],
  omega: number,
): number {
  const n = system.dimension;
  const m = active.length;
  const A = new Float64Array(m * m);
  active.forEach((i, a) => active.forEach((j, b) => (A[a * m + b] = J[i * n + j])));
  const q = complexEigenvector(A, m, 0, omega);
  const p = scaleToUnitProduct(leftComplexEigenvector(A, m, 0, omega), q);
  if (p === null) return NaN;
  const forms = new MultilinearForms(system, u, active);
  const { re: a, im: b } = q;

  const Baa = forms.bilinear(a, a);
  const Bbb = forms.bilinear(b, b);
  const Bab = forms.bilinear(a, b);
  // q q* : B(a,a) + B(b,b), real.
  const rest = combine(Baa, 1, Bbb, 1);
  const lu = A.slice();
  const pivots = new Int32Array(m);
  if (luFactor(lu, m, pivots) === 0) return NaN;
  luSolve(lu, m, pivots, rest);
  // (2 i w - A)^-1 B(q,q), with B(q,q) = B(a,a) - B(b,b) + 2 i B(a,b).
  const shifted = createComplexMatrix(m);
  for (let k = 0; k < m * m; k += 1) shifted.re[k] = -A[k];
  for (let k = 0; k < m; k += 1) shifted.im[k * m + k] = 2 * omega;
  const sr = combine(Baa, 1, Bbb, -1);
  const si = combine(Bab, 2, Bab, 0);
  complexLuFactor(shifted, Number.MIN_VALUE);
  complexLuSolve(shifted, sr, si);

  // C(q,q,q*) = C(a,a,a) + C(a,b,b) + i (C(a,a,b) + C(b,b,b)).
  const real = combine(forms.power(a, 3), 1, forms.cubic(b, a), 1);
  const imaginary = combine(forms.cubic(a, b), 1, forms.power(b, 3), 1);
  addScaled(real, -2, forms.bilinear(a, rest));
  addScaled(imaginary, -2, forms.bilinear(b, rest));
  // B(q*, s) with s = sr + i si.
  addScaled(real, 1, forms.bilinear(a, sr));
  addScaled(real, 1, forms.bilinear(b, si));
  addScaled(imaginary, 1, forms.bilinear(a, si));
  addScaled(imaginary, -1, forms.bilinear(b, sr));
  let sum = 0;
  for (let i = 0; i < m; i += 1) sum += p.re[i] * real[i] + p.im[i] * imaginary[i];
  return sum / (2 * omega);
}

function combine(x: Float64Array, s: number, y: Float64Array, t: number): Float64Array {
  return x.map((value, i) => s * value + t * y[i]);
}

function addScaled(target: Float64Array, scale: number, x: Float64Array): void {
  for (let i = 0; i < target.length; i += 1) target[i] += scale * x[i];
}
