import { complexEigenvector } from '../linalg/eigenvectors';

/** What is needed of a proven constant of motion V. */
export interface MotionConstant {
  readonly formula: string;
  /** out[i*n+j] = d2V/du_i du_j. */
  hessian(u: ArrayLike<number>, out: Float64Array): void;
}

/** Determinants of the quadratic form below this share of its size count as zero. */
const DEFINITE = 1e-6;

/**
 * Whether a constant of motion V proves that a pair of imaginary eigenvalues belongs to a centre: V must
 * have an extremum on the plane of the pair, that is, its second derivatives must be definite on the
 * real and imaginary parts of the eigenvector (Lyapunov's centre theorem; the first derivatives vanish
 * there since grad V . J = 0). Returns the formula of V, or null.
 */
export function centreProven(
  constants: readonly MotionConstant[],
  u: Float64Array,
  J: Float64Array,
  re: number,
  im: number,
): string | null {
  const n = u.length;
  const { re: a, im: b } = complexEigenvector(J, n, re, im);
  const H = new Float64Array(n * n);
  const form = (x: Float64Array, y: Float64Array): number => {
    let sum = 0;
    for (let i = 0; i < n; i += 1) for (let j = 0; j < n; j += 1) sum += x[i] * H[i * n + j] * y[j];
    return sum;
  };
  for (const constant of constants) {
    constant.hessian(u, H);
    const [aa, ab, bb] = [form(a, a), form(a, b), form(b, b)];
    if (aa * bb - ab * ab > DEFINITE * (aa * aa + bb * bb)) return constant.formula;
  }
  return null;
}
