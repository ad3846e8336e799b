import type { CompiledSystem } from '../system/contract';
import { lowDiscrepancyPoint } from './low-discrepancy';

/**
 * Whether the right-hand side has a derivative at u, asked of the function itself: one-sided
 * differences (f(u + h v) - f(u)) / h must tend to J v, so that their distance from J v falls with h.
 * A mating function of degree one (0/0 at the origin, or guarded there by a condition) keeps a distance
 * that does not fall, and so does a kink of min, max or abs.
 * States that must not be negative and are zero are moved upwards only.
 */
export const DIFFERENTIABILITY_DEFAULTS = {
  directions: 4,
  /** Steps relative to the scale of each state; the distance must fall by more than half between them. */
  steps: [1e-6, 1e-7],
  /** Distances below this share of |J v| count as none. */
  noise: 1e-3,
} as const;

export type Differentiability =
  { readonly differentiable: true } | { readonly differentiable: false; readonly reason: string };

/**
 * @param moved states moved by the test directions; the others stay
 * @param scale typical size of each state
 */
export function differentiabilityAt(
  system: CompiledSystem,
  u: Float64Array,
  moved: readonly number[],
  scale: Float64Array,
): Differentiability {
  const n = system.dimension;
  const f0 = new Float64Array(n);
  const J = new Float64Array(n * n);
  system.rhs(0, u, f0);
  system.jacobian(0, u, J);
  if (!f0.every(Number.isFinite))
    return { differentiable: false, reason: 'a rate is 0/0 or infinite exactly here' };
  if (!J.every(Number.isFinite)) return { differentiable: false, reason: 'a rate has no derivative here' };
  const direction = new Float64Array(n);
  const unit = new Float64Array(moved.length);
  const [coarse, fine] = DIFFERENTIABILITY_DEFAULTS.steps;
  for (let k = 0; k < DIFFERENTIABILITY_DEFAULTS.directions; k += 1) {
    lowDiscrepancyPoint(k, 2, unit);
    direction.fill(0);
    moved.forEach((i, a) => {
      const signed = u[i] === 0 && system.nonnegative[i] ? 0.1 + 0.9 * unit[a] : 2 * unit[a] - 1;
      direction[i] = signed * scale[i];
    });
    const far = gap(system, u, f0, J, direction, coarse);
    const near = gap(system, u, f0, J, direction, fine);
    if (near > DIFFERENTIABILITY_DEFAULTS.noise && !(near < far / 2))
      return {
        differentiable: false,
        reason: 'the change of the rates depends on the direction even at the smallest distances',
      };
  }
  return { differentiable: true };
}

/** Distance of the one-sided difference from J v, relative to their size. */
function gap(
  system: CompiledSystem,
  u: Float64Array,
  f0: Float64Array,
  J: Float64Array,
  v: Float64Array,
  h: number,
): number {
  const n = system.dimension;
  const moved = new Float64Array(n);
  const f = new Float64Array(n);
  for (let i = 0; i < n; i += 1) moved[i] = u[i] + h * v[i];
  system.rhs(0, moved, f);
  let distance = 0;
  let size = 0;
  for (let i = 0; i < n; i += 1) {
    let linear = 0;
    for (let j = 0; j < n; j += 1) linear += J[i * n + j] * v[j];
    const difference = (f[i] - f0[i]) / h;
    distance = Math.max(distance, Math.abs(difference - linear));
    size = Math.max(size, Math.abs(difference), Math.abs(linear));
  }
  if (size === 0) return 0;
  return Number.isFinite(distance) ? distance / size : Infinity;
}
