import type { Progress } from '../continuation/contract';
import type { CompiledSystem } from '../system/contract';
import { createStepper, stiffStepperFrom, takeOverIfStiff } from './choose-method';
import {
  INTEGRATION_DEFAULTS,
  INTEGRATION_MESSAGES,
  type IntegrationOptions,
  type IntegrationStatus,
  type Trajectory,
} from './contract';
import { logScaleSystem } from './log-scale';
import { runInCore } from './native-run';
import { integrateByExtrapolation } from './odex-extrapolation';
import type { Stepper } from './stepper';

/** Steps between two yields: a fraction of a millisecond for small systems. */
const STEPS_PER_SLICE = 256;

/**
 * Integrates from `start` at times[0] to every requested time; partial, with the reason, where it
 * cannot go on. See `MethodName` for the choice of methods.
 *
 * @param start length n, not written to. @param times monotone, either direction.
 */
export function integrateTo(
  system: CompiledSystem,
  start: Float64Array,
  times: Float64Array,
  options: IntegrationOptions = {},
): Trajectory {
  const run = integrateInSlices(system, start, times, options);
  for (;;) {
    const next = run.next();
    if (next.done) return next.value;
  }
}

/** The same as a generator that yields between slices of steps, with the trajectory so far. */
export function* integrateInSlices(
  system: CompiledSystem,
  start: Float64Array,
  times: Float64Array,
  options: IntegrationOptions = {},
): Generator<Progress<Trajectory>, Trajectory> {
  if (options.scale === 'log') return yield* integrateLogarithms(system, start, times, options);
  if (options.method === 'odex') return integrateByExtrapolation(system, start, times, options);
  const recorder = new Recorder(system.dimension, times);
  const end = times[times.length - 1];
  const budget = options.maximumSteps ?? INTEGRATION_DEFAULTS.maximumSteps;
  let stepper: Stepper;
  if (system.native && options.method !== 'rodas') {
    const run = runInCore(system, system.native, start, times, options, (state) => recorder.take(state));
    let step = run.next();
    while (!step.done) {
      yield { ...step.value, partial: recorder.finish('cancelled', NOTHING_COUNTED) };
      step = run.next();
    }
    const { status, ...found } = step.value;
    if (status !== 'stiff') return recorder.finish(status, { ...found, method: found });
    stepper = stiffStepperFrom(system, found, end, options);
  } else {
    stepper = createStepper(system, options);
    stepper.begin(times[0], start, end - times[0], options.initialStep);
    recorder.take(start);
  }
  while (recorder.filled < times.length) {
    if (times[recorder.filled] === stepper.time) {
      recorder.take(stepper.state);
      continue;
    }
    if (stepper.steps + stepper.rejected >= budget) return recorder.finish('steps-spent', stepper);
    const outcome = stepper.advance(end);
    if (outcome !== 'stepped') return recorder.finish(outcome, stepper);
    recorder.takeWithin(stepper);
    if (stepper.steps % STEPS_PER_SLICE === 0) {
      const fraction = (stepper.time - times[0]) / (end - times[0]);
      yield { fraction, stage: 'Integrating', partial: recorder.finish('cancelled', stepper) };
    }
    stepper = takeOverIfStiff(stepper, system, end, options);
  }
  return recorder.finish('complete', stepper);
}

function* integrateLogarithms(
  system: CompiledSystem,
  start: Float64Array,
  times: Float64Array,
  options: IntegrationOptions,
): Generator<Progress<Trajectory>, Trajectory> {
  const n = system.dimension;
  const scaled = logScaleSystem(system, start);
  const first = new Float64Array(n);
  scaled.toScale(start, first);
  const relative = options.relativeTolerance ?? INTEGRATION_DEFAULTS.relativeTolerance;
  // An absolute error of a logarithm is a relative error of the state.
  const inner = integrateTo(scaled.system, first, times, {
    ...options,
    scale: 'linear',
    absoluteTolerance: relative,
  });
  const states = inner.states.slice();
  for (let k = 0; k < inner.times.length; k += 1) {
    const one = states.subarray(k * n, (k + 1) * n);
    scaled.fromScale(one, one);
  }
  yield { fraction: 1, stage: 'Integrating', partial: { ...inner, states } };
  return { ...inner, states };
}

const NOTHING_COUNTED = { steps: 0, rejected: 0, method: { evaluations: 0 } } as const;

/** Fills the requested times as the steps pass over them. */
class Recorder {
  filled = 0;
  private readonly states: Float64Array;

  constructor(
    private readonly n: number,
    private readonly times: Float64Array,
  ) {
    this.states = new Float64Array(n * times.length);
  }

  take(state: Float64Array): void {
    this.states.set(state.subarray(0, this.n), this.filled * this.n);
    this.filled += 1;
  }

  takeWithin(stepper: {
    previousTime: number;
    time: number;
    interpolate(t: number, out: Float64Array): void;
  }) {
    const forward = stepper.time >= stepper.previousTime;
    while (this.filled < this.times.length) {
      const t = this.times[this.filled];
      if (forward ? t > stepper.time : t < stepper.time) return;
      stepper.interpolate(t, this.states.subarray(this.filled * this.n, (this.filled + 1) * this.n));
      this.filled += 1;
    }
  }

  finish(
    status: IntegrationStatus,
    stepper: { steps: number; rejected: number; method: { evaluations: number } },
  ): Trajectory {
    const whole = this.filled === this.times.length;
    return {
      status,
      message: INTEGRATION_MESSAGES[status],
      times: whole ? this.times : this.times.slice(0, this.filled),
      states: whole ? this.states : this.states.slice(0, this.filled * this.n),
      dimension: this.n,
      evaluations: stepper.method.evaluations,
      steps: stepper.steps,
      rejected: stepper.rejected,
    };
  }
}
