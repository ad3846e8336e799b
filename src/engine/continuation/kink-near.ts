import type { CompiledSystem } from '../system/contract';

export const KINK_DEFAULTS = {
  /** Distance looked at, as a share of the scale of each state. */
  radius: 1e-3,
  /** Share by which the change of the Jacobian may miss its linear part where the model is smooth. */
  tolerance: 0.05,
  /** Changes below this share of the Jacobian itself are rounding. */
  noise: 1e-9,
} as const;

/**
 * Whether the Jacobian jumps within a small distance of u: along each present state, and along the sum of
 * all, (J(u + v) - J(u - v)) v is compared with 2 D2 f(v, v), which it equals up to fourth order in v where
 * f is smooth. Own derivation, by Taylor's formula.
 *
 * @param u full state; parameters are those set on the system
 * @param active states that are present
 * @param scale typical size of each state
 */
export function kinkNear(
  system: CompiledSystem,
  u: Float64Array,
  active: readonly number[],
  scale: Float64Array,
): boolean {
  if (system.smooth) return false;
  const n = system.dimension;
  const v = new Float64Array(n);
  for (let k = 0; k <= active.length; k += 1) {
    v.fill(0);
    active.forEach((i, a) => {
      if (k === active.length || k === a) v[i] = KINK_DEFAULTS.radius * scale[i];
    });
    if (jumpsAlong(system, u, v)) return true;
  }
  return false;
}

function jumpsAlong(system: CompiledSystem, u: Float64Array, v: Float64Array): boolean {
  const n = system.dimension;
  const ahead = new Float64Array(n * n);
  const behind = new Float64Array(n * n);
  const jet = new Float64Array(3 * n);
  const at = (sign: number): Float64Array => u.map((value, i) => value + sign * v[i]);
  system.jacobian(0, at(1), ahead);
  system.jacobian(0, at(-1), behind);
  system.directional(0, u, v, jet);
  let miss = 0;
  let change = 0;
  let size = 0;
  for (let i = 0; i < n; i += 1) {
    let difference = 0;
    let total = 0;
    for (let j = 0; j < n; j += 1) {
      difference += (ahead[i * n + j] - behind[i * n + j]) * v[j];
      total += Math.abs(ahead[i * n + j] * v[j]) + Math.abs(behind[i * n + j] * v[j]);
    }
    miss = Math.max(miss, Math.abs(difference - 2 * jet[n + i]));
    change = Math.max(change, Math.abs(difference), Math.abs(2 * jet[n + i]));
    size = Math.max(size, total);
  }
  // Not finite counts as a kink as well.
  return !(miss <= KINK_DEFAULTS.tolerance * change + KINK_DEFAULTS.noise * size);
}
