import type { Progress } from '../continuation/contract';
import type { CompiledSystem } from '../system/contract';
import { createStepper, takeOverIfStiff } from './choose-method';
import {
  INTEGRATION_DEFAULTS,
  INTEGRATION_MESSAGES,
  type IntegrationOptions,
  type IntegrationStatus,
} from './contract';
import { rootInStep } from './root-in-step';

/** A scalar function along the solution whose zeros are wanted. */
export interface EventFunction {
  value(t: number, u: Float64Array): number;
  /** 1: only where it rises through zero in the direction of the run, -1: falls, 0: both. */
  readonly direction: 1 | -1 | 0;
}

export interface EventRequest extends IntegrationOptions {
  /** Ends the run after so many events. */
  readonly maximumEvents?: number;
  /** Looks within each step, evenly spaced, so that two crossings in one step are not missed. */
  readonly looksPerStep?: number;
}

export interface EventRun {
  /** `event` where the wanted number was found before the end. */
  readonly status: IntegrationStatus;
  readonly message: string;
  readonly times: Float64Array;
  /** states[k*n + i] at the events. */
  readonly states: Float64Array;
  readonly dimension: number;
  /** Where the run ended. */
  readonly endTime: number;
  readonly endState: Float64Array;
}

export const EVENT_DEFAULTS = { maximumEvents: Infinity, looksPerStep: 3 } as const;

const STEPS_PER_SLICE = 256;

/** A section through a level of one state. */
export function levelSection(state: number, level: number, direction: 1 | -1 | 0): EventFunction {
  return { value: (_t, u) => u[state] - level, direction };
}

/** Extremes of one state: where its slope vanishes. Highest points for -1, lowest for 1. */
export function extremesOf(system: CompiledSystem, state: number, direction: 1 | -1 | 0): EventFunction {
  const slope = new Float64Array(system.dimension);
  return {
    value(t, u) {
      system.rhs(t, u, slope);
      return slope[state];
    },
    direction,
  };
}

/**
 * Integrates from t0 to t1 and locates the zeros of an event function on the dense output of each
 * step, to rounding of the interpolant. The start itself is no event. A generator that yields between
 * slices of steps.
 */
export function* locateEvents(
  system: CompiledSystem,
  start: Float64Array,
  span: readonly [number, number],
  event: EventFunction,
  request: EventRequest = {},
): Generator<Progress<never>, EventRun> {
  const [from, end] = span;
  const most = request.maximumEvents ?? EVENT_DEFAULTS.maximumEvents;
  const looks = request.looksPerStep ?? EVENT_DEFAULTS.looksPerStep;
  const budget = request.maximumSteps ?? INTEGRATION_DEFAULTS.maximumSteps;
  const u = start.slice(0, system.dimension);
  const times: number[] = [];
  const states: number[] = [];
  let stepper = createStepper(system, request);
  stepper.begin(from, start, end - from, request.initialStep);
  let last = event.value(from, u);
  let status: IntegrationStatus = 'complete';
  while (stepper.time !== end) {
    if (stepper.steps + stepper.rejected >= budget) {
      status = 'steps-spent';
      break;
    }
    const outcome = stepper.advance(end);
    if (outcome !== 'stepped') {
      status = outcome;
      break;
    }
    const t0 = stepper.previousTime;
    const h = stepper.time - t0;
    let before = last;
    for (let look = 1; look <= looks && times.length < most; look += 1) {
      const theta = look / looks;
      const t = look === looks ? stepper.time : t0 + theta * h;
      stepper.interpolate(t, u);
      const value = event.value(t, u);
      if (crosses(before, value, event.direction)) {
        const base = (look - 1) / looks;
        const at = (share: number): number => t0 + (base + share / looks) * h;
        const share = rootInStep(
          (s) => {
            stepper.interpolate(at(s), u);
            return event.value(at(s), u);
          },
          before,
          value,
        );
        stepper.interpolate(at(share), u);
        times.push(at(share));
        states.push(...u);
      }
      // A zero hit exactly keeps the sign from which it was reached, so that it is counted once.
      if (value !== 0) before = value;
    }
    last = before;
    if (times.length >= most) {
      status = 'event';
      break;
    }
    if (stepper.steps % STEPS_PER_SLICE === 0)
      yield { fraction: (stepper.time - from) / (end - from), stage: 'Looking for events', partial: null };
    stepper = takeOverIfStiff(stepper, system, end, request);
  }
  return {
    status,
    message: INTEGRATION_MESSAGES[status],
    times: Float64Array.from(times),
    states: Float64Array.from(states),
    dimension: system.dimension,
    endTime: stepper.time,
    endState: stepper.state.slice(),
  };
}

function crosses(before: number, after: number, direction: 1 | -1 | 0): boolean {
  if (before < 0 && after > 0) return direction >= 0;
  if (before > 0 && after < 0) return direction <= 0;
  return false;
}

/** Runs `locateEvents` to its end. */
export function findEvents(...request: Parameters<typeof locateEvents>): EventRun {
  const run = locateEvents(...request);
  for (;;) {
    const next = run.next();
    if (next.done) return next.value;
  }
}
