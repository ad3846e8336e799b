/** What each task of the complete engine answers, split beside pooled. */
import type { BoundariesResult } from '../boundaries/contract';
import type { CyclesResult } from '../cycles/contract';
import type { EquilibriaPair, SplitSweepResult } from '../explore/contract';
import type { ExtremesResult, LyapunovResult, SectionResult } from '../lyapunov/contract';
import type { MapResult } from '../maps/contract';
import type { AnalysisTask } from '../schema/analysis-tasks';

/** One answer for the model and one for its pooled twin; the twin's null where there is none or it was not asked for. */
export interface SplitAnd<Result> {
  readonly split: Result;
  readonly twin: Result | null;
}

/** One row of the summary table of a full picture. */
export interface PictureRow {
  readonly of: 'split' | 'twin';
  /** Name in words, e.g. `Hopf`, `cycle branch from the Hopf point`, `coexistence equilibrium`. */
  readonly what: string;
  readonly parameter: number | null;
  /** From and to along the parameter, for branches. */
  readonly extent: readonly [number, number] | null;
  readonly note: string;
}

export interface PictureResult {
  readonly status: 'complete' | 'cancelled' | 'failed';
  readonly message: string;
  /** Every equilibrium at the task's own numbers. */
  readonly equilibria: EquilibriaPair;
  readonly sweep: SplitSweepResult;
  readonly cycles: SplitAnd<CyclesResult>;
  readonly summary: readonly PictureRow[];
}

export interface AnalysisResults {
  readonly cycles: SplitAnd<CyclesResult>;
  readonly boundaries: SplitAnd<BoundariesResult>;
  readonly map: SplitAnd<MapResult>;
  readonly basins: SplitAnd<MapResult>;
  readonly lyapunov: SplitAnd<LyapunovResult>;
  readonly section: SplitAnd<SectionResult>;
  readonly extremes: SplitAnd<ExtremesResult>;
  readonly picture: PictureResult;
}

export type AnalysisResultOf<Task extends AnalysisTask> = AnalysisResults[Task['task']];

export interface AnalysisOptions {
  /** Asked between slices; true ends the run with what was found. */
  readonly isCancelled?: () => boolean;
  /** Milliseconds; the engine has no clock of its own. */
  readonly clock?: () => number;
}
