import type { BoundaryCurve } from './boundary-curve';
import type { BoundaryMonitor, BoundaryPoint } from './boundary-monitor';
import type { BoundaryPointKind } from './contract';

export const LOCATE_BOUNDARY_DEFAULTS = { iterations: 50, tolerance: 1e-13 } as const;

export interface BoundaryCrossing {
  readonly kind: BoundaryPointKind;
  readonly point: BoundaryPoint;
  /** Length of the bracket left, in scaled arclength. */
  readonly bracket: number;
  /** Index of the accepted point before it, from the start of this direction. */
  readonly index: number;
}

interface Test {
  readonly kind: BoundaryPointKind;
  readonly value: (point: BoundaryPoint) => number;
}

/** omega^2 this much smaller than at the next point is zero. */
const AT_BOGDANOV_TAKENS = 1e-6;

/** The tests that change sign between two neighbouring points. */
export function crossingTests(kind: BoundaryMonitor['kind'], a: BoundaryPoint, b: BoundaryPoint): Test[] {
  const change = b.growing - a.growing;
  const tests: Test[] = [];
  if (kind === 'fold') {
    const bogdanov: Test = { kind: 'Bogdanov-Takens', value: (point) => point.overlap };
    const turned = differs(bogdanov, a, b);
    if (turned) tests.push(bogdanov);
    tests.push({ kind: 'cusp', value: (point) => point.quadratic });
    if (!turned && Math.abs(change) === 2) tests.push({ kind: 'fold-Hopf', value: counted(a, nearestPair) });
  }
  if (kind === 'Hopf') {
    const bogdanov: Test = { kind: 'Bogdanov-Takens', value: (point) => point.kappa };
    // A curve entered at such a point leaves it there, and does not meet it.
    if (Math.abs(a.kappa) > AT_BOGDANOV_TAKENS * Math.abs(b.kappa)) tests.push(bogdanov);
    tests.push({ kind: 'generalised Hopf', value: (point) => point.l1 });
    if (!differs(bogdanov, a, b)) {
      if (Math.abs(change) === 1) tests.push({ kind: 'fold-Hopf', value: counted(a, nearestReal) });
      if (Math.abs(change) === 2) tests.push({ kind: 'double Hopf', value: counted(a, nearestPair) });
    }
  }
  return tests.filter((test) => differs(test, a, b));
}

function differs({ value }: Test, a: BoundaryPoint, b: BoundaryPoint): boolean {
  const [x, y] = [value(a), value(b)];
  return (x < 0 && y > 0) || (x > 0 && y < 0);
}

/** Signed by whether as many eigenvalues grow as at `a`. */
function counted(a: BoundaryPoint, size: (point: BoundaryPoint) => number): Test['value'] {
  return (point) => (point.growing === a.growing ? -1 : 1) * size(point);
}

function nearestPair({ others }: BoundaryPoint): number {
  return Math.min(1e300, ...others.filter(({ im }) => im !== 0).map(({ re }) => Math.abs(re)));
}

function nearestReal({ others }: BoundaryPoint): number {
  return Math.min(1e300, ...others.filter(({ im }) => im === 0).map(({ re }) => Math.abs(re)));
}

/** The point at scaled arclength s from `from`, on the plane across its tangent; null where it is not corrected. */
export function boundaryPointAlong(
  curve: BoundaryCurve,
  monitor: BoundaryMonitor,
  from: BoundaryPoint,
  s: number,
): BoundaryPoint | null {
  const x = from.x.map((value, j) => value + s * from.tangent[j]);
  let target = 0;
  for (let j = 0; j < x.length; j += 1) target += from.tangent[j] * x[j];
  if (curve.correct(x, from.tangent, target) < 0) return null;
  const tangent = new Float64Array(x.length);
  if (!curve.tangent(x, from.tangent, tangent)) return null;
  return monitor.read(x, tangent, from);
}

/**
 * Zero of a test between `a` and the point at distance h from it, by the Illinois variant of regula falsi (Dowell
 * & Jarratt 1971, from memory), each trial corrected. Null where a trial cannot be corrected, and where the
 * sign changes through a pole.
 */
export function locateBoundaryPoint(
  curve: BoundaryCurve,
  monitor: BoundaryMonitor,
  a: BoundaryPoint,
  b: BoundaryPoint,
  h: number,
  { value }: Test,
): { readonly point: BoundaryPoint; readonly bracket: number } | null {
  let [low, high] = [0, h];
  let [fLow, fHigh] = [value(a), value(b)];
  const least0 = Math.min(Math.abs(fLow), Math.abs(fHigh));
  let [best, least] = Math.abs(fLow) < Math.abs(fHigh) ? [a, Math.abs(fLow)] : [b, Math.abs(fHigh)];
  let side = 0;
  const { iterations, tolerance } = LOCATE_BOUNDARY_DEFAULTS;
  for (let k = 0; k < iterations && high - low > tolerance && least > 0; k += 1) {
    const secant = (low * fHigh - high * fLow) / (fHigh - fLow);
    const s = k % 4 === 3 || !(secant > low && secant < high) ? (low + high) / 2 : secant;
    if (!(s > low && s < high)) break;
    const point = boundaryPointAlong(curve, monitor, a, s);
    const f = point ? value(point) : NaN;
    if (point === null || Number.isNaN(f)) return k > 8 ? { point: best, bracket: high - low } : null;
    if (Math.abs(f) < least) [best, least] = [point, Math.abs(f)];
    if (f * fLow > 0) {
      [low, fLow] = [s, f];
      if (side === 1) fHigh /= 2;
      side = 1;
    } else {
      [high, fHigh] = [s, f];
      if (side === -1) fLow /= 2;
      side = -1;
    }
  }
  return least < POLE * least0 ? { point: best, bracket: least === 0 ? 0 : high - low } : null;
}

/** A zero is far smaller than the values at the ends; at a pole nothing is. */
const POLE = 1e-3;
