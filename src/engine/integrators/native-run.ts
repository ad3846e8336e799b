import type { Progress } from '../continuation/contract';
import { ADVANCE, CONTROL, type NativeSystem } from '../core/contract';
import { OUTPUT_WINDOW } from '../core/workspace';
import type { CompiledSystem } from '../system/contract';
import { createMethod, methodSetting } from './choose-method';
import { INTEGRATION_DEFAULTS, type IntegrationOptions, type IntegrationStatus } from './contract';
import { chooseInitialStep } from './initial-step';

/** Attempted steps in one call of the core: some tenths of a millisecond for small systems. */
const STEPS_PER_CALL = 256;
/** Steps of the first call: a long one into cold code would run in the slow tier to its end. */
const FIRST_CALL = 32;
/** Outputs after which others are let through, too. */
const OUTPUTS_PER_SLICE = 8 * OUTPUT_WINDOW;
const LOG_FLOOR = Math.log(1e-4);

export interface NativeOutcome {
  /** `stiff` where another method should take over from `time` and `state`. */
  readonly status: IntegrationStatus | 'stiff';
  readonly time: number;
  readonly state: Float64Array;
  readonly step: number;
  readonly steps: number;
  readonly rejected: number;
  readonly evaluations: number;
}

/**
 * Integrates with an explicit pair in the compiled core, writing the states at `times` one after the other to
 * `take`. The same method, control and dense output as `Stepper` with `ExplicitRungeKutta`. A generator that
 * yields between calls of the core; what another run leaves in the core's memory does not matter.
 */
export function* runInCore(
  system: CompiledSystem,
  native: NativeSystem,
  start: Float64Array,
  times: Float64Array,
  options: IntegrationOptions,
  take: (state: Float64Array) => void,
): Generator<Progress<never>, NativeOutcome> {
  const n = system.dimension;
  const setting = methodSetting(system, options);
  const auto = (options.method ?? 'auto') === 'auto';
  const method = createMethod(auto ? 'auto' : (options.method as 'dormand-prince-54'), setting);
  const advance = method.order === 8 ? native.core.advance853 : native.core.advance54;
  const end = times[times.length - 1];
  const run = new CoreRun(native, n);
  const slope = new Float64Array(n);
  system.rhs(times[0], start, slope);
  let evaluations = 1;
  const outcome = (status: NativeOutcome['status']): NativeOutcome => ({
    status,
    time: run.control[CONTROL.time],
    state: run.state.slice(),
    step: run.control[CONTROL.step],
    steps: run.control[CONTROL.steps],
    rejected: run.control[CONTROL.rejected],
    evaluations: evaluations + run.control[CONTROL.evaluations],
  });
  take(start);
  run.state.set(start.subarray(0, n));
  run.slope.set(slope);
  run.control[CONTROL.time] = times[0];
  if (!slope.every(Number.isFinite) || !run.state.every(Number.isFinite)) return outcome('not-finite');
  const span = end - times[0];
  if (span !== 0) {
    run.control[CONTROL.step] = options.initialStep
      ? Math.sign(span) * Math.min(Math.abs(options.initialStep), Math.abs(span))
      : chooseInitialStep(setting, times[0], run.state, slope, span, method.order);
    evaluations += options.initialStep ? 0 : 1;
  }
  run.control[CONTROL.lastLogError] = LOG_FLOOR;
  run.control[CONTROL.relativeTolerance] = setting.relativeTolerance;
  run.control[CONTROL.absoluteTolerance] = setting.absoluteTolerance;
  run.control[CONTROL.end] = end;
  run.control[CONTROL.span] = span;
  const budget = options.maximumSteps ?? INTEGRATION_DEFAULTS.maximumSteps;
  let filled = 1;
  let calls = 0;
  let outputs = 0;
  while (filled < times.length) {
    const spent = run.control[CONTROL.steps] + run.control[CONTROL.rejected];
    if (spent >= budget) return outcome('steps-spent');
    const window = times.subarray(filled, Math.min(filled + OUTPUT_WINDOW, times.length));
    const most = Math.min(calls === 0 ? FIRST_CALL : STEPS_PER_CALL, budget - spent);
    calls += 1;
    const code = run.call(advance, window, most, auto);
    const got = run.control[CONTROL.filled];
    for (let k = 0; k < got; k += 1) take(run.output(k));
    filled += got;
    if (filled === times.length) break;
    if (code === ADVANCE.notFinite) return outcome('not-finite');
    if (code === ADVANCE.stepTooSmall) return outcome('step-too-small');
    if (code === ADVANCE.stiff) return outcome('stiff');
    if (code === ADVANCE.reachedEnd && got === 0) throw new Error('Output times must be monotone.');
    outputs += got;
    run.continues = isWithin(times[filled], run.control[CONTROL.time], span);
    if (run.continues) continue;
    if (code === ADVANCE.sliceSpent || outputs >= OUTPUTS_PER_SLICE) {
      outputs = 0;
      const fraction = (run.control[CONTROL.time] - times[0]) / span;
      yield { fraction, stage: 'Integrating', partial: null };
    }
  }
  return outcome('complete');
}

/** Whether a time that is wanted next lies within the step already made, whose data are still in the core. */
function isWithin(wanted: number, time: number, span: number): boolean {
  return span >= 0 ? wanted <= time : wanted >= time;
}

/** State of one run, kept outside the core between calls. */
class CoreRun {
  readonly control = new Float64Array(CONTROL.length);
  readonly state: Float64Array;
  readonly slope: Float64Array;
  /** True where the next call follows the last one at once, so that the core still has all data of the step. */
  continues = false;
  private readonly controlAt: number;
  private readonly workAt: number;
  private readonly timesAt: number;
  private readonly outAt: number;

  constructor(
    private readonly native: NativeSystem,
    private readonly n: number,
  ) {
    this.state = new Float64Array(n);
    this.slope = new Float64Array(n);
    this.controlAt = native.free;
    this.timesAt = this.controlAt + CONTROL.length;
    this.outAt = this.timesAt + OUTPUT_WINDOW;
    this.workAt = this.outAt + OUTPUT_WINDOW * n;
  }

  call(
    advance: NativeSystem['core']['advance54'],
    times: Float64Array,
    maximumSteps: number,
    heedStiffness: boolean,
  ): number {
    const { native, n, control, state, slope, controlAt, workAt, timesAt, outAt } = this;
    const { view } = native;
    control[CONTROL.filled] = 0;
    if (!this.continues) {
      control[CONTROL.accepted] = 0;
      control[CONTROL.denseReady] = 0;
      view.set(state, workAt + n);
      view.set(slope, workAt + 5 * n);
    }
    view.set(control, controlAt);
    view.set(times, timesAt);
    const code = advance(
      n,
      controlAt * 8,
      workAt * 8,
      maximumSteps,
      timesAt * 8,
      times.length,
      outAt * 8,
      heedStiffness ? 1 : 0,
    );
    control.set(view.subarray(controlAt, controlAt + CONTROL.length));
    slope.set(view.subarray(workAt, workAt + n));
    state.set(view.subarray(workAt + n, workAt + 2 * n));
    return code;
  }

  output(k: number): Float64Array {
    const from = this.outAt + k * this.n;
    return this.native.view.subarray(from, from + this.n);
  }
}
