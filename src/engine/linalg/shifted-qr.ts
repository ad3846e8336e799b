/** Iterations for one eigenvalue before giving up; exceptional shifts come at every tenth. */
const MOST_ITERATIONS = 60;

/**
 * Eigenvalues of an upper Hessenberg matrix by Francis' implicit double-shift QR iteration, in place.
 * Source: Martin, Peters & Wilkinson, Numer. Math. 14 (1970) 219, also Wilkinson & Reinsch,
 * Handbook for Automatic Computation II, contribution II/14 (from memory).
 *
 * @param h n*n Hessenberg, destroyed.
 * @param re length n, written. @param im length n, written; conjugates stand side by side.
 * @returns Number of eigenvalues found; less than n only where the iteration did not converge (then
 *   the last n - found entries hold them).
 */
export function hessenbergEigenvalues(
  h: Float64Array,
  n: number,
  re: Float64Array,
  im: Float64Array,
): number {
  let norm = 0;
  for (let i = 0; i < n; i += 1)
    for (let j = Math.max(i - 1, 0); j < n; j += 1) norm += Math.abs(h[i * n + j]);
  let last = n - 1;
  let shifted = 0;
  let iteration = 0;
  while (last >= 0) {
    const first = activeStart(h, n, last, norm);
    let x = h[last * n + last];
    if (first === last) {
      re[last] = x + shifted;
      im[last] = 0;
      last -= 1;
      iteration = 0;
      continue;
    }
    let y = h[(last - 1) * n + last - 1];
    let w = h[last * n + last - 1] * h[(last - 1) * n + last];
    if (first === last - 1) {
      pairEigenvalues(x, y, w, shifted, last, re, im);
      last -= 2;
      iteration = 0;
      continue;
    }
    if (iteration === MOST_ITERATIONS || !Number.isFinite(x)) return n - 1 - last;
    if (iteration % 10 === 9) {
      shifted += x;
      for (let i = 0; i <= last; i += 1) h[i * n + i] -= x;
      const s = Math.abs(h[last * n + last - 1]) + Math.abs(h[(last - 1) * n + last - 2]);
      x = 0.75 * s;
      y = x;
      w = -0.4375 * s * s;
    }
    iteration += 1;
    francisStep(h, n, first, last, x, y, w);
  }
  return n;
}

/** First row of the trailing block that no negligible subdiagonal entry splits; sets that entry to 0. */
function activeStart(h: Float64Array, n: number, last: number, norm: number): number {
  for (let l = last; l >= 1; l -= 1) {
    let size = Math.abs(h[(l - 1) * n + l - 1]) + Math.abs(h[l * n + l]);
    if (size === 0) size = norm;
    if (Math.abs(h[l * n + l - 1]) <= Number.EPSILON * size) {
      h[l * n + l - 1] = 0;
      return l;
    }
  }
  return 0;
}

/** Both eigenvalues of [[y, .], [., x]] whose off-diagonal product is w, shifted by `shift`. */
export function pairEigenvalues(
  x: number,
  y: number,
  w: number,
  shift: number,
  last: number,
  re: Float64Array,
  im: Float64Array,
): void {
  const p = 0.5 * (y - x);
  const q = p * p + w;
  const root = Math.sqrt(Math.abs(q));
  if (q < 0) {
    re[last - 1] = re[last] = x + shift + p;
    im[last - 1] = root;
    im[last] = -root;
    return;
  }
  const z = p + (p < 0 ? -root : root);
  re[last - 1] = x + shift + z;
  re[last] = z === 0 ? re[last - 1] : x + shift - w / z;
  im[last - 1] = im[last] = 0;
}

/** One double-shift sweep over rows first..last with shifts of sum x + y and product x y - w. */
function francisStep(
  h: Float64Array,
  n: number,
  first: number,
  last: number,
  shiftX: number,
  shiftY: number,
  w: number,
): void {
  let p = 0;
  let q = 0;
  let r = 0;
  let m = last - 2;
  for (; m >= first; m -= 1) {
    const z = h[m * n + m];
    const dx = shiftX - z;
    const dy = shiftY - z;
    p = (dx * dy - w) / h[(m + 1) * n + m] + h[m * n + m + 1];
    q = h[(m + 1) * n + m + 1] - z - dx - dy;
    r = h[(m + 2) * n + m + 1];
    const size = Math.abs(p) + Math.abs(q) + Math.abs(r);
    if (size > 0) {
      p /= size;
      q /= size;
      r /= size;
    }
    if (m === first) break;
    const u = Math.abs(h[m * n + m - 1]) * (Math.abs(q) + Math.abs(r));
    const v =
      Math.abs(p) * (Math.abs(h[(m - 1) * n + m - 1]) + Math.abs(z) + Math.abs(h[(m + 1) * n + m + 1]));
    if (u <= Number.EPSILON * v) break;
  }
  for (let i = m + 2; i <= last; i += 1) {
    h[i * n + i - 2] = 0;
    if (i > m + 2) h[i * n + i - 3] = 0;
  }
  for (let k = m; k < last; k += 1) {
    const inner = k < last - 1;
    let scale = 1;
    if (k > m) {
      p = h[k * n + k - 1];
      q = h[(k + 1) * n + k - 1];
      r = inner ? h[(k + 2) * n + k - 1] : 0;
      scale = Math.abs(p) + Math.abs(q) + Math.abs(r);
      if (scale === 0) continue;
      p /= scale;
      q /= scale;
      r /= scale;
    }
    const length = Math.sqrt(p * p + q * q + r * r);
    if (length === 0) continue;
    const s = p < 0 ? -length : length;
    if (k > m) h[k * n + k - 1] = -s * scale;
    else if (first !== m) h[k * n + k - 1] = -h[k * n + k - 1];
    p += s;
    const x = p / s;
    const y = q / s;
    const z = r / s;
    q /= p;
    r /= p;
    for (let j = k; j <= last; j += 1) {
      let sum = h[k * n + j] + q * h[(k + 1) * n + j];
      if (inner) {
        sum += r * h[(k + 2) * n + j];
        h[(k + 2) * n + j] -= sum * z;
      }
      h[(k + 1) * n + j] -= sum * y;
      h[k * n + j] -= sum * x;
    }
    const end = Math.min(last, k + 3);
    for (let i = first; i <= end; i += 1) {
      let sum = x * h[i * n + k] + y * h[i * n + k + 1];
      if (inner) {
        sum += z * h[i * n + k + 2];
        h[i * n + k + 2] -= sum * r;
      }
      h[i * n + k + 1] -= sum * q;
      h[i * n + k] -= sum;
    }
  }
}
