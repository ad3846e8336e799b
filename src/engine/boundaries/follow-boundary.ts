import type { BoundaryCurve } from './boundary-curve';
import type { BoundaryMonitor, BoundaryPoint } from './boundary-monitor';
import { BranchPointSystem } from './branch-point-system';
import type { BoundaryEnd } from './contract';
import {
  boundaryPointAlong,
  crossingTests,
  locateBoundaryPoint,
  type BoundaryCrossing,
} from './locate-boundary-point';

/** Steps are in scaled arclength: 1 is the range of a parameter, or the scale of a state. */
export const BOUNDARY_STEP_DEFAULTS = {
  first: 2e-3,
  smallest: 1e-8,
  largest: 0.03,
  grow: 1.4,
  shrink: 0.5,
  /** Least cosine between tangents of neighbouring points. */
  bend: 0.97,
  /** A curve is left where a state passes this many times its scale. */
  far: 50,
  /** Size of the dummy unknown from which on a crossing of branches does not persist. */
  dummy: 1e-7,
} as const;

export interface BoundaryFollowed {
  readonly points: BoundaryPoint[];
  readonly crossings: BoundaryCrossing[];
  end: { reason: BoundaryEnd; message: string };
}

/**
 * Follows a boundary in the direction of its first tangent by pseudo-arclength continuation (Keller 1977, from
 * memory) and locates the special points on it. A generator that yields the number of points so far.
 */
export function* followBoundary(
  curve: BoundaryCurve,
  monitor: BoundaryMonitor,
  start: BoundaryPoint,
  budget: number,
): Generator<number, BoundaryFollowed> {
  const { scope, active } = monitor.system;
  const followed: BoundaryFollowed = {
    points: [start],
    crossings: [],
    end: { reason: 'point budget spent', message: 'The point budget was spent.' },
  };
  const finish = (reason: BoundaryEnd, message: string): BoundaryFollowed => {
    followed.end = { reason, message };
    return followed;
  };
  let current = start;
  let h: number = BOUNDARY_STEP_DEFAULTS.first;
  while (followed.points.length < budget) {
    const next = boundaryPointAlong(curve, monitor, current, h);
    const bend = next ? dot(current.tangent, next.tangent) : -1;
    if (next === null || (bend < BOUNDARY_STEP_DEFAULTS.bend && h > 10 * BOUNDARY_STEP_DEFAULTS.smallest)) {
      h *= BOUNDARY_STEP_DEFAULTS.shrink;
      if (h >= BOUNDARY_STEP_DEFAULTS.smallest) continue;
      return finish(
        'could not be resolved further',
        `The curve could not be resolved further near ${at(current)}; the model may be singular or have a kink there.`,
      );
    }
    const index = followed.points.length - 1;
    for (const test of crossingTests(monitor.kind, current, next)) {
      const located = locateBoundaryPoint(curve, monitor, current, next, h, test);
      if (located && scope.isInside(located.point.first, located.point.second))
        followed.crossings.push({ kind: test.kind, ...located, index });
    }
    const bogdanov = followed.crossings.find(
      (one) => one.index === index && one.kind === 'Bogdanov-Takens' && monitor.kind === 'Hopf',
    );
    const real = monitor.kind === 'Hopf' && next.kappa < 0;
    if (real && !bogdanov)
      return finish(
        'ended at a Bogdanov-Takens point',
        `Begins at the Bogdanov-Takens point at ${at(current)}: on this side the two eigenvalues are real.`,
      );
    if (bogdanov) {
      followed.points.push(bogdanov.point);
      return finish(
        'ended at a Bogdanov-Takens point',
        `Ends at the Bogdanov-Takens point at ${at(bogdanov.point)}: beyond it the two eigenvalues are real.`,
      );
    }
    if (!scope.isInside(next.first, next.second, 0)) {
      const last = atRangeEnd(curve, monitor, current, next, h);
      if (last) followed.points.push(last);
      return finish('left the range', `The end of the range was reached at ${at(last ?? next)}.`);
    }
    if (monitor.system instanceof BranchPointSystem) {
      const dummy = Math.abs(monitor.system.dummyOf(next.x));
      if (dummy > BOUNDARY_STEP_DEFAULTS.dummy)
        return finish(
          'does not persist',
          `The crossing of branches does not persist when the second parameter moves: near ${at(current)} it opens into folds.`,
        );
    }
    followed.points.push(next);
    const gone = active.find((i) => scope.system.nonnegative[i] && next.u[i] < 0);
    if (gone !== undefined)
      return finish(
        'left the state box',
        `${scope.system.stateSymbols[gone]} reaches zero at ${at(next)}; beyond it the density would be negative.`,
      );
    if (active.some((i) => Math.abs(next.u[i]) > BOUNDARY_STEP_DEFAULTS.far * scope.stateScale[i]))
      return finish('left the state box', `The state grew beyond those looked at near ${at(next)}.`);
    if (followed.points.length > 10 && isBack(start, next, h))
      return finish('closed on itself', 'The curve closed on itself.');
    if (bend > 0.995) h = Math.min(h * BOUNDARY_STEP_DEFAULTS.grow, BOUNDARY_STEP_DEFAULTS.largest);
    monitor.system.refer(next.x);
    current = next;
    yield followed.points.length;
  }
  return followed;
}

/** The point at which the curve leaves the ranges, by bisection along the step. */
function atRangeEnd(
  curve: BoundaryCurve,
  monitor: BoundaryMonitor,
  from: BoundaryPoint,
  to: BoundaryPoint,
  h: number,
): BoundaryPoint | null {
  const { scope } = monitor.system;
  const excess = ({ first, second }: BoundaryPoint): number =>
    Math.max(
      beyond(first, scope.firstRange) / scope.firstScale,
      beyond(second, scope.secondRange) / scope.secondScale,
    );
  let [low, high] = [0, h];
  let [fLow, fHigh] = [excess(from), excess(to)];
  let best: BoundaryPoint | null = null;
  let side = 0;
  for (let k = 0; k < 60 && high - low > 1e-13; k += 1) {
    const secant = (low * fHigh - high * fLow) / (fHigh - fLow);
    const s = k % 4 === 3 || !(secant > low && secant < high) ? (low + high) / 2 : secant;
    const point = boundaryPointAlong(curve, monitor, from, s);
    if (point === null) return best;
    best = point;
    const f = excess(point);
    if (Math.abs(f) < 1e-13) break;
    // Halving the value kept twice (Illinois) keeps a corner of the ranges from stalling it.
    if (f < 0) {
      [low, fLow] = [s, f];
      if (side === 1) fHigh /= 2;
      side = 1;
    } else {
      [high, fHigh] = [s, f];
      if (side === -1) fLow /= 2;
      side = -1;
    }
  }
  return best;
}

/** How far a value lies beyond the nearer end of a range; negative inside. */
function beyond(value: number, [a, b]: readonly [number, number]): number {
  return Math.max(Math.min(a, b) - value, value - Math.max(a, b));
}

function isBack(start: BoundaryPoint, point: BoundaryPoint, h: number): boolean {
  const away = Math.hypot(...point.x.map((value, j) => value - start.x[j]));
  return away < 0.75 * h && dot(start.tangent, point.tangent) > 0.9;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < a.length; k += 1) sum += a[k] * b[k];
  return sum;
}

function at({ first, second }: BoundaryPoint): string {
  return `(${Number(first.toPrecision(6))}, ${Number(second.toPrecision(6))})`;
}
