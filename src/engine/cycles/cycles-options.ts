import type { SpecialPoint } from '../continuation/contract';

export interface CyclesOptions {
  readonly parameterIndex: number;
  readonly from: number;
  readonly to: number;
  /** A model with explicit time begins from its period map in either case. */
  readonly beginFrom: 'Hopf points' | 'trajectory';
  /** States to begin trajectories and searches from; the first is the start of the trajectory. */
  readonly starts: readonly Float64Array[];
  readonly box?: readonly ({ readonly from: number; readonly to: number } | null)[];
  readonly intervals?: number;
  readonly collocationPoints?: number;
  /** Whether meshes are refined where the discretisation asks for it; true unless told. */
  readonly refine?: boolean;
  /** Cycles along one branch. */
  readonly maximumPoints?: number;
  readonly doublings?: number;
  /** Periods of the forcing that make one cycle. */
  readonly forcingPeriods?: number;
  /** Hopf points of a sweep already made over the range; else one is made. */
  readonly hopfPoints?: readonly SpecialPoint[];
  /** Time over which the model is usually looked at; sets how long a trajectory is given to settle. */
  readonly horizon?: number;
  /** What the parameter is called in sentences. */
  readonly parameterLabel?: string;
  /** Clock for the time told in the result, in milliseconds; without one it is 0. */
  readonly clock?: () => number;
}

export const CYCLES_DEFAULTS = {
  intervals: 40,
  collocationPoints: 4,
  maximumPoints: 400,
  doublings: 1,
  forcingPeriods: 1,
  horizon: 200,
  branchBudget: 24,
} as const;
