import { createStepper } from '../integrators/choose-method';
import { INTEGRATION_DEFAULTS, type IntegrationStatus } from '../integrators/contract';
import type { Stepper } from '../integrators/stepper';
import type { CompiledSystem } from '../system/contract';
import { initialColumns, orthonormalise } from './orthonormalise';
import { variationalSystem, type VariationalSystem } from './variational-system';

export interface TangentOptions {
  readonly count: number;
  readonly logarithms: boolean;
  readonly relativeTolerance?: number;
  readonly absoluteTolerance?: number;
  readonly maximumSteps?: number;
}

export const TANGENT_DEFAULTS = {
  /** A stretch ends once logarithms of growth lie so far apart: well before directions merge in rounding. */
  stretch: 5,
  /** Steps of a stretch without displacements. */
  stepsAlone: 8,
  stepsPerSlice: 64,
} as const;

/**
 * Follows a solution and m orthonormal displacements from it, made orthonormal again after stretches of
 * time that end when they are drawn apart. `logs` and `divergence` hold the growth over the last
 * stretch. Everything is allocated at construction.
 */
export class TangentFlow {
  time: number;
  readonly state: Float64Array;
  /** log R_jj of the last stretch, in the order of the displacements. */
  readonly logs: Float64Array;
  /** Integral of the divergence over the last stretch. */
  divergence = 0;
  private readonly columns: Float64Array;
  private readonly trial: Float64Array;
  private readonly packed: Float64Array;
  private readonly variational: VariationalSystem;
  private readonly stepper: Stepper;
  private readonly budget: number;
  private readonly n: number;
  private readonly m: number;
  private lastStep = 0;

  constructor(system: CompiledSystem, start: Float64Array, startTime: number, options: TangentOptions) {
    this.n = system.dimension;
    this.m = options.count;
    this.time = startTime;
    this.state = start.slice(0, this.n);
    this.logs = new Float64Array(this.m);
    this.columns = initialColumns(this.n, this.m);
    this.trial = new Float64Array(this.columns.length);
    const relativeTolerance = options.relativeTolerance ?? INTEGRATION_DEFAULTS.relativeTolerance;
    // An absolute error of a logarithm is a relative error of the state.
    const absoluteTolerance = options.logarithms
      ? relativeTolerance
      : (options.absoluteTolerance ?? INTEGRATION_DEFAULTS.absoluteTolerance);
    const tolerances = { relativeTolerance, absoluteTolerance };
    this.variational = variationalSystem(system, start, { ...options, ...tolerances });
    this.packed = new Float64Array(this.variational.system.dimension);
    this.stepper = createStepper(this.variational.system, tolerances);
    this.budget = options.maximumSteps ?? INTEGRATION_DEFAULTS.maximumSteps;
  }

  /** Steps so far, rejected ones included. */
  get steps(): number {
    return this.stepper.steps + this.stepper.rejected;
  }

  /**
   * Goes on for one stretch, at most to `end`, in slices of steps. On anything but `complete` the state is
   * the last one reached and the growth of the broken stretch is left out of account.
   */
  *advance(end: number): Generator<void, IntegrationStatus> {
    const { stepper, variational, trial } = this;
    const began = this.time;
    variational.pack(this.state, this.columns, this.packed);
    stepper.begin(began, this.packed, end - began, this.lastStep || undefined);
    const stepsBefore = this.steps;
    let parted = false;
    while (stepper.time < end && !parted) {
      if (this.steps >= this.budget) return 'steps-spent';
      const outcome = stepper.advance(end);
      if (outcome !== 'stepped') {
        variational.unpack(stepper.state, this.state, this.columns);
        this.time = stepper.time;
        return outcome;
      }
      // A step cut short by the end says nothing of the step that the method would take.
      if (stepper.time < end || this.lastStep === 0) this.lastStep = stepper.time - stepper.previousTime;
      if (this.m === 0) parted = this.steps - stepsBefore >= TANGENT_DEFAULTS.stepsAlone;
      else {
        variational.unpack(stepper.state, this.state, trial);
        parted =
          !orthonormalise(trial, this.n, this.m, this.logs) || this.spread() > TANGENT_DEFAULTS.stretch;
      }
      if (stepper.steps % TANGENT_DEFAULTS.stepsPerSlice === 0) yield;
    }
    this.time = stepper.time;
    this.divergence = variational.unpack(stepper.state, this.state, this.columns);
    orthonormalise(this.columns, this.n, this.m, this.logs);
    return this.logs.some(Number.isNaN) ? 'not-finite' : 'complete';
  }

  /** How far the logarithms of growth lie apart, from each other and from none. */
  private spread(): number {
    let low = 0;
    let high = 0;
    for (const log of this.logs) {
      if (log < low) low = log;
      if (log > high) high = log;
    }
    return high - low;
  }
}
