import { complexLuFactor, complexLuSolve, createComplexMatrix } from './complex-lu';
import { infinityNorm, transpose } from './solve';

export interface ComplexVector {
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** |A v - lambda v| / (|A| |v|), in the largest entry: tells whether it is an eigenvector at all. */
  readonly residual: number;
}

/** Inverse iteration converges in one or two steps from an eigenvalue at full accuracy. */
const ITERATIONS = 3;
/** Starting weights spread by the golden ratio, so that no symmetry of A can make the start useless. */
const GOLDEN = 0.6180339887498949;
/** |<p,q>| of unit vectors below this: left and right eigenvectors are orthogonal up to rounding. */
const DEFECTIVE = 1e-12;

/**
 * Right eigenvector q, A q = lambda q, by inverse iteration in complex arithmetic, with <q,q> = 1 and
 * its largest entry real and positive.
 *
 * @param a n*n, row-major; not written to. @param re @param im the eigenvalue.
 * @returns New arrays. A poor residual, not an exception, where lambda is no eigenvalue.
 */
export function complexEigenvector(a: Float64Array, n: number, re: number, im: number): ComplexVector {
  const norm = Math.max(infinityNorm(a, n), Math.hypot(re, im), Number.MIN_VALUE / Number.EPSILON);
  const shifted = createComplexMatrix(n);
  shifted.re.set(a.subarray(0, n * n));
  for (let i = 0; i < n; i += 1) {
    shifted.re[i * n + i] -= re;
    shifted.im[i * n + i] = -im;
  }
  complexLuFactor(shifted, Number.EPSILON * norm);
  const vr = new Float64Array(n);
  const vi = new Float64Array(n);
  for (let i = 0; i < n; i += 1) {
    vr[i] = 1 + ((i * GOLDEN) % 1);
    vi[i] = im === 0 ? 0 : ((i + 1) * GOLDEN) % 1;
  }
  for (let k = 0; k < ITERATIONS; k += 1) {
    complexLuSolve(shifted, vr, vi);
    normalise(vr, vi, n);
  }
  return { re: vr, im: vi, residual: residualOf(a, n, re, im, vr, vi) / norm };
}

/**
 * Left eigenvector p: A' p = conj(lambda) p, that is p^H A = lambda p^H, with <p,p> = 1. To scale it
 * to <p,q> = sum conj(p_i) q_i = 1, divide by conj(<p,q>); see `scaleToUnitProduct`.
 */
export function leftComplexEigenvector(a: Float64Array, n: number, re: number, im: number): ComplexVector {
  const transposed = new Float64Array(n * n);
  transpose(a, n, transposed);
  return complexEigenvector(transposed, n, re, -im);
}

/** p scaled so that <p,q> = 1. Null where p and q are orthogonal: a defective eigenvalue. */
export function scaleToUnitProduct(p: ComplexVector, q: ComplexVector): ComplexVector | null {
  let sr = 0;
  let si = 0;
  for (let i = 0; i < p.re.length; i += 1) {
    sr += p.re[i] * q.re[i] + p.im[i] * q.im[i];
    si += p.re[i] * q.im[i] - p.im[i] * q.re[i];
  }
  const squared = sr * sr + si * si;
  if (!(squared > DEFECTIVE ** 2)) return null;
  const re = new Float64Array(p.re.length);
  const im = new Float64Array(p.re.length);
  // p / conj(s) = p s / |s|^2.
  for (let i = 0; i < re.length; i += 1) {
    re[i] = (p.re[i] * sr - p.im[i] * si) / squared;
    im[i] = (p.re[i] * si + p.im[i] * sr) / squared;
  }
  return { re, im, residual: p.residual };
}

function normalise(vr: Float64Array, vi: Float64Array, n: number): void {
  let largest = 0;
  let at = 0;
  for (let i = 0; i < n; i += 1) {
    const size = Math.hypot(vr[i], vi[i]);
    // A clear margin, so that ties between conjugate entries do not flip by rounding.
    if (size > largest * (1 + 1e-9)) {
      largest = size;
      at = i;
    }
  }
  if (!(largest > 0) || largest === Infinity) return;
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += (vr[i] / largest) ** 2 + (vi[i] / largest) ** 2;
  const length = largest * Math.sqrt(sum);
  const cosine = vr[at] / largest;
  const sine = vi[at] / largest;
  for (let i = 0; i < n; i += 1) {
    const r = (vr[i] * cosine + vi[i] * sine) / length;
    vi[i] = (vi[i] * cosine - vr[i] * sine) / length;
    vr[i] = r;
  }
}

function residualOf(
  a: Float64Array,
  n: number,
  re: number,
  im: number,
  vr: Float64Array,
  vi: Float64Array,
): number {
  let largest = 0;
  for (let i = 0; i < n; i += 1) {
    let r = -re * vr[i] + im * vi[i];
    let s = -re * vi[i] - im * vr[i];
    for (let j = 0; j < n; j += 1) {
      r += a[i * n + j] * vr[j];
      s += a[i * n + j] * vi[j];
    }
    const size = Math.hypot(r, s);
    if (!(size <= largest)) largest = size;
  }
  return largest;
}
