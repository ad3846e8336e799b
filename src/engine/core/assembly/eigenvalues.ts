import { at, put } from './memory';

/**
 * Eigenvalues of a real matrix without allocation: balancing (Parlett & Reinsch 1969), Hessenberg form by Householder
 * reflections with row-wise access (Golub & Van Loan, algorithm 7.4.2), Francis' implicit double shift
 * (Martin, Peters & Wilkinson 1970); all from memory, and as in `linalg/`, against which they are tested.
 */

const MOST_ITERATIONS = 60;

/**
 * @param a n*n row-major, destroyed. @param re, im length n, written; conjugates side by side. @param work 2n
 * @returns number of eigenvalues found; less than n where the iteration did not converge
 */
export function eigenvalues(n: i32, a: usize, re: usize, im: usize, work: usize): i32 {
  if (n === 1) {
    put(re, 0, at(a, 0));
    put(im, 0, 0);
    return 1;
  }
  if (n === 2) {
    pair(at(a, 3), at(a, 0), at(a, 1) * at(a, 2), 0, 1, re, im);
    return 2;
  }
  balance(n, a);
  reduce(n, a, work, work + ((<usize>n) << 3));
  return iterate(n, a, re, im);
}

function balance(n: i32, a: usize): void {
  let settled = false;
  while (!settled) {
    settled = true;
    for (let i = 0; i < n; i += 1) {
      let column: f64 = 0;
      let row: f64 = 0;
      for (let j = 0; j < n; j += 1) {
        if (j === i) continue;
        column += Math.abs(at(a, j * n + i));
        row += Math.abs(at(a, i * n + j));
      }
      if (!(column > 0 && row > 0) || !isFinite(column) || !isFinite(row)) continue;
      const sum = column + row;
      let scale: f64 = 1;
      while (column < row / 2) {
        scale *= 2;
        column *= 4;
      }
      while (column > row * 2) {
        scale /= 2;
        column /= 4;
      }
      if (scale === 1 || (column + row) / scale >= 0.95 * sum) continue;
      for (let j = 0; j < n; j += 1) put(a, i * n + j, at(a, i * n + j) / scale);
      for (let j = 0; j < n; j += 1) put(a, j * n + i, at(a, j * n + i) * scale);
      settled = false;
    }
  }
}

function reduce(n: i32, a: usize, v: usize, dots: usize): void {
  for (let k = 0; k < n - 2; k += 1) {
    let scale: f64 = 0;
    for (let i = k + 2; i < n; i += 1) scale += Math.abs(at(a, i * n + k));
    if (scale === 0) continue;
    scale += Math.abs(at(a, (k + 1) * n + k));
    let squares: f64 = 0;
    for (let i = k + 1; i < n; i += 1) {
      const value = at(a, i * n + k) / scale;
      put(v, i, value);
      squares += value * value;
    }
    const length = at(v, k + 1) > 0 ? -Math.sqrt(squares) : Math.sqrt(squares);
    const half = squares - at(v, k + 1) * length;
    put(v, k + 1, at(v, k + 1) - length);
    for (let j = k + 1; j < n; j += 1) put(dots, j, 0);
    for (let i = k + 1; i < n; i += 1) {
      const weight = at(v, i) / half;
      const row = i * n;
      for (let j = k + 1; j < n; j += 1) put(dots, j, at(dots, j) + weight * at(a, row + j));
    }
    for (let i = k + 1; i < n; i += 1) {
      const weight = at(v, i);
      const row = i * n;
      for (let j = k + 1; j < n; j += 1) put(a, row + j, at(a, row + j) - weight * at(dots, j));
    }
    for (let i = 0; i < n; i += 1) {
      const row = i * n;
      let dot: f64 = 0;
      for (let j = k + 1; j < n; j += 1) dot += at(v, j) * at(a, row + j);
      dot /= half;
      for (let j = k + 1; j < n; j += 1) put(a, row + j, at(a, row + j) - dot * at(v, j));
    }
    put(a, (k + 1) * n + k, scale * length);
    for (let i = k + 2; i < n; i += 1) put(a, i * n + k, 0);
  }
}

function iterate(n: i32, h: usize, re: usize, im: usize): i32 {
  let norm: f64 = 0;
  for (let i = 0; i < n; i += 1)
    for (let j = i > 0 ? i - 1 : 0; j < n; j += 1) norm += Math.abs(at(h, i * n + j));
  let last = n - 1;
  let shifted: f64 = 0;
  let iteration = 0;
  while (last >= 0) {
    const first = activeStart(h, n, last, norm);
    let x = at(h, last * n + last);
    if (first === last) {
      put(re, last, x + shifted);
      put(im, last, 0);
      last -= 1;
      iteration = 0;
      continue;
    }
    let y = at(h, (last - 1) * n + last - 1);
    let w = at(h, last * n + last - 1) * at(h, (last - 1) * n + last);
    if (first === last - 1) {
      pair(x, y, w, shifted, last, re, im);
      last -= 2;
      iteration = 0;
      continue;
    }
    if (iteration === MOST_ITERATIONS || !isFinite(x)) return n - 1 - last;
    if (iteration % 10 === 9) {
      shifted += x;
      for (let i = 0; i <= last; i += 1) put(h, i * n + i, at(h, i * n + i) - x);
      const s = Math.abs(at(h, last * n + last - 1)) + Math.abs(at(h, (last - 1) * n + last - 2));
      x = 0.75 * s;
      y = x;
      w = -0.4375 * s * s;
    }
    iteration += 1;
    francis(h, n, first, last, x, y, w);
  }
  return n;
}

