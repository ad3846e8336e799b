/** Shared shapes of the integrators: what a method is asked, and what it answers. */
import type { CompiledSystem } from '../system/contract';

export const INTEGRATION_DEFAULTS = {
  relativeTolerance: 1e-8,
  absoluteTolerance: 1e-12,
  /** Steps after which a run gives up, so that no formula can hold a worker for ever. */
  maximumSteps: 200_000,
} as const;

/**
 * `auto`: an explicit pair by tolerance, and the stiff method from where the system proves stiff.
 * `odex`: extrapolation, the independent second opinion.
 */
export type MethodName = 'auto' | 'dormand-prince-54' | 'dormand-prince-853' | 'rodas' | 'odex';

export interface IntegrationOptions {
  readonly method?: MethodName;
  /**
   * `log`: states that must stay nonnegative and start above zero are integrated as logarithms, so that
   * they stay positive and keep their relative accuracy at 1e-30.
   */
  readonly scale?: 'linear' | 'log';
  readonly relativeTolerance?: number;
  readonly absoluteTolerance?: number;
  readonly maximumSteps?: number;
  /** First step; chosen by the method when absent. */
  readonly initialStep?: number;
}

export type IntegrationStatus =
  'complete' | 'event' | 'not-finite' | 'step-too-small' | 'steps-spent' | 'cancelled';

/** A solution at given times; partial when status is not `complete`, with the reason in words. */
export interface Trajectory {
  readonly status: IntegrationStatus;
  readonly message: string;
  readonly times: Float64Array;
  /** states[k*n + i]: state i at times[k]. Length times.length * n. */
  readonly states: Float64Array;
  readonly dimension: number;
  readonly evaluations: number;
  readonly steps: number;
  readonly rejected: number;
}

/** A method: integrates from start at times[0] to every requested time (monotone, either direction). */
export type Integrate = (
  system: CompiledSystem,
  start: Float64Array,
  times: Float64Array,
  options?: IntegrationOptions,
) => Trajectory;

export const INTEGRATION_MESSAGES: Readonly<Record<IntegrationStatus, string>> = {
  complete: 'Reached the end of the time span.',
  event: 'Stopped at an event.',
  'not-finite': 'The solution left the finite numbers.',
  'step-too-small': 'The step became too small to go on; the system may be stiff or singular here.',
  'steps-spent': 'The step budget was spent before the end of the time span.',
  cancelled: 'Cancelled.',
};
