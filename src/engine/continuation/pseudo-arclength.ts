import type { BranchEnd } from './contract';
import type { Curve } from './curve';
import { closeCrossings } from './close-crossings';
import {
  crossingOfPair,
  crossingOfZero,
  crossingsBetween,
  realCrossings,
  UPRIGHT,
  type Crossing,
} from './crossings';
import { pointAlong } from './locate';
import type { BranchPoint, Monitor } from './test-functions';

/** Steps are in scaled arclength: 1 is the swept range, or the scale of a state. */
export const STEP_DEFAULTS = {
  first: 1e-3,
  smallest: 1e-8,
  largest: 0.02,
  grow: 1.4,
  shrink: 0.5,
  /** Least cosine between tangents of neighbouring points. */
  bend: 0.985,
  points: 4_000,
  /** Branches are left where a state passes this many times its scale. */
  far: 50,
  /** Points in a row at one value of the parameter after which a branch is a line of equilibria. */
  upright: 24,
} as const;

export interface Followed {
  readonly points: BranchPoint[];
  readonly crossings: Crossing[];
  end: { reason: BranchEnd; message: string };
}

export interface FollowSettings {
  readonly lower: number;
  readonly upper: number;
  readonly label: (state: number) => string;
  readonly largestStep: number;
  readonly pointBudget: number;
}

/**
 * Follows a branch from a point in one direction by pseudo-arclength continuation with tangent predictor,
 * bordered Newton corrector and step control by iterations and bend (Keller 1977, from memory).
 * A generator that yields the number of points so far after each accepted step.
 * Never fails silently: `end` holds the reason in words.
 */
export function* followBranch(
  monitor: Monitor,
  start: BranchPoint,
  settings: FollowSettings,
): Generator<number, Followed> {
  const { curve } = monitor;
  const followed: Followed = {
    points: [start],
    crossings: [],
    end: { reason: 'point budget spent', message: 'The point budget was spent.' },
  };
  let current = start;
  let decided: { point: BranchPoint; index: number } | null =
    start.monitors.undecided === 0 ? { point: start, index: 0 } : null;
  let upright = 0;
  let h: number = Math.min(STEP_DEFAULTS.first, settings.largestStep);

  while (followed.points.length < settings.pointBudget) {
    const next = pointAlong(monitor, current, h);
    const trouble = next === null ? 'not corrected' : tooCoarse(current, next, decided?.point ?? null, h);
    if (next === null || (trouble !== null && h > STEP_DEFAULTS.smallest * 10)) {
      h *= STEP_DEFAULTS.shrink;
      if (h >= STEP_DEFAULTS.smallest) continue;
      followed.end = {
        reason: 'could not be resolved further',
        message: `The branch could not be resolved further near ${format(current.parameter)}; the model may be singular or have a kink there.`,
      };
      return followed;
    }

    const index = followed.points.length - 1;
    const reached = crossingOfZero(monitor, current, next, h, index);
    // Past the end of the range it is none of this sweep's.
    const zero = reached && within(reached, settings) ? reached : null;
    const limit = zero?.located.point ?? next;
    const found = crossingsBetween(monitor, current, limit, index);
    // Where a population vanishes the determinant does too; several at once leave it to rounding.
    followed.crossings.push(...(zero ? found.filter((one) => one.kind !== 'branch') : found));
    const hopf = decided ? crossingOfPair(monitor, decided.point, limit, decided.index) : null;
    if (hopf === null && zero === null && found.length === 0) closeCrossings(monitor, followed, next);
    if (hopf) followed.crossings.push(hopf);
    if (zero) {
      followed.crossings.push(zero);
      followed.points.push(limit);
      followed.end = {
        reason: 'left the state box',
        message: `${settings.label(zero.which)} reaches zero at ${format(limit.parameter)}; beyond it the density would be negative.`,
      };
      return followed;
    }
    const outside = next.parameter < settings.lower || next.parameter > settings.upper;
    if (outside) {
      const bound = next.parameter < settings.lower ? settings.lower : settings.upper;
      const last = pointAtParameter(monitor, current, next, bound);
      followed.crossings.splice(
        0,
        followed.crossings.length,
        ...followed.crossings.filter((c) => within(c, settings)),
      );
      if (last) followed.points.push(last);
      followed.end = {
        reason: 'left the range',
        message: `The end of the range, ${format(bound)}, was reached.`,
      };
      return followed;
    }
    followed.points.push(next);
    if (next.monitors.undecided === 0) decided = { point: next, index: followed.points.length - 1 };
    // A stretch without decision is a neutral family, not a crossing: one such point may be chance.
    else if (current.monitors.undecided > 0) decided = null;
    upright = Math.abs(next.monitors.fold) < UPRIGHT ? upright + 1 : 0;
    if (upright >= STEP_DEFAULTS.upright) {
      followed.end = {
        reason: 'could not be resolved further',
        message: `At ${format(next.parameter)} a whole line of states rests; it was not followed further.`,
      };
      return followed;
    }
    const far = farState(curve, next);
    if (far >= 0) {
      followed.end = {
        reason: 'left the state box',
        message: `${settings.label(far)} grew beyond the states looked at.`,
      };
      return followed;
    }
    if (followed.points.length > 10 && isBackAt(start, next, h)) {
      followed.end = { reason: 'closed on itself', message: 'The branch closed on itself.' };
      return followed;
    }
    // Far beyond its scale a state is followed in steps of its own size.
    const largest = settings.largestStep * next.w.reduce((most, value) => Math.max(most, Math.abs(value)), 1);
    h = Math.min(largest, h * (bend(current, next) > 0.998 ? STEP_DEFAULTS.grow : 1));
    current = next;
    yield followed.points.length;
  }
  return followed;
}

