/** Shared shapes of exploring a model at one set of numbers, and of sweeping it beside its pooled twin. */
import type { SweepResult } from '../continuation/contract';
import type { EquilibriaResult } from '../equilibria/contract';
import type { Trajectory } from '../integrators/contract';
import type { PlaneRequest, PlaneResult } from '../phase-plane/contract';
import type { Verdict } from '../verdict/contract';

export type { PlaneRequest, PlaneResult };

/** Values that override the document's own, by parameter key. */
export type ParameterValues = Readonly<Record<string, number>>;

export interface ExploreRequest {
  readonly values: ParameterValues;
  /** Start value of each state, in the order of the state. */
  readonly starts: readonly number[];
  readonly horizon: number;
  readonly samples: number;
  readonly withTwin: boolean;
  /** Follow the known equilibria by Newton steps (`track`), search anew (`search`), or leave them. */
  readonly equilibria: 'track' | 'search' | 'none';
  readonly plane: PlaneRequest | null;
}

/** Sides of a box by class, which take the place of the document's. */
export type BoxSides = Readonly<Record<string, readonly [number, number]>>;

/** Equilibria of the split model and of its twin; the twin's null where there is none. */
export interface EquilibriaPair {
  readonly split: EquilibriaResult;
  readonly twin: EquilibriaResult | null;
}

/** What exploring finds; the worker adds how long it took. */
export interface Exploration {
  readonly trajectory: Trajectory;
  /** In twin states (totals) where lumped, else in split states; null where there is no twin. */
  readonly twinTrajectory: Trajectory | null;
  readonly twinStateSymbols: readonly string[];
  readonly equilibria: EquilibriaResult | null;
  readonly twinEquilibria: EquilibriaResult | null;
  readonly plane: PlaneResult | null;
  readonly verdict: Verdict | null;
}

export interface ExploreResult extends Exploration {
  readonly milliseconds: number;
}

export interface SweepRequest {
  readonly values: ParameterValues;
  readonly parameter: string;
  readonly from: number;
  readonly to: number;
  readonly starts: readonly number[];
  readonly withTwin: boolean;
  readonly box?: BoxSides;
  /** Long-run bands past Hopf points; true unless told. */
  readonly bands?: boolean;
}

export interface SplitSweepResult {
  readonly split: SweepResult;
  readonly twin: SweepResult | null;
  readonly verdict: Verdict;
}

export interface SecondOpinion {
  readonly trajectory: Trajectory;
  /** Largest difference from the first method, relative to the size of the solution. */
  readonly difference: number;
  readonly message: string;
}
