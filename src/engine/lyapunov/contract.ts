/** Shared shapes of long-run behaviour: Lyapunov exponents, sections, long-run extremes along a parameter. */
import type { IntegrationStatus } from '../integrators/contract';

export interface LyapunovResult {
  readonly status: IntegrationStatus;
  readonly message: string;
  /** Exponents per time unit, falling. */
  readonly exponents: Float64Array;
  /** Half-width of a 95 % interval by batch means. */
  readonly uncertainty: Float64Array;
  /** Sum of exponents minus the mean divergence along the trajectory; what the sum is worth. */
  readonly traceError: number;
  /** Kaplan-Yorke dimension; null where it has no meaning. */
  readonly dimension: number | null;
  /** In words: rest, cycle, torus, chaos, hyperchaos or undecided. */
  readonly reading: string;
  /** Running estimates, for the convergence plot: times[k], running[k*n + i]. */
  readonly times: Float64Array;
  readonly running: Float64Array;
  readonly finalState: Float64Array;
}

export interface SectionResult {
  readonly status: IntegrationStatus;
  readonly message: string;
  readonly times: Float64Array;
  /** states[k*n + i] at each crossing. */
  readonly states: Float64Array;
  readonly dimension: number;
}

/** Long-run lowest, highest and turning values at each value of a parameter, followed in one direction. */
export interface ExtremesSweep {
  readonly direction: 'upward' | 'downward';
  readonly parameters: Float64Array;
  readonly quantities: readonly string[];
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  /** Local maxima of the observed quantity: maxima[maximaStart[k] .. maximaStart[k+1]-1]. */
  readonly maxima: Float64Array;
  readonly maximaStart: Uint32Array;
  readonly settled: Uint8Array;
}

export interface ExtremesResult {
  readonly status: 'complete' | 'cancelled' | 'failed';
  readonly message: string;
  readonly parameterKey: string;
  readonly from: number;
  readonly to: number;
  readonly observed: string;
  readonly sweeps: readonly ExtremesSweep[];
  /** Stretches of the parameter where upward and downward differ. */
  readonly hysteresis: readonly { readonly from: number; readonly to: number }[];
  readonly milliseconds: number;
}
