import { createEigenWorkspace, eigenvaluesInto } from '../linalg/eigenvalues';
import { luFactor, luSolve } from '../linalg/lu';
import type { CompiledSystem } from '../system/contract';

export const REST_DEFAULTS = {
  iterations: 8,
  /** A state counts as arrived where it is this near to an attracting equilibrium, relative to each state. */
  near: 1e-2,
  /** States below this share of the size of the solution are measured against it. */
  nearFloor: 1e-3,
  /** States below this share of it count as absent where they decline. */
  floor: 1e-9,
  converged: 1e-10,
  /** Real parts above minus this share of the size of the Jacobian are not told from zero. */
  resolved: 1e-9,
} as const;

/**
 * Whether a state has come to rest: Newton's method goes from it to an equilibrium next to it at which every
 * eigenvalue has a negative real part, those of absent populations included, so that a slow passage by a
 * saddle is not taken for rest. States that are tiny and decline are set to zero first.
 *
 * @param size largest value that the solution has had, against which small states are measured
 * @returns the equilibrium, or null. Nothing is claimed where f or J is not finite there.
 */
export function restingAt(
  system: CompiledSystem,
  t: number,
  state: Float64Array,
  size: number,
): Float64Array | null {
  const n = system.dimension;
  const u = state.slice(0, n);
  const f = new Float64Array(n);
  const J = new Float64Array(n * n);
  const lu = new Float64Array(n * n);
  const pivots = new Int32Array(n);
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
      if (
        !(
          Math.abs(u[i] - state[i]) <=
          REST_DEFAULTS.near * Math.max(Math.abs(u[i]), REST_DEFAULTS.nearFloor * size)
        )
      )
        return null;
    }
  }
  if (!(length <= REST_DEFAULTS.converged)) return null;
  if (u.some((x, i) => system.nonnegative[i] && x < -least * REST_DEFAULTS.near)) return null;
  system.jacobian(t, u, J);
  const { leading, size: rate } = leadingOf(J, n);
  if (!(leading < -REST_DEFAULTS.resolved * rate)) return null;
  return u.map((x, i) => (system.nonnegative[i] ? Math.max(x, 0) : x));
}

/** Whether an eigenvalue of the Jacobian at a state has a positive real part. */
export function repelsAt(system: CompiledSystem, t: number, state: Float64Array): boolean {
  const { leading, size } = leadingAt(system, t, state);
  return leading > REST_DEFAULTS.resolved * size;
}

/** Largest real part of the eigenvalues of the Jacobian at a state; NaN where they cannot be found. */
export function leadingRate(system: CompiledSystem, t: number, state: Float64Array): number {
  return leadingAt(system, t, state).leading;
}

function leadingAt(
  system: CompiledSystem,
  t: number,
  state: Float64Array,
): { leading: number; size: number } {
  const n = system.dimension;
  const J = new Float64Array(n * n);
  system.jacobian(t, state, J);
  return leadingOf(J, n);
}

/** Largest real part of the eigenvalues, NaN where they could not be found, and the size of the matrix. */
function leadingOf(J: Float64Array, n: number): { leading: number; size: number } {
  const re = new Float64Array(n);
  eigenvaluesInto(J, createEigenWorkspace(n), re, new Float64Array(n));
  let size = 0;
  for (const entry of J) size = Math.max(size, Math.abs(entry));
  return { leading: re[0], size };
}
