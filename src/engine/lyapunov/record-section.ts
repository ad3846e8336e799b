import type { Progress } from '../continuation/contract';
import { INTEGRATION_MESSAGES, type IntegrationStatus } from '../integrators/contract';
import { rootInStep } from '../integrators/root-in-step';
import type { CompiledSystem } from '../system/contract';
import type { SectionResult } from './contract';
import { sumOf, type Quantity } from './quantities';
import { ScaledWalk, type StepObserver, type WalkOptions, type WalkStatus } from './scaled-walk';

export interface SectionRequest extends WalkOptions {
  readonly quantity: Quantity;
  readonly value: number;
  readonly direction: 'rising' | 'falling' | 'both';
  /** Time before crossings count. */
  readonly transient: number;
  /** Crossings wanted. */
  readonly crossings: number;
  /** Time after the transient at which the run ends even with fewer. */
  readonly maximumTime: number;
}

export const SECTION_DEFAULTS = {
  relativeTolerance: 1e-10,
  maximumSteps: 5_000_000,
  /** Looks within each step, so that two crossings in one step are not missed. */
  looksPerStep: 4,
  /** Parts of the run between two looks whether enough crossings were found. */
  parts: 400,
} as const;

/**
 * Crossings of a class or a population's total through a value (a section of Poincare): times and states, each
 * located on the dense output of the step to the rounding of the interpolant. `complete` where all wanted were found or
 * the time ended with fewer; the message says which.
 */
export function* recordSection(
  system: CompiledSystem,
  start: Float64Array,
  request: SectionRequest,
): Generator<Progress<SectionResult>, SectionResult> {
  const { transient, maximumTime, crossings } = request;
  const walk = new ScaledWalk(system, start, { ...SECTION_DEFAULTS, ...request });
  const recorder = new CrossingRecorder(walk, request);
  const begin = walk.time + transient;
  const progress = (): Progress<SectionResult> => ({
    fraction: Math.max(recorder.times.length / crossings, (walk.time - begin) / maximumTime, 0),
    stage: 'Recording crossings',
    partial: recorder.result(system, 'cancelled', INTEGRATION_MESSAGES.cancelled),
  });
  const advance = function* (
    to: number,
    observers: readonly StepObserver[],
  ): Generator<Progress<SectionResult>, WalkStatus> {
    const run = walk.to(to, observers);
    let step = run.next();
    while (!step.done) {
      yield progress();
      step = run.next();
    }
    return step.value;
  };
  let status = yield* advance(begin, []);
  for (let part = 1; part <= SECTION_DEFAULTS.parts && status === 'complete' && !recorder.full; part += 1)
    status = yield* advance(begin + (maximumTime * part) / SECTION_DEFAULTS.parts, [recorder]);
  const counted = recorder.times.length === 1 ? '1 crossing' : `${recorder.times.length} crossings`;
  if (recorder.full) return recorder.result(system, 'complete', `Recorded ${counted}.`);
  const few = `Recorded ${counted} of ${crossings}.`;
  if (status === 'complete')
    return recorder.result(
      system,
      'complete',
      `${few} In ${maximumTime} time units there were no more; another value lies nearer to the middle of what it crosses.`,
    );
  if (status === 'unbounded')
    return recorder.result(system, 'not-finite', `${few} The solution grows without bound.`);
  return recorder.result(system, status, `${few} ${INTEGRATION_MESSAGES[status]}`);
}

class CrossingRecorder implements StepObserver {
  readonly times: number[] = [];
  private readonly states: number[] = [];
  private readonly u: Float64Array;
  private before = Number.NaN;

  constructor(
    walk: ScaledWalk,
    private readonly request: SectionRequest,
  ) {
    this.u = new Float64Array(walk.system.dimension);
  }

  get full(): boolean {
    return this.times.length >= this.request.crossings;
  }

  note(walk: ScaledWalk): void {
    const { looksPerStep } = SECTION_DEFAULTS;
    const t0 = walk.stepper.previousTime;
    const h = (walk.stepper.time - t0) / looksPerStep;
    if (Number.isNaN(this.before)) this.before = this.gap(walk, t0);
    for (let look = 1; look <= looksPerStep && !this.full; look += 1) {
      const from = t0 + (look - 1) * h;
      const value = this.gap(walk, look === looksPerStep ? walk.stepper.time : from + h);
      if (this.crosses(this.before, value)) {
        const share = rootInStep((part) => this.gap(walk, from + part * h), this.before, value);
        this.gap(walk, from + share * h);
        this.times.push(from + share * h);
        this.states.push(...this.u);
      }
      // A zero hit exactly keeps the sign from which it was reached, so that it is counted once.
      if (value !== 0) this.before = value;
    }
  }

  result(system: CompiledSystem, status: IntegrationStatus, message: string): SectionResult {
    return {
      status,
      message,
      times: Float64Array.from(this.times),
      states: Float64Array.from(this.states),
      dimension: system.dimension,
    };
  }

  /** Leaves the state in `u`. */
  private gap(walk: ScaledWalk, t: number): number {
    walk.at(t, this.u);
    return sumOf(this.request.quantity.states, this.u) - this.request.value;
  }

  private crosses(before: number, after: number): boolean {
    const { direction } = this.request;
    if (before < 0 && after >= 0) return direction !== 'falling';
    return before > 0 && after <= 0 && direction !== 'rising';
  }
}
