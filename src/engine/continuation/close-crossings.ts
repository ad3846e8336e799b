import { crossingOfPair, crossingsBetween, planeDistance, type Crossing } from './crossings';
import { pointAlong } from './locate';
import type { BranchPoint, Monitor } from './test-functions';

export const CLOSE_DEFAULTS = {
  /** A minimum of a parabola above this share of the middle value is not looked into. */
  hopeless: 0.3,
  trials: 24,
} as const;

const GOLDEN = (3 - Math.sqrt(5)) / 2;

interface Along {
  readonly points: BranchPoint[];
  readonly crossings: Crossing[];
}

/**
 * Two crossings within one or two steps, which signs at their ends cannot show: where the eigenvalue nearest
 * to the imaginary axis comes nearer and goes away again over three points, its least distance is sought
 * by golden sections, and when it is on the other side there, both crossings are located and the
 * point between them joins the branch. A touch without crossing adds nothing.
 *
 * @param followed branch so far; `next` is the point about to be added to it
 */
export function closeCrossings(monitor: Monitor, followed: Along, next: BranchPoint): void {
  const { points } = followed;
  const last = points.length - 1;
  const before = points[last - 1];
  const middle = points[last];
  if (before === undefined || !isDip(before, middle, next)) return;
  for (const [from, to, index] of [
    [before, middle, last - 1],
    [middle, next, last],
  ] as const) {
    const between = otherSide(monitor, from, to);
    if (between === null) continue;
    followed.crossings.push(
      ...crossingsOf(monitor, from, between, index),
      ...crossingsOf(monitor, between, to, index + 1),
    );
    points.splice(index + 1, 0, between);
    return;
  }
}

function crossingsOf(monitor: Monitor, a: BranchPoint, b: BranchPoint, index: number): Crossing[] {
  const pair = crossingOfPair(monitor, a, b, index);
  return pair ? [pair] : crossingsBetween(monitor, a, b, index);
}

/** Whether the distance to the axis has a minimum over three points that may reach zero. */
function isDip(a: BranchPoint, b: BranchPoint, c: BranchPoint): boolean {
  for (const point of [a, b, c]) {
    if (point.monitors.undecided > 0 || point.monitors.growing !== b.monitors.growing) return false;
  }
  const [ya, yb, yc] = [a, b, c].map((point) => Math.abs(point.monitors.nearest));
  if (!(yb < ya && yb <= yc)) return false;
  const [h, k] = [planeDistance(a, b), planeDistance(b, c)];
  // Newton's parabola through the three distances, at its lowest point.
  const slope = (yb - ya) / h;
  const curvature = ((yc - yb) / k - slope) / (h + k);
  const at = h / 2 - slope / (2 * curvature);
  const lowest = ya + slope * at + curvature * at * (at - h);
  return lowest < CLOSE_DEFAULTS.hopeless * yb;
}

/** A point between two on which another number of eigenvalues grows; null where none was found. */
function otherSide(monitor: Monitor, from: BranchPoint, to: BranchPoint): BranchPoint | null {
  const { growing, nearest } = from.monitors;
  const side = Math.sign(nearest);
  let low = 0;
  let high = planeDistance(from, to);
  let inner: { s: number; value: number } | null = null;
  let rising = true;
  for (let k = 0; k < CLOSE_DEFAULTS.trials; k += 1) {
    const s: number =
      inner === null
        ? low + GOLDEN * (high - low)
        : rising
          ? inner.s + GOLDEN * (high - inner.s)
          : inner.s - GOLDEN * (inner.s - low);
    const point = pointAlong(monitor, from, s);
    if (point === null) return null;
    if (point.monitors.undecided === 0 && point.monitors.growing !== growing) return point;
    const value = side * point.monitors.nearest;
    if (inner === null) inner = { s, value };
    else if (value < inner.value) {
      if (rising) low = inner.s;
      else high = inner.s;
      inner = { s, value };
    } else if (rising) high = s;
    else low = s;
    rising = high - inner.s > inner.s - low;
  }
  return null;
}
