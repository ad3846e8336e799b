import type { BranchPoint, Monitor } from './test-functions';

/** Distance, as a share of the step, of the neighbours that stand in for an exactly singular point. */
const BESIDE = 1e-4;

export const LOCATE_DEFAULTS = { iterations: 60, tolerance: 1e-14 } as const;

export interface Located {
  readonly point: BranchPoint;
  /** Length of the bracket left, in units of the swept range. */
  readonly bracket: number;
}

/** The point of the curve at scaled arclength s from `from`, on the plane across its tangent. */
export function pointAlong(monitor: Monitor, from: BranchPoint, s: number): BranchPoint | null {
  const { curve } = monitor;
  const w = from.w.map((value, b) => value + s * from.tangent[b]);
  let along = 0;
  for (let b = 0; b < w.length; b += 1) along += from.tangent[b] * w[b];
  if (curve.correct(w, from.tangent, along) < 0) return null;
  return monitor.pointAt(w, from.tangent);
}

/**
 * Zero of a test function along the branch between two points, by the Illinois variant of regula falsi
 * (Dowell & Jarratt 1971, from memory), each trial corrected back to the branch.
 *
 * @param length scaled arclength from `from` to `to` on the planes across the tangent of `from`
 * @returns null where a trial could not be corrected
 */
export function locateZero(
  monitor: Monitor,
  from: BranchPoint,
  to: BranchPoint,
  length: number,
  test: (point: BranchPoint) => number,
): Located | null {
  let a = 0;
  let b = length;
  let ga = test(from);
  let gb = test(to);
  if (!(ga * gb <= 0)) return null;
  let best = Math.abs(ga) < Math.abs(gb) ? from : to;
  let bestValue = Math.min(Math.abs(ga), Math.abs(gb));
  let side = 0;
  for (let k = 0; k < LOCATE_DEFAULTS.iterations && b - a > LOCATE_DEFAULTS.tolerance; k += 1) {
    if (bestValue === 0) break;
    // Every fourth trial halves the bracket, so that a flat test function cannot stall it.
    const s = k % 4 === 3 ? (a + b) / 2 : (a * gb - b * ga) / (gb - ga);
    if (!(s > a && s < b)) break;
    // The corrector's matrix is exactly singular at a branch point; neighbours stand in for it.
    const point = pointAlong(monitor, from, s) ?? pointBetween(monitor, from, s, BESIDE * length);
    if (point === null) return k > 8 ? { point: best, bracket: b - a } : null;
    const g = test(point);
    if (Math.abs(g) < bestValue) {
      best = point;
      bestValue = Math.abs(g);
    }
    if (g * ga > 0) {
      a = s;
      ga = g;
      if (side === 1) gb /= 2;
      side = 1;
    } else {
      b = s;
      gb = g;
      if (side === -1) ga /= 2;
      side = -1;
    }
  }
  return { point: best, bracket: bestValue === 0 ? 0 : b - a };
}

/** The point at s as the mean of its neighbours at s - d and s + d; its error is of the order of d². */
function pointBetween(monitor: Monitor, from: BranchPoint, s: number, d: number): BranchPoint | null {
  const before = pointAlong(monitor, from, s - d);
  const after = pointAlong(monitor, from, s + d);
  if (before === null || after === null) return null;
  const w = before.w.map((value, k) => (value + after.w[k]) / 2);
  if (!monitor.curve.evaluate(w) || !monitor.spectrum.update(monitor.curve.jacobian)) return null;
  return {
    ...before,
    w,
    u: monitor.curve.u.slice(),
    parameter: monitor.curve.parameterAt(w),
    leading: monitor.spectrum.leading,
    attracts: monitor.spectrum.attracts,
    typeIndex: monitor.spectrum.typeIndex,
  };
}
