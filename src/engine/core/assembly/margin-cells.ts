import { eigenvalues } from './eigenvalues';
import { at, copy, put } from './memory';
import { jacobian, prepare, rhs } from './model';

/**
 * Cells of a stability map: in each, two parameters are set, Newton's method goes from a state to an equilibrium, and
 * the margin is minus the largest real part of the eigenvalues there. As `maps/margin-cells.ts`, constant for
 * constant.
 */

const MAXIMUM_ITERATIONS = 12;
const LAST: f64 = 1e-11;
const NEAR_LAST: f64 = 1e-6;
const FLOOR: f64 = 1e-9;

/**
 * @param slotX, slotY addresses of the two parameters, as the model's module reads them
 * @param states count*n, moved to the equilibria. @param margins count, NaN where Newton's method fails
 * @param work u, f, re, im (n each), J, LU (n*n each), 2n
 */
export function marginCells(
  n: i32,
  count: i32,
  x: usize,
  y: usize,
  slotX: usize,
  slotY: usize,
  states: usize,
  margins: usize,
  work: usize,
): void {
  const bytes = (<usize>n) << 3;
  const u = work;
  const f = u + bytes;
  const re = f + bytes;
  const im = re + bytes;
  const J = im + bytes;
  const lu = J + <usize>n * bytes;
  const spare = lu + <usize>n * bytes;
  for (let k = 0; k < count; k += 1) {
    store<f64>(slotX, at(x, k));
    store<f64>(slotY, at(y, k));
    prepare();
    copy(u, states + <usize>k * bytes, n);
    put(margins, k, NaN);
    if (!settle(n, u, f, J, lu)) continue;
    if (!isFiniteMatrix(J, n * n)) continue;
    copy(lu, J, n * n);
    if (eigenvalues(n, lu, re, im, spare) !== n) continue;
    let leading = at(re, 0);
    for (let i = 1; i < n; i += 1) leading = Math.max(leading, at(re, i));
    copy(states + <usize>k * bytes, u, n);
    put(margins, k, -leading);
  }
}

function isFiniteMatrix(a: usize, entries: i32): boolean {
  for (let e = 0; e < entries; e += 1) if (!isFinite(at(a, e))) return false;
  return true;
}

/** Brings u to an equilibrium and leaves its Jacobian in J; false where that fails. */
function settle(n: i32, u: usize, f: usize, J: usize, lu: usize): boolean {
  for (let iteration = 0; iteration < MAXIMUM_ITERATIONS; iteration += 1) {
    rhs(0, u, f);
    jacobian(0, u, J);
    copy(lu, J, n * n);
    if (!solve(n, lu, f)) return false;
    let size: f64 = 0;
    for (let i = 0; i < n; i += 1) size = Math.max(size, Math.abs(at(u, i)));
    let length: f64 = 0;
    for (let i = 0; i < n; i += 1) {
      const own = Math.max(Math.abs(at(u, i)), FLOOR * size);
      const move = Math.abs(at(f, i)) / own;
      if (!(move <= length)) length = move;
      put(u, i, at(u, i) - at(f, i));
    }
    if (!isFinite(length)) return false;
    if (length <= LAST) return true;
    if (length > NEAR_LAST) continue;
    jacobian(0, u, J);
    return true;
  }
  return false;
}

/** Gaussian elimination with partial pivoting, A and b in place; false where A is singular or not finite. */
function solve(n: i32, a: usize, b: usize): boolean {
  for (let k = 0; k < n; k += 1) {
    let row = k;
    let largest = Math.abs(at(a, k * n + k));
    for (let i = k + 1; i < n; i += 1) {
      const value = Math.abs(at(a, i * n + k));
      if (value > largest) {
        largest = value;
        row = i;
      }
    }
    if (!(largest > 0) || !isFinite(largest)) return false;
    if (row !== k) {
      for (let j = k; j < n; j += 1) {
        const kept = at(a, k * n + j);
        put(a, k * n + j, at(a, row * n + j));
        put(a, row * n + j, kept);
      }
      const kept = at(b, k);
      put(b, k, at(b, row));
      put(b, row, kept);
    }
    const pivot = at(a, k * n + k);
    for (let i = k + 1; i < n; i += 1) {
      const factor = at(a, i * n + k) / pivot;
      if (factor === 0) continue;
      for (let j = k + 1; j < n; j += 1) put(a, i * n + j, at(a, i * n + j) - factor * at(a, k * n + j));
      put(b, i, at(b, i) - factor * at(b, k));
    }
  }
  for (let i = n - 1; i >= 0; i -= 1) {
    let sum = at(b, i);
    for (let j = i + 1; j < n; j += 1) sum -= at(a, i * n + j) * at(b, j);
    put(b, i, sum / at(a, i * n + i));
  }
  return true;
}