function activeStart(h: usize, n: i32, last: i32, norm: f64): i32 {
  for (let l = last; l >= 1; l -= 1) {
    let size = Math.abs(at(h, (l - 1) * n + l - 1)) + Math.abs(at(h, l * n + l));
    if (size === 0) size = norm;
    if (Math.abs(at(h, l * n + l - 1)) <= f64.EPSILON * size) {
      put(h, l * n + l - 1, 0);
      return l;
    }
  }
  return 0;
}

function pair(x: f64, y: f64, w: f64, shift: f64, last: i32, re: usize, im: usize): void {
  const p = 0.5 * (y - x);
  const q = p * p + w;
  const root = Math.sqrt(Math.abs(q));
  if (q < 0) {
    put(re, last - 1, x + shift + p);
    put(re, last, x + shift + p);
    put(im, last - 1, root);
    put(im, last, -root);
    return;
  }
  const z = p + (p < 0 ? -root : root);
  put(re, last - 1, x + shift + z);
  put(re, last, z === 0 ? x + shift + z : x + shift - w / z);
  put(im, last - 1, 0);
  put(im, last, 0);
}

function francis(h: usize, n: i32, first: i32, last: i32, shiftX: f64, shiftY: f64, w: f64): void {
  let p: f64 = 0;
  let q: f64 = 0;
  let r: f64 = 0;
  let m = last - 2;
  for (; m >= first; m -= 1) {
    const z = at(h, m * n + m);
    const dx = shiftX - z;
    const dy = shiftY - z;
    p = (dx * dy - w) / at(h, (m + 1) * n + m) + at(h, m * n + m + 1);
    q = at(h, (m + 1) * n + m + 1) - z - dx - dy;
    r = at(h, (m + 2) * n + m + 1);
    const size = Math.abs(p) + Math.abs(q) + Math.abs(r);
    if (size > 0) {
      p /= size;
      q /= size;
      r /= size;
    }
    if (m === first) break;
    const u = Math.abs(at(h, m * n + m - 1)) * (Math.abs(q) + Math.abs(r));
    const v =
      Math.abs(p) *
      (Math.abs(at(h, (m - 1) * n + m - 1)) + Math.abs(z) + Math.abs(at(h, (m + 1) * n + m + 1)));
    if (u <= f64.EPSILON * v) break;
  }
  for (let i = m + 2; i <= last; i += 1) {
    put(h, i * n + i - 2, 0);
    if (i > m + 2) put(h, i * n + i - 3, 0);
  }
  for (let k = m; k < last; k += 1) {
    const inner = k < last - 1;
    let scale: f64 = 1;
    if (k > m) {
      p = at(h, k * n + k - 1);
      q = at(h, (k + 1) * n + k - 1);
      r = inner ? at(h, (k + 2) * n + k - 1) : 0;
      scale = Math.abs(p) + Math.abs(q) + Math.abs(r);
      if (scale === 0) continue;
      p /= scale;
      q /= scale;
      r /= scale;
    }
    const length = Math.sqrt(p * p + q * q + r * r);
    if (length === 0) continue;
    const s = p < 0 ? -length : length;
    if (k > m) put(h, k * n + k - 1, -s * scale);
    else if (first !== m) put(h, k * n + k - 1, -at(h, k * n + k - 1));
    p += s;
    const x = p / s;
    const y = q / s;
    const z = r / s;
    q /= p;
    r /= p;
    sweepRows(h, n, k, last, inner, q, r, x, y, z);
    sweepColumns(h, n, k, first, inner ? (k + 3 < last ? k + 3 : last) : last, inner, q, r, x, y, z);
  }
}

function sweepRows(
  h: usize,
  n: i32,
  k: i32,
  last: i32,
  inner: boolean,
  q: f64,
  r: f64,
  x: f64,
  y: f64,
  z: f64,
): void {
  const bytes = (<usize>n) << 3;
  let a = h + ((<usize>(k * n + k)) << 3);
  const end = h + ((<usize>(k * n + last)) << 3);
  if (inner)
    for (; a <= end; a += 8) {
      const b = a + bytes;
      const c = b + bytes;
      const sum = load<f64>(a) + q * load<f64>(b) + r * load<f64>(c);
      store<f64>(c, load<f64>(c) - sum * z);
      store<f64>(b, load<f64>(b) - sum * y);
      store<f64>(a, load<f64>(a) - sum * x);
    }
  else
    for (; a <= end; a += 8) {
      const b = a + bytes;
      const sum = load<f64>(a) + q * load<f64>(b);
      store<f64>(b, load<f64>(b) - sum * y);
      store<f64>(a, load<f64>(a) - sum * x);
    }
}

function sweepColumns(
  h: usize,
  n: i32,
  k: i32,
  first: i32,
  end: i32,
  inner: boolean,
  q: f64,
  r: f64,
  x: f64,
  y: f64,
  z: f64,
): void {
  const bytes = (<usize>n) << 3;
  let a = h + ((<usize>(first * n + k)) << 3);
  for (let i = first; i <= end; i += 1, a += bytes) {
    let sum = x * load<f64>(a) + y * load<f64>(a, 8);
    if (inner) {
      sum += z * load<f64>(a, 16);
      store<f64>(a, load<f64>(a, 16) - sum * r, 16);
    }
    store<f64>(a, load<f64>(a, 8) - sum * q, 8);
    store<f64>(a, load<f64>(a) - sum);
  }
}
