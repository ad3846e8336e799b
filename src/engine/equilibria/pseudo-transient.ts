import { solveDense } from './linear-steps';
import type { NewtonProblem } from './newton';

/**
 * Pseudo-transient continuation: implicit Euler steps of growing length,
 *
 *     (I/h - J) d = s f,  u <- u + d,
 *
 * forwards in time (s = 1, near attractors) or backwards (s = -1, near repellers), so that the end of a
 * trajectory becomes a start for Newton's method without following it accurately.
 * Source: Kelley & Keyes, SIAM J. Numer. Anal. 35 (1998) 508. Returns null where it leaves the finite
 * numbers or, for states that must not be negative, cannot keep them so.
 */
export const PSEUDO_TRANSIENT_DEFAULTS = { steps: 40, growth: 1.6, firstShare: 0.1 } as const;

export function pseudoTransient(
  problem: NewtonProblem,
  start: Float64Array,
  nonnegative: readonly boolean[],
  direction: 1 | -1,
): Float64Array | null {
  const m = problem.dimension;
  const u = Float64Array.from(start);
  const next = new Float64Array(m);
  const f = new Float64Array(m);
  const J = new Float64Array(m * m);
  const A = new Float64Array(m * m);
  const right = new Float64Array(m);
  let h = 0;
  for (let k = 0; k < PSEUDO_TRANSIENT_DEFAULTS.steps; k += 1) {
    problem.residual(u, f);
    problem.jacobian(u, J);
    if (h === 0) h = PSEUDO_TRANSIENT_DEFAULTS.firstShare / Math.max(rowSum(J, m), Number.MIN_VALUE);
    let moved = false;
    for (let attempt = 0; attempt < 12 && !moved; attempt += 1) {
      if (attempt > 0) h /= 4;
      for (let i = 0; i < m; i += 1) {
        right[i] = direction * f[i];
        for (let j = 0; j < m; j += 1) A[i * m + j] = -direction * J[i * m + j] + (i === j ? 1 / h : 0);
      }
      const d = solveDense(A, right, m);
      if (d === null) continue;
      moved = true;
      for (let i = 0; i < m; i += 1) {
        next[i] = u[i] + d[i];
        if (!Number.isFinite(next[i]) || (nonnegative[i] && next[i] < 0)) moved = false;
      }
    }
    if (!moved) return null;
    u.set(next);
    h *= PSEUDO_TRANSIENT_DEFAULTS.growth;
  }
  return u;
}

function rowSum(J: Float64Array, m: number): number {
  let largest = 0;
  for (let i = 0; i < m; i += 1) {
    let sum = 0;
    for (let j = 0; j < m; j += 1) sum += Math.abs(J[i * m + j]);
    if (sum > largest) largest = sum;
  }
  return largest;
}
