import type { CycleCurve, CyclePoint } from './cycle-curve';
import type { CycleSpecialKind } from './contract';

export const LOCATE_CYCLE_DEFAULTS = { iterations: 30, tolerance: 1e-10 } as const;

/** Share of the step at which the neighbours of a singular point lie. */
const BESIDE = 1e-3;
/** Size of the test from which on the best point will do where no better one can be corrected. */
const CLOSE = 1e-5;

export interface CycleCrossing {
  readonly kind: CycleSpecialKind;
  readonly point: CyclePoint;
  /** Length of the bracket left, in scaled arclength. */
  readonly bracket: number;
  /** Index of the accepted point before it, from the start of this direction. */
  readonly index: number;
  /** Set where the branch ends there, for a reason that multipliers do not tell. */
  readonly note?: string;
}

/**
 * Kinds of special points between two neighbouring cycles, as far as counts tell: a real multiplier passes 1
 * or -1 where the number beyond changes by an odd number (a pair that turns real changes it by two), and
 * what is left of the change outside the unit circle are complex pairs.
 */
export function crossingKinds(a: CyclePoint, b: CyclePoint): readonly CycleSpecialKind[] {
  // A family of cycles at one value of the parameter: multipliers touch 1 all along, and mean nothing, but
  // the determinant tells where a branch leaves it.
  if (isUpright(a) && isUpright(b))
    return a.determinant.sign * b.determinant.sign < 0 ? ['branch point of cycles'] : [];
  const turns = a.tangent.parameter * b.tangent.parameter < 0;
  const above = b.above - a.above;
  const below = b.below - a.below;
  const kinds: CycleSpecialKind[] = [];
  if (turns) kinds.push('fold of cycles');
  if (isOdd(above) !== turns) kinds.push('branch point of cycles');
  if (isOdd(below)) kinds.push('period doubling');
  const real = (isOdd(above) ? Math.sign(above) : 0) + (isOdd(below) ? Math.sign(below) : 0);
  const pairs = Math.round(Math.abs(b.outside - a.outside - real) / 2);
  for (let k = 0; k < pairs; k += 1) kinds.push('torus');
  // Two real ones at once, or a pair that crossed and then turned real: a shorter step tells.
  if (pairs > 0 && (Math.abs(above) > 1 || Math.abs(below) > 1)) kinds.push('torus');
  return kinds;
}

const UPRIGHT = 1e-8;

/** Whether the branch stands upright there: another cycle at the same value of the parameter lies beside. */
export const isUpright = ({ tangent }: CyclePoint): boolean => Math.abs(tangent.parameter) < UPRIGHT;

const isOdd = (value: number): boolean => value % 2 !== 0;

/** Changes sign where the special point lies; its size is a distance to it. */
function testOf(kind: CycleSpecialKind, a: CyclePoint): (point: CyclePoint) => number {
  switch (kind) {
    case 'fold of cycles':
      return (point) => point.tangent.parameter;
    case 'branch point of cycles':
      if (isUpright(a))
        return ({ determinant }) => determinant.sign * Math.exp(determinant.log - a.determinant.log);
      return (point) =>
        signed(
          point.above === a.above,
          nearest(point, (re, im) => im === 0 && re > 0),
        );
    case 'period doubling':
      return (point) =>
        signed(
          point.below === a.below,
          nearest(point, (re, im) => im === 0 && re < 0),
        );
    case 'torus':
      return (point) =>
        signed(
          point.outside === a.outside,
          nearest(point, (_re, im) => im !== 0),
        );
  }
}

const signed = (same: boolean, size: number): number => (same ? -size : size);

/** Least |ln |mu|| among multipliers of one sort; 1 where there are none, so that the bracket is halved. */
function nearest({ floquet }: CyclePoint, sort: (re: number, im: number) => boolean): number {
  let least = Infinity;
  floquet.nontrivial.forEach(({ re, im }, k) => {
    if (sort(re, im)) least = Math.min(least, Math.abs(floquet.logModuli[k]));
  });
  return Number.isFinite(least) ? least : 1;
}

/**
 * A special point between two cycles on the same mesh, `b` at distance `h` across the tangent of `a`, by the
 * Illinois variant of regula falsi (Dowell & Jarratt 1971, from memory), each trial corrected. Null where a
 * trial could not be corrected.
 */
export function locateCycle(
  curve: CycleCurve,
  a: CyclePoint,
  b: CyclePoint,
  h: number,
  kind: CycleSpecialKind,
): { readonly point: CyclePoint; readonly bracket: number } | null {
  const test = testOf(kind, a);
  let [low, high] = [0, h];
  let [fLow, fHigh] = [test(a), test(b)];
  let best = Math.abs(fLow) < Math.abs(fHigh) ? a : b;
  let least = Math.min(Math.abs(fLow), Math.abs(fHigh));
  let side = 0;
  const { iterations, tolerance } = LOCATE_CYCLE_DEFAULTS;
  for (let k = 0; k < iterations && high - low > tolerance; k += 1) {
    // Every third trial halves the bracket, so that a flat test cannot stall it.
    const secant = (low * fHigh - high * fLow) / (fHigh - fLow);
    const s = k % 3 === 2 || !(secant > low && secant < high) ? (low + high) / 2 : secant;
    const trial = trialAt(curve, a, s, BESIDE * h, test);
    if (trial === null) return least < CLOSE ? { point: best, bracket: high - low } : null;
    const { point, f } = trial;
    if (Math.abs(f) < least) [least, best] = [Math.abs(f), point];
    if (least < tolerance) break;
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
  return { point: best, bracket: least < tolerance ? tolerance : high - low };
}

/**
 * The cycle at distance s with its test value. The corrector's matrix is singular at a branch point itself:
 * there the mean of the neighbours at s - d and s + d stands in, with an error of the order of d^2.
 */
function trialAt(
  curve: CycleCurve,
  a: CyclePoint,
  s: number,
  d: number,
  test: (point: CyclePoint) => number,
): { readonly point: CyclePoint; readonly f: number } | null {
  const point = curve.correct(a.orbit, a.tangent, s);
  // Near the end a trial from a family may land on the branch that leaves it.
  const strayed = point !== null && isUpright(a) && !isUpright(point);
  if (point && !strayed) return { point, f: test(point) };
  const before = curve.correct(a.orbit, a.tangent, s - d);
  const after = curve.correct(a.orbit, a.tangent, s + d);
  if (before === null || after === null) return null;
  const orbit = {
    ...before.orbit,
    values: before.orbit.values.map((value, k) => (value + after.orbit.values[k]) / 2),
    logPeriod: (before.orbit.logPeriod + after.orbit.logPeriod) / 2,
    // Near a singular point the parameter of a family is known better from the family.
    parameter: isUpright(a) ? a.orbit.parameter : (before.orbit.parameter + after.orbit.parameter) / 2,
  };
  return { point: { ...before, orbit }, f: (test(before) + test(after)) / 2 };
}
