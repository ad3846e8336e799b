import { createStepper, takeOverIfStiff } from '../integrators/choose-method';
import { INTEGRATION_DEFAULTS, type IntegrationStatus } from '../integrators/contract';
import { logScaleSystem, type LogScaledSystem } from '../integrators/log-scale';
import type { Stepper } from '../integrators/stepper';
import type { CompiledSystem } from '../system/contract';

export interface WalkOptions {
  readonly startTime?: number;
  readonly relativeTolerance?: number;
  readonly maximumSteps?: number;
}

export const WALK_DEFAULTS = {
  relativeTolerance: 1e-8,
  /** A state this many times the largest start value has left every bound that matters. */
  unbounded: 1e9,
  stepsPerSlice: 128,
} as const;

/** What a step is shown to; called after each accepted step. */
export interface StepObserver {
  note(walk: ScaledWalk): void;
}

export type WalkStatus = Exclude<IntegrationStatus, 'event' | 'cancelled'> | 'unbounded';

/**
 * Follows one solution for a long time with the nonnegative states as logarithms, so that densities of
 * 1e-30 keep their digits; states that start at zero stay as they are. Observers see each step.
 */
export class ScaledWalk {
  stepper: Stepper;
  readonly scaled: LogScaledSystem;
  /** State at the present time, in its own scale. */
  readonly state: Float64Array;
  /** Largest value of any state so far. */
  size: number;
  private readonly options: Required<Omit<WalkOptions, 'startTime'>> & { readonly absoluteTolerance: number };
  private readonly bound: number;
  private slice = 0;

  constructor(
    readonly system: CompiledSystem,
    start: Float64Array,
    options: WalkOptions = {},
  ) {
    const relativeTolerance = options.relativeTolerance ?? WALK_DEFAULTS.relativeTolerance;
    this.scaled = logScaleSystem(system, start);
    // An absolute error of a logarithm is a relative error of the state.
    const absoluteTolerance = this.scaled.logarithmic.some(Boolean)
      ? relativeTolerance
      : INTEGRATION_DEFAULTS.absoluteTolerance;
    const maximumSteps = options.maximumSteps ?? INTEGRATION_DEFAULTS.maximumSteps;
    this.options = { relativeTolerance, absoluteTolerance, maximumSteps };
    this.state = start.slice(0, system.dimension);
    this.size = Math.max(...this.state.map(Math.abs));
    this.bound = WALK_DEFAULTS.unbounded * Math.max(1, this.size);
    this.stepper = createStepper(this.scaled.system, this.options);
    this.begin(options.startTime ?? 0, start);
  }

  get time(): number {
    return this.stepper.time;
  }

  /** Goes on from another state, at a time; the steps spent stay spent. */
  begin(time: number, state: Float64Array): void {
    const first = new Float64Array(this.system.dimension);
    this.scaled.toScale(state, first);
    this.stepper.begin(time, first, Infinity);
    this.state.set(state.subarray(0, this.state.length));
  }

  /** State at a time within the last step, in its own scale. */
  at(time: number, out: Float64Array): void {
    this.stepper.interpolate(time, out);
    this.scaled.fromScale(out, out);
  }

  /** Goes on to a time, in slices of steps; says why where it does not arrive. */
  *to(end: number, observers: readonly StepObserver[] = []): Generator<void, WalkStatus> {
    while (this.stepper.time < end) {
      if (this.stepper.steps + this.stepper.rejected >= this.options.maximumSteps) return 'steps-spent';
      const outcome = this.stepper.advance(end);
      this.scaled.fromScale(this.stepper.state, this.state);
      for (const x of this.state) if (Math.abs(x) > this.size) this.size = Math.abs(x);
      if (this.size > this.bound) return 'unbounded';
      if (outcome !== 'stepped') return outcome;
      for (const observer of observers) observer.note(this);
      this.slice += 1;
      if (this.slice % WALK_DEFAULTS.stepsPerSlice === 0) yield;
      this.stepper = takeOverIfStiff(this.stepper, this.scaled.system, end, this.options);
    }
    return 'complete';
  }
}
