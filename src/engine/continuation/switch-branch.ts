import { nullVector } from '../linalg/null-vector';
import type { Curve } from './curve';
import type { BranchPoint, Monitor } from './test-functions';

/** Distance of the first point on the other branch, in scaled units; tried shorter when it fails. */
export const SWITCH_DEFAULTS = { distance: 2e-3, shortest: 1e-6, shrink: 0.25, symmetry: 0.1 } as const;

export interface OtherBranch {
  readonly state: Float64Array;
  readonly parameter: number;
}

/**
 * Direction of the second branch through a simple branch point within a face: the null space of [F_w]
 * is spanned by the tangent of the branch at hand and one vector across it; returned is the latter.
 * Null where the null space is not two-dimensional.
 */
export function secondDirection(monitor: Monitor, at: BranchPoint): Float64Array | null {
  const { curve } = monitor;
  const { m } = curve;
  // [F_w; tangent'] is singular at a branch point; its null vector is the direction across.
  const square = curve.borderedMatrix(at.w, at.tangent);
  if (square === null) return null;
  const { vector } = nullVector(square, m + 1);
  let dot = 0;
  for (let k = 0; k <= m; k += 1) dot += vector[k] * at.tangent[k];
  let squared = 0;
  const across = vector.map((value, k) => value - dot * at.tangent[k]);
  for (let k = 0; k <= m; k += 1) squared += across[k] ** 2;
  const length = Math.sqrt(squared);
  return length > 1e-6 ? across.map((value) => value / length) : null;
}

/** A point of the other branch at distance s across the one at hand; null where none was found. */
export function stepAcross(
  curve: Curve,
  at: BranchPoint,
  across: Float64Array,
  sign: 1 | -1,
): Float64Array | null {
  for (let s: number = SWITCH_DEFAULTS.distance; s >= SWITCH_DEFAULTS.shortest; s *= SWITCH_DEFAULTS.shrink) {
    const w = at.w.map((value, k) => value + sign * s * across[k]);
    let target = 0;
    for (let k = 0; k < w.length; k += 1) target += across[k] * w[k];
    const used = curve.correct(w, across, target, 20);
    if (used > 0 && distance(w, at.w) < 20 * s) return w;
  }
  return null;
}

function distance(a: Float64Array, b: Float64Array): number {
  let squared = 0;
  for (let k = 0; k < a.length; k += 1) squared += (a[k] - b[k]) ** 2;
  return Math.sqrt(squared);
}

/**
 * Told from two points of the other branch on either side: a pitchfork has both on the same side of the
 * parameter, at a distance of second order; a transcritical has one on each.
 */
export function isPitchfork(at: Float64Array, plus: Float64Array, minus: Float64Array): boolean {
  const last = at.length - 1;
  const p = plus[last] - at[last];
  const q = minus[last] - at[last];
  return Math.abs(p - q) <= SWITCH_DEFAULTS.symmetry * (Math.abs(p) + Math.abs(q)) || p * q > 0;
}

/**
 * First point of the branch on which an absent population is present, beside the point where its block of
 * the Jacobian is singular: the null vector of the block gives its composition, and a constraint on its own
 * states keeps the corrector off the branch without it.
 * Null where the null vector mixes signs, so that no feasible branch begins there, or no point was found.
 */
export function invadingBranch(
  wide: Curve,
  state: Float64Array,
  parameter: number,
  invaders: readonly number[],
  composition: Float64Array,
): Float64Array | null {
  const signs = composition.map(Math.sign).filter((sign) => sign !== 0);
  if (signs.length === 0 || signs.some((sign) => sign !== signs[0])) return null;
  const constraint = new Float64Array(wide.m + 1);
  for (let s: number = SWITCH_DEFAULTS.distance; s >= SWITCH_DEFAULTS.shortest; s *= SWITCH_DEFAULTS.shrink) {
    const w = wide.pointOf(state, parameter);
    constraint.fill(0);
    let size = 0;
    invaders.forEach((i, k) => (size = Math.max(size, Math.abs(composition[k]) / wide.stateScale[i])));
    let squared = 0;
    invaders.forEach((i, k) => {
      const slot = wide.active.indexOf(i);
      w[slot] = (s * Math.abs(composition[k])) / wide.stateScale[i] / size;
      constraint[slot] = w[slot];
      squared += w[slot] ** 2;
    });
    const length = Math.sqrt(squared);
    for (let k = 0; k <= wide.m; k += 1) constraint[k] /= length;
    const before = w.slice();
    if (wide.correct(w, constraint, length, 20) > 0 && distance(w, before) < 0.3) return w;
  }
  return null;
}