function within(crossing: Crossing, settings: FollowSettings): boolean {
  const { parameter } = crossing.located.point;
  const slack = 1e-9 * (settings.upper - settings.lower);
  return parameter >= settings.lower - slack && parameter <= settings.upper + slack;
}

function bend(a: BranchPoint, b: BranchPoint): number {
  let dot = 0;
  for (let k = 0; k < a.tangent.length; k += 1) dot += a.tangent[k] * b.tangent[k];
  return dot;
}

/** Why a step is to be tried again shorter: a sharp bend, or more crossings than can be told apart. */
function tooCoarse(a: BranchPoint, b: BranchPoint, decided: BranchPoint | null, h: number): string | null {
  if (bend(a, b) < STEP_DEFAULTS.bend) return 'bend';
  let length = 0;
  for (let k = 0; k < a.w.length; k += 1) length += (b.w[k] - a.w[k]) ** 2;
  if (Math.sqrt(length) > 2 * h) return 'jump';
  const real = realCrossings(a, b);
  if (real > 1 && h > 1e-4) return 'several crossings';
  if (decided && b.monitors.undecided === 0) {
    const change = Math.abs(b.monitors.growing - decided.monitors.growing);
    if ((real === 1 ? change > 1 : change > 2) && h > 1e-5) return 'several crossings';
  }
  return null;
}

/** The point of the branch at a given value of the parameter, between or next to two points. */
export function pointAtParameter(
  monitor: Monitor,
  a: BranchPoint,
  b: BranchPoint,
  parameter: number,
): BranchPoint | null {
  const { curve } = monitor;
  const across = new Float64Array(curve.m + 1);
  across[curve.m] = 1;
  const share = (parameter - a.parameter) / (b.parameter - a.parameter);
  const w = a.w.map((value, k) => value + share * (b.w[k] - value));
  if (curve.correct(w, across, parameter / curve.parameterScale) < 0) return null;
  w[curve.m] = parameter / curve.parameterScale;
  const point = monitor.pointAt(w, a.tangent);
  return point && { ...point, parameter };
}

function farState(curve: Curve, point: BranchPoint): number {
  const slot = curve.active.findIndex((_, a) => Math.abs(point.w[a]) > STEP_DEFAULTS.far);
  return slot < 0 ? -1 : curve.active[slot];
}

function isBackAt(start: BranchPoint, point: BranchPoint, h: number): boolean {
  let squared = 0;
  for (let k = 0; k < start.w.length; k += 1) squared += (point.w[k] - start.w[k]) ** 2;
  return Math.sqrt(squared) < 0.75 * h && bend(start, point) > 0.9;
}

function format(value: number): string {
  return Number(value.toPrecision(6)).toString();
}
