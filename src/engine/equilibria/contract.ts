/** Shared shapes of the search for equilibria. */

/** Type of an equilibrium, in words. `neutral` only with a proven constant of motion. */
export type EquilibriumType =
  | 'stable node'
  | 'stable focus'
  | 'unstable node'
  | 'unstable focus'
  | 'saddle'
  | 'saddle focus'
  | 'neutral'
  | 'indistinguishable from neutral'
  | 'not isolated'
  | 'not differentiable';

export interface Eigenvalue {
  readonly re: number;
  readonly im: number;
}

/** Whether an absent population can grow from low density, and how that was decided. */
export interface Invasion {
  /** Its symbol; several joined by ` and ` where they can only grow together. */
  readonly population: string;
  /** `not-invariant`: absence does not last (immigration), so the question does not arise. */
  readonly answer: 'can invade' | 'cannot invade' | 'undecided' | 'not-invariant';
  /** Per capita growth rate at low density, per time unit; null where it has no meaning. */
  readonly growthRate: number | null;
  readonly method: 'transversal block' | 'homogeneous growth rate' | 'none';
  readonly reason: string;
  /** Shares of its classes, in the order of the state, at which it grows or declines in the long run. */
  readonly composition?: readonly number[];
}

export interface Equilibrium {
  readonly state: Float64Array;
  /** Largest |f_i|, relative to the size of the flows that balance there. */
  readonly residual: number;
  /** Empty where no Jacobian exists. Ordered by falling real part. */
  readonly eigenvalues: readonly Eigenvalue[];
  readonly type: EquilibriumType;
  readonly attracts: 'yes' | 'no' | 'neutral' | 'unknown';
  /** Minus the largest real part of the eigenvalues; null where none exist. */
  readonly margin: number | null;
  /** Every nonnegative state is >= 0 within tolerance. */
  readonly feasible: boolean;
  /** Population symbols absent here. */
  readonly absent: readonly string[];
  readonly invasions: readonly Invasion[];
  /** For a split model at spread 0: eigenvalues of modes in which only composition changes. */
  readonly compositionModes: readonly Eigenvalue[];
  /** Remarks in words, e.g. why it is called indistinguishable from neutral. */
  readonly notes: readonly string[];
}

export interface EquilibriaResult {
  readonly status: 'complete' | 'cancelled' | 'needs-period-map' | 'failed';
  readonly message: string;
  readonly equilibria: readonly Equilibrium[];
  /** Box searched, per state. */
  readonly box: readonly { readonly from: number; readonly to: number }[];
  readonly startsTried: number;
}
