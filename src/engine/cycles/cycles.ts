import type { Progress, SpecialPoint } from '../continuation/contract';
import { sweep } from '../continuation/sweep';
import type { CompiledSystem } from '../system/contract';
import type { CyclesResult } from './contract';
import { CYCLES_DEFAULTS, type CyclesOptions } from './cycles-options';
import { CyclesRun } from './cycles-run';
import { settleOnCycle, settleUnderForcing, type TrajectoryStart } from './begin-on-trajectory';

export type { CyclesOptions } from './cycles-options';

const NO_PARAMETER = 'The parameter to follow cycles along is not one of the model.';
const NO_RANGE = 'The range needs two different finite ends.';
const NO_HOPF =
  'No Hopf point was found along the range, so the run from the start values was asked for a cycle.';
const NO_PERIOD =
  'Explicit time enters this model in a way that has no period (other than through sines and cosines of time), so it has no period map.';
const NOT_SETTLED = 'The run from the start values could not be followed.';
/** A population below this share of the start values has died out. */
const VANISHED = 1e-15;
/** Share of the progress before any branch is followed. */
const STARTED = 0.2;

/**
 * Branches of cycles along one parameter: from every Hopf point of the range, from the cycle on which a
 * trajectory settles, or, for a model with explicit time, from the fixed points of its period map; with
 * their special points, and with the branches entered at period doublings and branch points. A generator
 * whose progress holds the result so far. Trouble is a value: every branch says why it ends.
 *
 * @param p all parameters, in the order of `system.parameterKeys`; not written to
 */
export function* cycles(
  system: CompiledSystem,
  p: Float64Array,
  options: CyclesOptions,
): Generator<Progress<CyclesResult>, CyclesResult> {
  const run = new CyclesRun(system, p, options);
  const { parameterIndex, from, to } = options;
  if (!(parameterIndex >= 0 && parameterIndex < system.parameterKeys.length))
    return run.record.result('failed', NO_PARAMETER);
  if (!Number.isFinite(from) || !Number.isFinite(to) || from === to)
    return run.record.result('failed', NO_RANGE);
  if (!system.autonomous) yield* beginUnderForcing(run, system, p, options);
  else if (options.beginFrom === 'trajectory') yield* beginOnTrajectory(run, system, p, options);
  else yield* beginAtHopfPoints(run, system, p, options);
  yield* run.followSwitches();
  return run.record.result('complete', run.record.summary());
}

function* beginAtHopfPoints(
  run: CyclesRun,
  system: CompiledSystem,
  p: Float64Array,
  options: CyclesOptions,
): Generator<Progress<CyclesResult>, void> {
  const points = options.hopfPoints ?? (yield* sweepForHopf(run, system, p, options));
  const hopfs = points.filter((one) => one.kind === 'Hopf' && one.hopf !== null && one.feasible);
  if (hopfs.length === 0) {
    run.record.note(NO_HOPF);
    yield* beginOnTrajectory(run, system, p, options);
  }
  for (const [k, hopf] of hopfs.entries())
    yield* run.fromHopf(hopf, STARTED + ((1 - STARTED) * k) / hopfs.length);
}

function* sweepForHopf(
  run: CyclesRun,
  system: CompiledSystem,
  p: Float64Array,
  options: CyclesOptions,
): Generator<Progress<CyclesResult>, readonly SpecialPoint[]> {
  const { parameterIndex, from, to, starts, box } = options;
  const search = sweep(system, p, {
    parameterIndex,
    from,
    to,
    starts,
    bands: false,
    ...(box ? { box } : {}),
  });
  for (;;) {
    const step = search.next();
    if (step.done) return step.value.specialPoints;
    yield run.record.progress(STARTED * step.value.fraction, 'looking for Hopf points');
  }
}

/** The current value of the parameter, or the nearest end of the range. */
function currentValue(p: Float64Array, { parameterIndex, from, to }: CyclesOptions): number {
  return Math.min(Math.max(p[parameterIndex], Math.min(from, to)), Math.max(from, to));
}

function* beginOnTrajectory(
  run: CyclesRun,
  system: CompiledSystem,
  p: Float64Array,
  options: CyclesOptions,
): Generator<Progress<CyclesResult>, void> {
  const parameters = Float64Array.from(p);
  parameters[options.parameterIndex] = currentValue(p, options);
  system.setParameters(parameters);
  const settle = settleOnCycle(system, options.starts[0], options.horizon ?? CYCLES_DEFAULTS.horizon);
  const found = yield* wait(run, settle, system, parameters);
  if (!found.ok) run.record.note(found.message);
  else yield* run.fromState(found.state, found.period, parameters[options.parameterIndex], 'trajectory');
}

function* beginUnderForcing(
  run: CyclesRun,
  system: CompiledSystem,
  p: Float64Array,
  options: CyclesOptions,
): Generator<Progress<CyclesResult>, void> {
  const parameters = Float64Array.from(p);
  parameters[options.parameterIndex] = currentValue(p, options);
  system.setParameters(parameters);
  const forcing = system.forcingPeriod();
  if (forcing === null) {
    run.record.note(NO_PERIOD);
    return;
  }
  const period = forcing * (options.forcingPeriods ?? CYCLES_DEFAULTS.forcingPeriods);
  for (const [k, start] of forcedStarts(system, options).entries()) {
    const found = yield* wait(run, settleUnderForcing(system, start, period), system, parameters);
    if (found.ok) {
      const state = withoutVanished(system, found.state, options.starts[0]);
      yield* run.fromState(state, period, parameters[options.parameterIndex], 'period map');
    } else if (k < options.starts.length) run.record.note(`${NOT_SETTLED} ${found.message}`);
  }
}

/** Populations that died out on the way are absent, where their absence lasts. */
function withoutVanished(system: CompiledSystem, state: Float64Array, start: Float64Array): Float64Array {
  const size = start.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const gone = system.populations.filter(({ states }) =>
    states.every((i) => system.nonnegative[i] && Math.abs(state[i]) < VANISHED * size),
  );
  const out = state.slice();
  for (const { states } of gone) for (const i of states) out[i] = 0;
  const f = new Float64Array(system.dimension);
  system.rhs(0, out, f);
  return gone.some(({ states }) => states.some((i) => f[i] !== 0)) ? state : out;
}

/** The starts, and the first of them without each population in turn: what others can invade. */
function forcedStarts(system: CompiledSystem, { starts }: CyclesOptions): readonly Float64Array[] {
  const without = system.populations
    .filter(({ states }) => states.every((i) => system.nonnegative[i]))
    .map(({ states }) => starts[0].map((value, i) => (states.includes(i) ? 0 : value)));
  return [...starts, ...(system.populations.length > 1 ? without : [])];
}

function* wait(
  run: CyclesRun,
  work: Generator<Progress<unknown>, TrajectoryStart>,
  system: CompiledSystem,
  parameters: Float64Array,
): Generator<Progress<CyclesResult>, TrajectoryStart> {
  for (;;) {
    const step = work.next();
    if (step.done) return step.value;
    yield run.record.progress(STARTED * step.value.fraction, 'letting a trajectory settle');
    // Another computation may have used the system in between.
    system.setParameters(parameters);
  }
}
