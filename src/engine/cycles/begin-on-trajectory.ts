import type { Progress } from '../continuation/contract';
import { integrateInSlices, integrateTo } from '../integrators/driver';
import { detectPeriod } from '../integrators/period';
import type { CompiledSystem } from '../system/contract';
import type { CycleCurve, CyclePoint } from './cycle-curve';
import { adaptOrbit } from './mesh';
import { closeOrbit, nodeTimes, uniformMesh } from './orbit';

export const TRAJECTORY_START_DEFAULTS = {
  /** Time before anything is looked at, in horizons; and in periods of the forcing. */
  transientHorizons: 8,
  transientForcings: 300,
  relativeTolerance: 1e-10,
  absoluteTolerance: 1e-14,
  /** Sampled intervals for each of the mesh. */
  oversampling: 4,
} as const;

export type TrajectoryStart =
  | { readonly ok: true; readonly state: Float64Array; readonly period: number }
  | { readonly ok: false; readonly message: string };

/** The cycle on which a trajectory settles: a state on it and its period. A generator, to be driven in slices. */
export function* settleOnCycle(
  system: CompiledSystem,
  start: Float64Array,
  horizon: number,
): Generator<Progress<never>, TrajectoryStart> {
  const { relativeTolerance, absoluteTolerance, transientHorizons } = TRAJECTORY_START_DEFAULTS;
  const found = yield* detectPeriod(system, start, {
    relativeTolerance,
    absoluteTolerance,
    transient: transientHorizons * horizon,
    window: horizon,
    maximumTime: transientHorizons * horizon,
  });
  return found.period === null || found.state === null
    ? { ok: false, message: `No cycle was reached from the start values. ${found.message}` }
    : { ok: true, state: found.state, period: found.period };
}

/** Where a forced model is after many periods of its forcing, at a whole number of periods. */
export function* settleUnderForcing(
  system: CompiledSystem,
  start: Float64Array,
  period: number,
): Generator<Progress<unknown>, TrajectoryStart> {
  const { relativeTolerance, absoluteTolerance, transientForcings } = TRAJECTORY_START_DEFAULTS;
  const run = yield* integrateInSlices(system, start, Float64Array.of(0, transientForcings * period), {
    relativeTolerance,
    absoluteTolerance,
  });
  const n = system.dimension;
  if (run.status !== 'complete') return { ok: false, message: run.message };
  return { ok: true, state: run.states.slice(n), period };
}

/** The orbit through a state over one period, sampled and corrected at its parameter; null where it is none. */
export function cycleThrough(
  curve: CycleCurve,
  state: Float64Array,
  period: number,
  parameter: number,
): CyclePoint | null {
  const { cycles, N, m } = curve;
  const { n, system } = cycles;
  const mesh = uniformMesh(TRAJECTORY_START_DEFAULTS.oversampling * N);
  const times = nodeTimes(mesh, m).map((tau) => tau * period);
  cycles.setParameter(parameter);
  const { relativeTolerance, absoluteTolerance } = TRAJECTORY_START_DEFAULTS;
  const run = integrateTo(system, state, times, { relativeTolerance, absoluteTolerance });
  if (run.status !== 'complete') return null;
  const values = new Float64Array(run.states.length);
  for (let k = 0; k < times.length; k += 1)
    cycles.toCoordinates(run.states.subarray(k * n, (k + 1) * n), values.subarray(k * n, (k + 1) * n));
  if (!values.every(Number.isFinite)) return null;
  closeOrbit(values, n);
  const raw = { mesh, values, logPeriod: Math.log(period), parameter };
  const orbit = adaptOrbit(curve.basis, n, raw, N);
  // In a family of cycles at one value of the parameter the period tells them apart, the parameter does not.
  const point =
    curve.correct(orbit, curve.parameterDirection(), 0) ??
    (cycles.forced ? null : curve.correct(orbit, curve.periodDirection(), 0));
  return point && (curve.adapt(point) ?? point);
}
