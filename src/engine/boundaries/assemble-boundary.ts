import type { BoundaryMonitor, BoundaryPoint } from './boundary-monitor';
import { stableSide } from './boundary-side';
import type { BoundaryCurve as CurveResult, BoundarySpecialPoint, BoundaryStart } from './contract';
import { BOUNDARY_POINT_MEANING } from './describe-boundary';
import type { BoundaryFollowed } from './follow-boundary';

/** A curve followed in both directions, in order along its arc, as arrays. */
export function assembleBoundary(
  monitor: BoundaryMonitor,
  start: BoundaryStart,
  back: BoundaryFollowed | null,
  forth: BoundaryFollowed,
): CurveResult {
  const points = back ? [...back.points.slice(1).reverse(), ...forth.points] : forth.points;
  const { system, kind } = monitor;
  const { scope } = system;
  const K = points.length;
  const curve: CurveResult = {
    kind,
    dimension: scope.n,
    first: Float64Array.from(points, (one) => one.first),
    second: Float64Array.from(points, (one) => one.second),
    states: new Float64Array(K * scope.n),
    omega: Float64Array.from(points, (one) => Math.sqrt(Math.max(one.kappa, 0))),
    coefficient: Float64Array.from(points, (one) => coefficientOf(kind, one)),
    feasible: Uint8Array.from(points, (one) => (scope.isFeasible(one.u) ? 1 : 0)),
    matters: new Uint8Array(K),
    stableSide: new Float64Array(2 * K),
    start,
    startEnd: back ? back.end : forth.end,
    endEnd: forth.end,
  };
  points.forEach((point, k) => {
    curve.states.set(point.u, k * scope.n);
    const { matters, normal } = stableSide(system, kind, point);
    curve.matters[k] = matters ? 1 : 0;
    curve.stableSide.set(normal, 2 * k);
  });
  return curve;
}

function coefficientOf(kind: CurveResult['kind'], point: BoundaryPoint): number {
  if (kind === 'Hopf') return point.l1;
  return kind === 'fold' ? point.quadratic / point.overlap : NaN;
}

/** Special points of a curve followed in both directions, placed on it. */
export function assembleSpecialPoints(
  monitor: BoundaryMonitor,
  curve: number,
  back: BoundaryFollowed | null,
  forth: BoundaryFollowed,
  nextId: () => string,
): BoundarySpecialPoint[] {
  const backLength = back ? back.points.length - 1 : 0;
  const placed = [
    ...(back?.crossings ?? []).map((one) => ({ one, index: backLength - one.index - 1 })),
    ...forth.crossings.map((one) => ({ one, index: backLength + one.index })),
  ].sort((a, b) => a.index - b.index);
  return placed.map(({ one: { kind, point, bracket }, index }) => ({
    id: nextId(),
    kind,
    first: point.first,
    second: point.second,
    state: point.u,
    eigenvalues: point.eigenvalues,
    curve,
    index,
    accuracy: bracket,
    feasible: monitor.system.scope.isFeasible(point.u),
    meaning: BOUNDARY_POINT_MEANING[kind],
  }));
}
