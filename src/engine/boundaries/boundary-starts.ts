import type { SpecialPoint } from '../continuation/contract';
import { SweepScope } from '../continuation/sweep-scope';
import { BoundaryCurve } from './boundary-curve';
import { BoundaryMonitor, type BoundaryPoint } from './boundary-monitor';
import type { BoundaryScope } from './boundary-scope';
import { BranchPointSystem } from './branch-point-system';
import type { BoundaryKind, BoundaryStart } from './contract';
import type { DefiningSystem } from './defining-system';
import { HopfSystem } from './hopf-system';
import { NullitySystem } from './nullity-system';

export interface PreparedStart {
  readonly curve: BoundaryCurve;
  readonly monitor: BoundaryMonitor;
  readonly point: BoundaryPoint;
}

/** A special point of a sweep over the first parameter, at the present value of the second; null where it has no curve. */
export function startOf(special: SpecialPoint, second: number): BoundaryStart | null {
  const kind = BOUNDARY_KIND[special.kind];
  if (kind === undefined) return null;
  return {
    kind,
    first: special.parameter,
    second,
    state: special.state,
    omega: special.hopf?.omega ?? null,
    specialPoint: special.id,
  };
}

const BOUNDARY_KIND: Readonly<Partial<Record<SpecialPoint['kind'], BoundaryKind>>> = {
  fold: 'fold',
  Hopf: 'Hopf',
  transcritical: 'transcritical',
  pitchfork: 'pitchfork',
};

/**
 * The defining system of a start, with the start corrected onto its curve and its tangent; null where it
 * cannot be corrected.
 */
export function prepareStart(scope: BoundaryScope, start: BoundaryStart): PreparedStart | null {
  const made = definingSystem(scope, start);
  if (made === null) return null;
  const { system, x } = made;
  const curve = new BoundaryCurve(system);
  const monitor = new BoundaryMonitor(start.kind, system);
  // The start lies on the curve but for rounding: either parameter may be held.
  for (const held of [system.size - 1, system.size - 2]) {
    const across = new Float64Array(system.size);
    across[held] = 1;
    const trial = x.slice();
    if (curve.correct(trial, across, trial[held]) < 0) continue;
    const tangent = new Float64Array(system.size);
    if (!curve.firstTangent(trial, tangent)) continue;
    const point = monitor.read(trial, tangent, null);
    if (point) return { curve, monitor, point };
  }
  return null;
}

function definingSystem(
  scope: BoundaryScope,
  { kind, first, second, state, omega }: BoundaryStart,
): { readonly system: DefiningSystem; readonly x: Float64Array } | null {
  const faces = new SweepScope(
    scope.system,
    scope.system.defaults,
    scope.firstIndex,
    { from: scope.firstRange[0], to: scope.firstRange[1] },
    scope.stateScale,
    '',
  );
  const active = faces.activeOf(state);
  if (kind === 'fold') {
    const system = new NullitySystem(scope, active, active);
    const x = system.pack(state, first, second);
    return x && { system, x };
  }
  if (kind === 'Hopf') {
    const system = new HopfSystem(scope, active, omega ?? rateAt(scope, state, first, second));
    const x = system.pack(state, first, second, omega ?? 0);
    return x && { system, x };
  }
  const group = kind === 'transcritical' ? marginalGroup(scope, faces, active, state, first, second) : null;
  if (group !== null) {
    const system = new NullitySystem(scope, active, group);
    const x = system.pack(state, first, second);
    return x && { system, x };
  }
  const system = new BranchPointSystem(scope, active);
  const x = system.pack(state, first, second);
  return x && { system, x };
}

/** The absent population whose growth from low density is zero there; null where none is. */
function marginalGroup(
  scope: BoundaryScope,
  faces: SweepScope,
  active: readonly number[],
  state: Float64Array,
  first: number,
  second: number,
): readonly number[] | null {
  if (!scope.load(first, second, state)) return null;
  let best: readonly number[] | null = null;
  let least = MARGINAL;
  for (const { states } of faces.groupsAbsent(active)) {
    const system = new NullitySystem(scope, active, states);
    if (system.pack(state, first, second) === null) continue;
    const size = system.singularity();
    if (size < least) [best, least] = [states, size];
  }
  return best;
}

/** Relative size of the smallest singular value below which a block counts as singular. */
const MARGINAL = 1e-4;

/** A rate of the model at a state, where a pair of eigenvalues gives none. */
function rateAt(scope: BoundaryScope, state: Float64Array, first: number, second: number): number {
  if (!scope.load(first, second, state)) return 1;
  return scope.J.reduce((most, value) => Math.max(most, Math.abs(value)), 0) || 1;
}
