import type { Progress } from '../continuation/contract';
import type { CompiledSystem } from '../system/contract';
import { INTEGRATION_DEFAULTS, type IntegrationOptions } from './contract';
import { levelSection, locateEvents } from './events';
import { createStepper } from './choose-method';
import { ExtremesTracker } from './extremes';

export interface PeriodRequest extends IntegrationOptions {
  /** Time run before anything is measured. */
  readonly transient: number;
  /** Time in which the range of each state is looked at, to lay the section through its middle. */
  readonly window: number;
  /** Time in which returns to the section are waited for. */
  readonly maximumTime: number;
  /** Returns agree when they differ by less than this share of the range of each state. */
  readonly returnTolerance?: number;
}

export interface PeriodOutcome {
  /** Null where none was found; `message` says why. */
  readonly period: number | null;
  /** Crossings of the section in one period: 2 after one period doubling. */
  readonly crossings: number;
  readonly message: string;
  /** State on the section, at the last crossing. */
  readonly state: Float64Array | null;
}

export const PERIOD_DEFAULTS = { returnTolerance: 1e-6, longestPattern: 16, flat: 1e-6 } as const;

/**
 * Period of the cycle that a trajectory settles to, from its returns to a section through the middle of
 * the state that varies most. A return is to the same point of the section, so that a doubled period is
 * told from a single one. A generator, to be driven in slices; parameters are those set on the system.
 */
export function* detectPeriod(
  system: CompiledSystem,
  start: Float64Array,
  request: PeriodRequest,
): Generator<Progress<never>, PeriodOutcome> {
  const none = (message: string): PeriodOutcome => ({ period: null, crossings: 0, message, state: null });
  const n = system.dimension;
  const settled = yield* locateEvents(system, start, [0, request.transient], NOTHING, request);
  if (settled.status !== 'complete') return none(settled.message);
  const tracker = new ExtremesTracker(system);
  const stepper = createStepper(system, request);
  const end = settled.endTime + request.window;
  stepper.begin(settled.endTime, settled.endState, request.window);
  tracker.reset(stepper);
  while (stepper.time < end) {
    if (stepper.advance(end) !== 'stepped') return none('The trajectory could not be followed.');
    tracker.note(stepper);
  }
  const range = Float64Array.from({ length: n }, (_, i) => tracker.highest[i] - tracker.lowest[i]);
  const pivot = mostVariable(range, tracker.highest, n);
  const size = Math.max(Math.abs(tracker.highest[pivot]), Math.abs(tracker.lowest[pivot]));
  const noise = 100 * (request.absoluteTolerance ?? INTEGRATION_DEFAULTS.absoluteTolerance);
  if (range[pivot] <= PERIOD_DEFAULTS.flat * size + noise) return none('The trajectory rests.');
  const level = (tracker.highest[pivot] + tracker.lowest[pivot]) / 2;
  const run = yield* locateEvents(
    system,
    stepper.state.slice(),
    [stepper.time, stepper.time + request.maximumTime],
    levelSection(pivot, level, 1),
    { ...request, maximumEvents: 3 * PERIOD_DEFAULTS.longestPattern },
  );
  const tolerance = request.returnTolerance ?? PERIOD_DEFAULTS.returnTolerance;
  const count = run.times.length;
  const last = count - 1;
  for (let lag = 1; lag <= PERIOD_DEFAULTS.longestPattern && 2 * lag < count; lag += 1) {
    const same = (back: number): boolean =>
      range.every((width, i) => {
        const a = run.states[(last - back) * n + i];
        const b = run.states[(last - back - lag) * n + i];
        return Math.abs(a - b) <= tolerance * width + noise + Number.EPSILON * 100 * Math.abs(a);
      });
    if (same(0) && same(lag)) {
      const message = lag === 1 ? 'A cycle.' : `A cycle that closes after ${lag} turns.`;
      return {
        period: run.times[last] - run.times[last - lag],
        crossings: lag,
        message,
        state: run.states.slice(last * n),
      };
    }
  }
  return none(
    count < 3
      ? 'The trajectory did not return to its middle often enough in the time given.'
      : 'The returns had not settled to a repeating pattern in the time given.',
  );
}

const NOTHING = { value: () => 1, direction: 0 } as const;

function mostVariable(range: Float64Array, highest: Float64Array, n: number): number {
  let best = 0;
  let most = -1;
  for (let i = 0; i < n; i += 1) {
    const share = range[i] / Math.max(Math.abs(highest[i]), 1e-12 + range[i]);
    if (share > most) {
      most = share;
      best = i;
    }
  }
  return best;
}
