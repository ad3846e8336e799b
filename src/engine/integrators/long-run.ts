import type { Progress } from '../continuation/contract';
import { createEigenWorkspace, eigenvaluesInto } from '../linalg/eigenvalues';
import type { CompiledSystem } from '../system/contract';
import { createStepper, takeOverIfStiff } from './choose-method';
import { INTEGRATION_DEFAULTS, INTEGRATION_MESSAGES, type IntegrationOptions } from './contract';
import { ExtremesTracker } from './extremes';
import type { Stepper } from './stepper';

export interface LongRunRequest extends IntegrationOptions {
  /** Time before anything is measured. */
  readonly transient: number;
  /** Length of one measuring window: should hold at least one period; doubled while nothing settles. */
  readonly window: number;
  /** Time after the transient after which the last window is all that is said. */
  readonly maximumTime: number;
  /** Two windows in a row agree when their extremes differ by less than this share of their range. */
  readonly settledTolerance?: number;
}

export interface LongRun {
  readonly status: 'settled' | 'not-settled' | 'stopped' | 'cancelled';
  /** What the long run is, as far as it can be told from its range. */
  readonly kind: 'equilibrium' | 'repeating range' | 'unknown';
  readonly message: string;
  readonly settled: boolean;
  /** Over n states, then population totals, in the last window. */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  /** State at the end: a good start for the next value of a parameter. */
  readonly state: Float64Array;
  readonly time: number;
}

export const LONG_RUN_DEFAULTS = {
  settledTolerance: 1e-3,
  /** A range below this share of the size of a quantity is none. */
  flat: 1e-7,
  stepsPerSlice: 128,
} as const;

/**
 * Lowest and highest values in the long run: a transient, then windows until two in a row have the
 * same extremes. A flat range counts as an equilibrium only where the Jacobian says that it attracts,
 * so that slow passages by a saddle are not mistaken for rest. A generator, to be driven in slices.
 * The parameters are those set on the system.
 */
export function* longRunExtremes(
  system: CompiledSystem,
  start: Float64Array,
  request: LongRunRequest,
): Generator<Progress<never>, LongRun> {
  const tolerance = request.settledTolerance ?? LONG_RUN_DEFAULTS.settledTolerance;
  const end = request.transient + request.maximumTime;
  const walk = new Walk(system, start, end, request);
  const tracker = new ExtremesTracker(system);
  tracker.reset(walk.stepper);
  if (request.transient > 0) yield* walk.to(request.transient);
  let window = request.window;
  let before: { lowest: Float64Array; highest: Float64Array } | null = null;
  while (!walk.failure) {
    tracker.reset(walk.stepper);
    yield* walk.to(Math.min(walk.stepper.time + window, end), tracker);
    if (walk.failure) break;
    const range = { lowest: tracker.lowest.slice(), highest: tracker.highest.slice() };
    if (isFlat(range) && attracts(system, walk.stepper))
      return report('settled', 'equilibrium', 'Settled to an equilibrium.', range, walk.stepper);
    if (before && !isFlat(range) && agree(before, range, tolerance))
      return report('settled', 'repeating range', 'Settled to a repeating range.', range, walk.stepper);
    if (walk.stepper.time >= end) return report('not-settled', 'unknown', NOT_SETTLED, range, walk.stepper);
    // Windows of different length are compared with care: the longer one must not have grown.
    before = range;
    window = Math.min(window * 1.5, end - walk.stepper.time);
  }
  return report('stopped', 'unknown', walk.failure ?? NOT_SETTLED, tracker, walk.stepper);
}

const NOT_SETTLED =
  'Had not settled to a repeating range in the time given; the range is only what was seen last.';

/** Advances a stepper to given times, in slices, with the switch to the stiff method. */
class Walk {
  stepper: Stepper;
  failure: string | null = null;
  private readonly budget: number;

  constructor(
    private readonly system: CompiledSystem,
    start: Float64Array,
    private readonly end: number,
    private readonly options: IntegrationOptions,
  ) {
    this.stepper = createStepper(system, options);
    this.stepper.begin(0, start, end, options.initialStep);
    this.budget = options.maximumSteps ?? INTEGRATION_DEFAULTS.maximumSteps;
  }

  *to(time: number, tracker?: ExtremesTracker): Generator<Progress<never>, void> {
    while (this.stepper.time < time) {
      if (this.stepper.steps + this.stepper.rejected >= this.budget) {
        this.failure = INTEGRATION_MESSAGES['steps-spent'];
        return;
      }
      const outcome = this.stepper.advance(time);
      if (outcome !== 'stepped') {
        this.failure = INTEGRATION_MESSAGES[outcome];
        return;
      }
      tracker?.note(this.stepper);
      if (this.stepper.steps % LONG_RUN_DEFAULTS.stepsPerSlice === 0)
        yield { fraction: this.stepper.time / this.end, stage: 'Following the long run', partial: null };
      this.stepper = takeOverIfStiff(this.stepper, this.system, this.end, this.options);
    }
  }
}

interface Range {
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
}

function isFlat({ lowest, highest }: Range): boolean {
  return lowest.every((low, q) => {
    const size = Math.max(Math.abs(low), Math.abs(highest[q]), 1e-9);
    return highest[q] - low <= LONG_RUN_DEFAULTS.flat * size;
  });
}

/** Extremes alike within a share of the range; quantities that hardly move count by their size. */
function agree(a: Range, b: Range, tolerance: number): boolean {
  return a.lowest.every((low, q) => {
    const range = Math.max(a.highest[q], b.highest[q]) - Math.min(low, b.lowest[q]);
    const size = Math.max(Math.abs(a.highest[q]), Math.abs(b.highest[q]));
    const slack = tolerance * range + LONG_RUN_DEFAULTS.flat * size;
    return Math.abs(low - b.lowest[q]) <= slack && Math.abs(a.highest[q] - b.highest[q]) <= slack;
  });
}

function attracts(system: CompiledSystem, stepper: Stepper): boolean {
  const n = system.dimension;
  const J = new Float64Array(n * n);
  const re = new Float64Array(n);
  const im = new Float64Array(n);
  system.jacobian(stepper.time, stepper.state, J);
  // Where no Jacobian exists nothing is claimed.
  return eigenvaluesInto(J, createEigenWorkspace(n), re, im) && re[0] < 0;
}

function report(
  status: LongRun['status'],
  kind: LongRun['kind'],
  message: string,
  range: Range,
  stepper: Stepper,
): LongRun {
  return {
    status,
    kind,
    message,
    settled: status === 'settled',
    lowest: range.lowest.slice(),
    highest: range.highest.slice(),
    state: stepper.state.slice(),
    time: stepper.time,
  };
}
