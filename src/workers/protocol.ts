/** What the page asks of an engine worker and what comes back. Types only. */
import type { EquilibriaResult } from '../engine/equilibria/contract';
import type { Progress, SweepResult } from '../engine/continuation/contract';
import type { PresetDocument } from '../engine/schema/preset';
import type { ModelReport } from '../engine/system/contract';
import type { Trajectory } from '../engine/integrators/contract';
import type { Verdict } from '../engine/verdict/contract';

/** Values that override the document's own, by parameter key. */
export type ParameterValues = Readonly<Record<string, number>>;

/** A two-dimensional slice through state space, by state symbols, for the phase plane. */
export interface PlaneRequest {
  readonly x: string;
  readonly y: string;
  readonly xRange: readonly [number, number];
  readonly yRange: readonly [number, number];
  /** Cells a side for the zero-growth lines, arrows a side for the flow. */
  readonly cells: number;
  readonly arrows: number;
}

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

export interface PlaneResult {
  readonly x: string;
  readonly y: string;
  /** Zero-growth lines: for each state that varies in the plane, segments x0,y0,x1,y1. */
  readonly lines: readonly { readonly state: string; readonly segments: Float64Array }[];
  /** Arrows: x, y, dx, dy in units of the ranges, four numbers each. */
  readonly flow: Float64Array;
  /** What was held fixed, in words. */
  readonly note: string;
}

export interface ExploreResult {
  readonly trajectory: Trajectory;
  /** In twin states (totals) where lumped, else in split states; null where there is no twin. */
  readonly twinTrajectory: Trajectory | null;
  readonly twinStateSymbols: readonly string[];
  readonly equilibria: EquilibriaResult | null;
  readonly twinEquilibria: EquilibriaResult | null;
  readonly plane: PlaneResult | null;
  readonly verdict: Verdict | null;
  readonly milliseconds: number;
}

export interface SweepRequest {
  readonly values: ParameterValues;
  readonly parameter: string;
  readonly from: number;
  readonly to: number;
  readonly starts: readonly number[];
  readonly withTwin: boolean;
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

/** Exposed by the worker through comlink. `job` names a cancellable run. */
export interface EngineApi {
  /** Compiles; on error keeps the last valid model and reports why. */
  setModel(document: PresetDocument): ModelReport;
  explore(request: ExploreRequest): ExploreResult;
  findEquilibria(
    job: number,
    values: ParameterValues,
    onProgress: (p: Progress) => void,
  ): Promise<{ split: EquilibriaResult; twin: EquilibriaResult | null }>;
  sweep(
    job: number,
    request: SweepRequest,
    onProgress: (p: Progress<SplitSweepResult>) => void,
  ): Promise<SplitSweepResult>;
  secondOpinion(request: ExploreRequest): SecondOpinion;
  cancel(job: number): void;
}
