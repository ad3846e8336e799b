import { createEigenWorkspace, eigenvaluesInto } from '../linalg/eigenvalues';
import { luFactor, luSolve } from '../linalg/lu';
import type { CompiledSystem } from '../system/contract';

export const REST_DEFAULTS = {
  iterations: 8,
  /** A state counts as arrived where it is this near to an attracting equilibrium, relative to each state. */
  near: 1e-3,
  /** States below this share of the largest are measured against it, and count as absent where they decline. */
  floor: 1e-6,
  converged: 1e-10,
  /** Real parts above minus this share of the size of the Jacobian are not told from zero. */
  resolved: 1e-9,
} as const;

/**
 * Whether a state has come to rest: Newton's method goes from it to an equilibrium next to it at which every
 * eigenvalue has a negative real part, those of absent populations included, so that a slow passage by a
 * saddle is not taken for rest. States that are tiny and decline are set to zero first.
 *
 * @returns the equilibrium, or null. Nothing is claimed where f or J is not finite there.
 */
export function restingAt(system: CompiledSystem, t: number, state: Float64Array): Float64Array | null {
  const n = system.dimension;
  const u = state.slice(0, n);
  const f = new Float64Array(n);
  const J = new Float64Array(n * n);
  const lu = new Float64Array(n * n);
  const pivots = new Int32Array(n);
  let size = 0;
  for (let i = 0; i < n; i += 1) size = Math.max(size, Math.abs(u[i]));
  const least = REST_DEFAULTS.floor * size;
  system.rhs(t, u, f);
  for (let i = 0; i < n; i += 1) if (system.nonnegative[i] && u[i] < least && f[i] <= 0) u[i] = 0;
  let length = Infinity;
  for (let k = 0; k < REST_DEFAULTS.iterations && length > REST_DEFAULTS.converged; k += 1) {
    system.rhs(t, u, f);
    system.jacobian(t, u, J);
    lu.set(J);
    if (luFactor(lu, n, pivots) === 0) return null;
    luSolve(lu, n, pivots, f);
    length = 0;
    for (let i = 0; i < n; i += 1) {
      u[i] -= f[i];
      length = Math.max(length, Math.abs(f[i]) / Math.max(Math.abs(u[i]), least));
      if (!(Math.abs(u[i] - state[i]) <= REST_DEFAULTS.near * Math.max(Math.abs(u[i]), least))) return null;
    }
  }
  if (!(length <= REST_DEFAULTS.converged)) return null;
  if (u.some((x, i) => system.nonnegative[i] && x < -least * REST_DEFAULTS.near)) return null;
  system.jacobian(t, u, J);
  return allNegative(J, n) ? u.map((x, i) => (system.nonnegative[i] ? Math.max(x, 0) : x)) : null;
}

function allNegative(J: Float64Array, n: number): boolean {
  const re = new Float64Array(n);
  const found = eigenvaluesInto(J, createEigenWorkspace(n), re, new Float64Array(n));
  let size = 0;
  for (const entry of J) size = Math.max(size, Math.abs(entry));
  return found && re[0] < -REST_DEFAULTS.resolved * size;
}
