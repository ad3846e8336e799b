import type { BoundaryScope } from './boundary-scope';

/**
 * The equations of one kind of special point in two parameters: residuals r(x) = 0 with one equation fewer
 * than unknowns, so that solutions form a curve. x holds the active states over their scales, then vectors
 * and numbers of the kind, and last the two parameters over their ranges.
 */
export interface DefiningSystem {
  readonly scope: BoundaryScope;
  /** States that are present. */
  readonly active: readonly number[];
  /** Unknowns; there are `size - 1` equations. */
  readonly size: number;
  /** r(x) into `out` (size - 1); false where something is not finite. */
  residual(x: Float64Array, out: Float64Array): boolean;
  /** Takes the point as the new reference of the normalisations, so that they stay well conditioned. */
  refer(x: Float64Array): void;
}

export function firstOf(system: DefiningSystem, x: Float64Array): number {
  return x[system.size - 2] * system.scope.firstScale;
}

export function secondOf(system: DefiningSystem, x: Float64Array): number {
  return x[system.size - 1] * system.scope.secondScale;
}

/** All n states at x into `out`; absent ones are exactly 0. */
export function stateOf({ active, scope }: DefiningSystem, x: Float64Array, out: Float64Array): void {
  out.fill(0);
  active.forEach((i, a) => (out[i] = x[a] * scope.stateScale[i]));
}

/** Loads x into the scope: parameters, state, f and Jacobian. */
export function loadPoint(system: DefiningSystem, x: Float64Array, buffer: Float64Array): boolean {
  stateOf(system, x, buffer);
  return system.scope.load(firstOf(system, x), secondOf(system, x), buffer);
}

/** Scaled part of x that all kinds share: active states first, parameters last; the rest is left at 0. */
export function packPoint(
  { active, size, scope }: Pick<DefiningSystem, 'active' | 'size' | 'scope'>,
  u: Float64Array,
  first: number,
  second: number,
): Float64Array {
  const x = new Float64Array(size);
  active.forEach((i, a) => (x[a] = u[i] / scope.stateScale[i]));
  x[size - 2] = first / scope.firstScale;
  x[size - 1] = second / scope.secondScale;
  return x;
}

/** The Jacobian between some states in scaled coordinates, J_ij S_j / S_i, into `out` (m*m). */
export function scaledBlock(scope: BoundaryScope, states: readonly number[], out: Float64Array): void {
  const { J, n, stateScale } = scope;
  const m = states.length;
  for (let a = 0; a < m; a += 1)
    for (let b = 0; b < m; b += 1)
      out[a * m + b] = (J[states[a] * n + states[b]] * stateScale[states[b]]) / stateScale[states[a]];
}
