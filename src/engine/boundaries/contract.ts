/** Shared shapes of boundaries: curves of special points in two parameters. */
import type { BranchEnd } from '../continuation/contract';
import type { Eigenvalue } from '../equilibria/contract';

export type BoundaryKind = 'fold' | 'Hopf' | 'transcritical' | 'pitchfork';

export type BoundaryEnd = BranchEnd | 'ended at a Bogdanov-Takens point' | 'does not persist';

export type BoundaryPointKind = 'cusp' | 'Bogdanov-Takens' | 'generalised Hopf' | 'fold-Hopf' | 'double Hopf';

/** A special point of a sweep, from which a curve is traced. */
export interface BoundaryStart {
  readonly kind: BoundaryKind;
  readonly first: number;
  readonly second: number;
  readonly state: Float64Array;
  /** Imaginary part of the pair, for a Hopf point. */
  readonly omega: number | null;
  /** Special point of the sweep it comes from. */
  readonly specialPoint: string | null;
}

export interface BoundarySpecialPoint {
  readonly id: string;
  readonly kind: BoundaryPointKind;
  readonly first: number;
  readonly second: number;
  readonly state: Float64Array;
  readonly eigenvalues: readonly Eigenvalue[];
  readonly curve: number;
  readonly index: number;
  /** Bound on its error relative to the two ranges. */
  readonly accuracy: number;
  readonly feasible: boolean;
  /** One sentence in plain words. */
  readonly meaning: string;
}

export interface BoundaryCurve {
  readonly kind: BoundaryKind;
  readonly dimension: number;
  /** One entry (or n) a point, in order along the arc. */
  readonly first: Float64Array;
  readonly second: Float64Array;
  readonly states: Float64Array;
  /** Imaginary part of the pair on a Hopf curve; NaN elsewhere. */
  readonly omega: Float64Array;
  /** First Lyapunov coefficient on a Hopf curve, fold coefficient on a fold curve; NaN where withheld. */
  readonly coefficient: Float64Array;
  readonly feasible: Uint8Array;
  /** 1 where crossing the curve changes whether the equilibrium attracts, 0 where something else repels already. */
  readonly matters: Uint8Array;
  /** Unit normal (in scaled parameters) pointing to the side where the equilibrium attracts, 2 a point; NaN where neither side does. */
  readonly stableSide: Float64Array;
  readonly start: BoundaryStart;
  readonly startEnd: { readonly reason: BoundaryEnd; readonly message: string };
  readonly endEnd: { readonly reason: BoundaryEnd; readonly message: string };
}

export interface BoundariesResult {
  readonly status: 'complete' | 'cancelled' | 'needs-period-map' | 'failed';
  readonly message: string;
  readonly firstKey: string;
  readonly secondKey: string;
  readonly firstRange: readonly [number, number];
  readonly secondRange: readonly [number, number];
  readonly stateSymbols: readonly string[];
  readonly curves: readonly BoundaryCurve[];
  readonly specialPoints: readonly BoundarySpecialPoint[];
  readonly points: number;
  readonly milliseconds: number;
}
