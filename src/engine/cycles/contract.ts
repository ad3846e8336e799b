/** Shared shapes of cycles: branches of periodic solutions along one parameter, and their special points. */
import type { BranchEnd } from '../continuation/contract';
import type { Eigenvalue } from '../equilibria/contract';

export type CycleSpecialKind = 'fold of cycles' | 'period doubling' | 'torus' | 'branch point of cycles';

/** Where a branch of cycles comes from. */
export type CycleOrigin =
  | { readonly kind: 'Hopf'; readonly parameter: number; readonly specialPoint: string | null }
  | { readonly kind: 'trajectory'; readonly parameter: number }
  | { readonly kind: 'period map'; readonly parameter: number }
  | { readonly kind: 'period doubling'; readonly parameter: number; readonly specialPoint: string }
  | { readonly kind: 'branch point of cycles'; readonly parameter: number; readonly specialPoint: string };

export interface CycleSpecialPoint {
  readonly id: string;
  readonly kind: CycleSpecialKind;
  readonly parameter: number;
  readonly period: number;
  readonly multipliers: readonly Eigenvalue[];
  /** Index of the branch it lies on, and of the point just before it. */
  readonly branch: number;
  readonly index: number;
  /** Bound on the error of `parameter` relative to the swept range. */
  readonly accuracy: number;
  readonly feasible: boolean;
  /** Lowest and highest value of each quantity of the branch. */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  /** For a torus: angle of the pair of multipliers, in (0, pi). */
  readonly angle: number | null;
  /** One sentence in plain words. */
  readonly meaning: string;
}

export type CycleBranchEnd =
  | BranchEnd
  | 'shrank to a Hopf point'
  | 'approaches a homoclinic orbit'
  | 'approaches a heteroclinic cycle'
  | 'joined the cycle it doubled from';

/**
 * One branch of cycles, in order along its arc. With n states, m quantities (n states, then the total of
 * each population of several classes) and K points.
 */
export interface CycleBranch {
  readonly origin: CycleOrigin;
  readonly dimension: number;
  readonly parameters: Float64Array;
  readonly periods: Float64Array;
  readonly quantities: readonly string[];
  /** lowest[k*m + i], highest, mean over one period. */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  readonly mean: Float64Array;
  /** multipliers[(k*n + j)*2 + (0 re | 1 im)], ordered by falling modulus, the trivial one (if any) first. */
  readonly multipliers: Float64Array;
  /** |trivial multiplier - 1|: what the collocation is worth there; 0 for a forced model, which has none. */
  readonly trivialError: Float64Array;
  /** 1 attracts, 0 repels, 2 undecided at this accuracy, at each point. */
  readonly attracts: Uint8Array;
  readonly feasible: Uint8Array;
  /** The cycles themselves: orbits[(k*S + s)*n + i] at the phase orbitPhases[k*S + s] in [0, 1], last = first. */
  readonly orbits: Float64Array;
  readonly orbitPhases: Float64Array;
  /** S, samples of each cycle, dense where it turns. */
  readonly orbitSamples: number;
  readonly startEnd: { readonly reason: CycleBranchEnd; readonly message: string };
  readonly endEnd: { readonly reason: CycleBranchEnd; readonly message: string };
}

export interface CyclesResult {
  readonly status: 'complete' | 'cancelled' | 'failed';
  readonly message: string;
  readonly parameterKey: string;
  readonly from: number;
  readonly to: number;
  readonly stateSymbols: readonly string[];
  /** Period of the forcing where the model has explicit time, at the document's own numbers; else null. */
  readonly forcingPeriod: number | null;
  readonly branches: readonly CycleBranch[];
  readonly specialPoints: readonly CycleSpecialPoint[];
  readonly points: number;
  readonly milliseconds: number;
}
