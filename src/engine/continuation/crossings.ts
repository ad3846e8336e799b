import { locateZero, pointAlong, type Located } from './locate';
import type { BranchPoint, Monitor } from './test-functions';

export type CrossingKind = 'fold' | 'branch' | 'transversal' | 'Hopf' | 'zero';

/** A special point between two points of a branch, before its normal form is known. */
export interface Crossing {
  readonly kind: CrossingKind;
  /** Absent group that invades, for `transversal`; state that reaches zero, for `zero`. */
  readonly which: number;
  readonly located: Located;
  /** Index of the accepted point before it, from the start of this direction. */
  readonly index: number;
}

/** A tangent with a smaller share of the parameter stands upright. */
export const UPRIGHT = 1e-9;

function changes(a: number, b: number): boolean {
  return (a < 0 && b > 0) || (a > 0 && b < 0) || (a !== 0 && b === 0);
}

function foldBetween(a: BranchPoint, b: BranchPoint): boolean {
  const size = Math.max(Math.abs(a.monitors.fold), Math.abs(b.monitors.fold));
  return size > UPRIGHT && changes(a.monitors.fold, b.monitors.fold);
}

/** How many real eigenvalues pass zero between two points, as far as signs tell. */
export function realCrossings(a: BranchPoint, b: BranchPoint): number {
  let count = foldBetween(a, b) ? 1 : 0;
  if (changes(a.monitors.branch, b.monitors.branch)) count += 1;
  a.monitors.transversal.forEach((value, g) => {
    if (changes(value, b.monitors.transversal[g])) count += 1;
  });
  return count;
}

/** Folds, branch points and beginnings of invasion between two neighbouring points, located. */
export function crossingsBetween(
  monitor: Monitor,
  a: BranchPoint,
  b: BranchPoint,
  index: number,
): Crossing[] {
  const tests: { kind: CrossingKind; which: number; test: (point: BranchPoint) => number }[] = [
    { kind: 'fold', which: -1, test: (point) => point.monitors.fold },
    { kind: 'branch', which: -1, test: (point) => point.monitors.branch },
    ...monitor.absent.map((_, g) => ({
      kind: 'transversal' as const,
      which: g,
      test: (point: BranchPoint) => point.monitors.transversal[g],
    })),
  ];
  const found: Crossing[] = [];
  for (const { kind, which, test } of tests) {
    if (kind === 'fold' ? !foldBetween(a, b) : !changes(test(a), test(b))) continue;
    const located = locateZero(monitor, a, b, planeDistance(a, b), test);
    if (located) found.push({ kind, which, located, index });
  }
  return found;
}

/** Scaled arclength from a to b, on the planes across the tangent of a. */
export function planeDistance(a: BranchPoint, b: BranchPoint): number {
  let along = 0;
  for (let k = 0; k < a.w.length; k += 1) along += a.tangent[k] * (b.w[k] - a.w[k]);
  return along;
}

/** The present state that falls below zero between two points, located. */
export function crossingOfZero(
  monitor: Monitor,
  a: BranchPoint,
  b: BranchPoint,
  h: number,
  index: number,
): Crossing | null {
  const { lowest, lowestState } = b.monitors;
  if (!(lowest < 0)) return null;
  const slot = monitor.curve.active.indexOf(lowestState);
  if (!(a.w[slot] > 0)) return null;
  const located = locateZero(monitor, a, b, h, (point) => point.w[slot]);
  return located && { kind: 'zero', which: lowestState, located, index };
}

/** A pair that crosses the imaginary axis: two more growing, or two fewer, without a real crossing between. */
export function crossingOfPair(
  monitor: Monitor,
  a: BranchPoint,
  b: BranchPoint,
  index: number,
): Crossing | null {
  if (b.monitors.undecided > 0) return null;
  const change = b.monitors.growing - a.monitors.growing;
  if (Math.abs(change) !== 2 || realCrossings(a, b) > 0) return null;
  const located = locatePair(monitor, a, b, a.monitors.growing);
  return located && { kind: 'Hopf', which: -1, located, index };
}

const BISECTIONS = 6;

/** Brackets the crossing by counting growing eigenvalues, then finds the zero of the pair's real part. */
function locatePair(monitor: Monitor, a: BranchPoint, b: BranchPoint, growing: number): Located | null {
  let low = 0;
  let high = planeDistance(a, b);
  for (let k = 0; k < BISECTIONS; k += 1) {
    const middle = (low + high) / 2;
    const point = pointAlong(monitor, a, middle);
    if (point === null) return null;
    if (point.monitors.undecided > 0) break;
    if (point.monitors.growing === growing) low = middle;
    else high = middle;
  }
  const from = low === 0 ? a : pointAlong(monitor, a, low);
  const to = pointAlong(monitor, a, high);
  if (from === null || to === null) return null;
  const realPart = (point: BranchPoint): number => {
    if (!monitor.curve.evaluate(point.w) || !monitor.spectrum.update(monitor.curve.jacobian)) return NaN;
    return monitor.spectrum.nearestPair().re;
  };
  return locateZero(monitor, from, to, planeDistance(from, to), realPart);
}
