/** Shared shapes of sweeps: branches of equilibria along one parameter, and their special points. */
import type { Eigenvalue, EquilibriumType } from '../equilibria/contract';

export type SpecialPointKind =
  'fold' | 'Hopf' | 'transcritical' | 'pitchfork' | 'branch point' | 'neutral saddle';

export interface HopfForm {
  /** Imaginary part at the crossing; the period of the new cycle is 2 pi / omega. */
  readonly omega: number;
  /**
   * First Lyapunov coefficient with <q,q> = 1, <p,q> = 1, l1 = Re c1 / omega.
   * Null where the model has a kink there; the reason is in `meaning`.
   */
  readonly l1: number | null;
  readonly criticality: 'supercritical' | 'subcritical' | 'degenerate' | 'withheld';
  /** One sentence: what appears there. */
  readonly meaning: string;
  /** d Re(lambda) / d parameter at the point. */
  readonly crossingSpeed: number;
}

export interface SpecialPoint {
  readonly id: string;
  readonly kind: SpecialPointKind;
  readonly parameter: number;
  readonly state: Float64Array;
  readonly eigenvalues: readonly Eigenvalue[];
  /** Index of the branch it lies on, and of the point just before it. */
  readonly branch: number;
  readonly index: number;
  /** Bound on the error of `parameter` relative to the swept range. */
  readonly accuracy: number;
  readonly feasible: boolean;
  readonly hopf: HopfForm | null;
  /**
   * Quadratic coefficient of a fold, x' = a x^2 + ..., with the null vector in units of the scales of the states;
   * null elsewhere, and where the model has a kink and no second derivative. See `fold-normal-form.ts`.
   */
  readonly foldCoefficient: number | null;
  /** For a transcritical point: populations that can invade on one side. */
  readonly invades: readonly string[];
  /** One sentence in plain words. */
  readonly meaning: string;
}

export type BranchEnd =
  | 'left the range'
  | 'closed on itself'
  | 'left the state box'
  | 'could not be resolved further'
  | 'joined a branch already followed'
  | 'point budget spent'
  | 'not finite'
  | 'cancelled';

/** One branch, in order along its arc. Arrays have one entry (or n) a point. */
export interface Branch {
  readonly parameters: Float64Array;
  /** states[k*n + i]. */
  readonly states: Float64Array;
  readonly dimension: number;
  /** Largest real part of the eigenvalues at each point. */
  readonly leading: Float64Array;
  /** 1 attracts, 0 repels, 2 neutral or undecided, at each point. */
  readonly attracts: Uint8Array;
  readonly feasible: Uint8Array;
  /** Type in words at each point, as an index into `types`. */
  readonly typeIndex: Uint8Array;
  readonly types: readonly EquilibriumType[];
  readonly absent: readonly string[];
  readonly startEnd: { readonly reason: BranchEnd; readonly message: string };
  readonly endEnd: { readonly reason: BranchEnd; readonly message: string };
}

/** Long-run lowest and highest values from integration, past a Hopf point. Not continued cycles. */
export interface Band {
  readonly parameters: Float64Array;
  /** lowest[k*m + i] over quantities: n states then the population totals. */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  readonly quantities: readonly string[];
  /** 1 where the long run had settled to a repeating range, 0 where it is only what was seen. */
  readonly settled: Uint8Array;
}

export interface SweepResult {
  readonly status: 'complete' | 'cancelled' | 'needs-period-map' | 'failed';
  readonly message: string;
  readonly parameterKey: string;
  readonly from: number;
  readonly to: number;
  readonly stateSymbols: readonly string[];
  readonly branches: readonly Branch[];
  readonly specialPoints: readonly SpecialPoint[];
  readonly bands: readonly Band[];
  readonly points: number;
  readonly milliseconds: number;
}

/** What a long computation tells on its way; a generator yields these and can be stopped between them. */
export interface Progress<Partial = unknown> {
  readonly fraction: number;
  readonly stage: string;
  readonly partial: Partial | null;
}
