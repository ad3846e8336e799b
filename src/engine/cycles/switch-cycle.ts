import { nullVector } from '../linalg/null-vector';
import type { Direction } from './collocation-borders';
import { CycleCurve, type CyclePoint } from './cycle-curve';
import { CycleSystem } from './cycle-system';
import { isUpright } from './locate-cycle';
import type { Orbit } from './orbit';

/** First steps onto the other branch that are tried, in scaled coordinates. */
const FIRST_STEPS = [0.01, 0.03, 0.003, 0.1] as const;

/** The other branch may leave at a sharp angle to the direction, but not farther than this many first steps. */
const FARTHEST = 30;

/**
 * First cycle of twice the period at a period doubling: the cycle run through twice, plus a small multiple of
 * (v, -v) with v carried by the linearised flow from the eigenvector of the multiplier -1. Null where no size
 * of the first step converges.
 */
export function switchToDoubled(
  curve: CycleCurve,
  at: CyclePoint,
): { curve: CycleCurve; point: CyclePoint } | null {
  const { cycles, N, m } = curve;
  const { n, system, parameterIndex, parameterScale } = cycles;
  const M = curve.monodromy(at);
  if (M === null) return null;
  for (let i = 0; i < n; i += 1) M[i * n + i] += 1;
  const v = curve.carry(nullVector(M, n).vector);
  const { orbit } = at;
  const present = new Float64Array(n);
  cycles.toState(orbit.values.subarray(0, n), present);
  const wide = new CycleSystem(
    system,
    cycles.parametersAt(orbit.parameter),
    parameterIndex,
    parameterScale,
    present,
    cycles.stateScale,
    2 * cycles.forcingPeriods,
  );
  const doubled = new CycleCurve(wide, 2 * N, m);
  const half = N * m * n;
  const mesh = new Float64Array(2 * N + 1);
  for (let k = 0; k <= N; k += 1) {
    mesh[k] = orbit.mesh[k] / 2;
    mesh[N + k] = 0.5 + orbit.mesh[k] / 2;
  }
  const values = new Float64Array(2 * half + n);
  const along = doubled.newDirection();
  values.set(orbit.values, 0);
  values.set(orbit.values, half);
  for (let k = 0; k < half; k += 1) {
    along.values[k] = v[k];
    along.values[half + k] = -v[k];
  }
  for (let i = 0; i < n; i += 1) along.values[2 * half + i] = along.values[i];
  const from: Orbit = {
    mesh,
    values,
    logPeriod: orbit.logPeriod + Math.LN2,
    parameter: orbit.parameter,
  };
  if (!doubled.normalise(mesh, along)) return null;
  for (const size of FIRST_STEPS) {
    const point = doubled.correct(from, along, size);
    if (point && halvesDiffer(doubled, point.orbit) > size / 2) return { curve: doubled, point };
  }
  return null;
}

/** Root mean square difference of the two halves of a cycle in scaled coordinates: 0 where it is run through twice. */
export function halvesDiffer(curve: CycleCurve, orbit: Orbit): number {
  const { n } = curve.cycles;
  const samples = 64;
  const [a, b] = [new Float64Array(n), new Float64Array(n)];
  let squared = 0;
  for (let s = 0; s < samples; s += 1) {
    curve.reader.at(orbit.mesh, orbit.values, (0.5 * s) / samples, a);
    curve.reader.at(orbit.mesh, orbit.values, 0.5 + (0.5 * s) / samples, b);
    for (let i = 0; i < n; i += 1) squared += (a[i] - b[i]) ** 2 / samples;
  }
  return Math.sqrt(squared);
}

/**
 * First cycles of the other branch at a branch point, one a side: along the null vector across the tangent.
 * States absent before are taken as logarithms from there on, where they are present all along.
 */
export function switchAtBranchPoint(
  curve: CycleCurve,
  at: CyclePoint,
): readonly { curve: CycleCurve; point: CyclePoint }[] {
  const second = curve.secondDirection(at);
  if (second === null) return [];
  const found: { curve: CycleCurve; point: CyclePoint }[] = [];
  for (const along of [second, turned(second)])
    for (const size of FIRST_STEPS) {
      const near = curve.correct(at.orbit, along, size);
      const far = near && curve.correct(at.orbit, along, 2 * size);
      if (near === null || far === null || !isNear(curve, at, near, size)) continue;
      // From a family at one value of the parameter only what leaves that value is another branch.
      if (isUpright(at) && isUpright(near)) continue;
      found.push(inFittingCoordinates(curve, near, far));
      break;
    }
  return found;
}

/** The opposite direction. */
export function turned(direction: Direction): Direction {
  return {
    values: direction.values.map((value) => -value),
    parameter: -direction.parameter,
    logPeriod: -direction.logPeriod,
  };
}

/** Whether the corrector found a cycle near by; its distance along the direction is given by the constraint. */
function isNear(curve: CycleCurve, at: CyclePoint, found: CyclePoint, size: number): boolean {
  const moved: Direction = {
    values: found.orbit.values.map((value, k) => value - at.orbit.values[k]),
    logPeriod: found.orbit.logPeriod - at.orbit.logPeriod,
    parameter: (found.orbit.parameter - at.orbit.parameter) / curve.cycles.parameterScale,
  };
  return Math.sqrt(curve.inner(at.orbit.mesh, moved, moved)) < FARTHEST * size;
}

function inFittingCoordinates(
  curve: CycleCurve,
  near: CyclePoint,
  far: CyclePoint,
): { curve: CycleCurve; point: CyclePoint } {
  const { cycles, N, m } = curve;
  const { n } = cycles;
  const lowest = new Float64Array(n).fill(Infinity);
  const u = new Float64Array(n);
  for (let at = 0; at < far.orbit.values.length; at += n) {
    cycles.toState(far.orbit.values.subarray(at, at + n), u);
    for (let i = 0; i < n; i += 1) lowest[i] = Math.min(lowest[i], u[i]);
  }
  const gained = lowest.some(
    (value, i) => value > 0 && cycles.system.nonnegative[i] && !cycles.logarithmic[i],
  );
  if (!gained) return { curve, point: near };
  const wide = new CycleSystem(
    cycles.system,
    cycles.parametersAt(far.orbit.parameter),
    cycles.parameterIndex,
    cycles.parameterScale,
    lowest.map((value) => Math.max(value, 0)),
    cycles.stateScale,
    cycles.forcingPeriods,
  );
  const own = new CycleCurve(wide, N, m);
  const convert = (orbit: Orbit): Orbit => {
    const values = new Float64Array(orbit.values.length);
    for (let at = 0; at < values.length; at += n) {
      cycles.toState(orbit.values.subarray(at, at + n), u);
      wide.toCoordinates(u, values.subarray(at, at + n));
    }
    return { ...orbit, values };
  };
  const [a, b] = [convert(near.orbit), convert(far.orbit)];
  const along: Direction = {
    values: b.values.map((value, k) => value - a.values[k]),
    logPeriod: b.logPeriod - a.logPeriod,
    parameter: (b.parameter - a.parameter) / cycles.parameterScale,
  };
  const point =
    along.values.every(Number.isFinite) && own.normalise(b.mesh, along) ? own.correct(b, along, 0) : null;
  return point ? { curve: own, point } : { curve, point: near };
}
