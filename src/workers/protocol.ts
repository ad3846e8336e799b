/** What the page asks of an engine worker and what comes back. Types only. */
import type { AnalysisResultOf } from '../engine/analyses/contract';
import type { Progress } from '../engine/continuation/contract';
import type {
  EquilibriaPair,
  ExploreRequest,
  ExploreResult,
  ParameterValues,
  SecondOpinion,
  SplitSweepResult,
  SweepRequest,
} from '../engine/explore/contract';
import type { AnalysisTask } from '../engine/schema/analysis-tasks';
import type { PresetDocument } from '../engine/schema/preset';
import type { ModelReport } from '../engine/system/contract';

export type {
  EquilibriaPair,
  Exploration,
  ExploreRequest,
  ExploreResult,
  ParameterValues,
  PlaneRequest,
  PlaneResult,
  SecondOpinion,
  SplitSweepResult,
  SweepRequest,
} from '../engine/explore/contract';

/** Exposed by the worker through comlink. `job` names a cancellable run. */
export interface EngineApi {
  /** Compiles; on error keeps the last valid model and reports why. */
  setModel(document: PresetDocument): ModelReport;
  /** Null where a newer request came in before this one was done. */
  explore(request: ExploreRequest): Promise<ExploreResult | null>;
  findEquilibria(
    job: number,
    values: ParameterValues,
    onProgress: (progress: Progress) => void,
  ): Promise<EquilibriaPair>;
  sweep(
    job: number,
    request: SweepRequest,
    onProgress: (progress: Progress<SplitSweepResult>) => void,
  ): Promise<SplitSweepResult>;
  /** Cycles, boundaries, maps and the rest: one call, its result typed by the task. Refused where a name is unknown. */
  analyse<Task extends AnalysisTask>(
    job: number,
    task: Task,
    onProgress: (progress: Progress<AnalysisResultOf<Task>>) => void,
  ): Promise<AnalysisResultOf<Task>>;
  secondOpinion(request: ExploreRequest): SecondOpinion;
  cancel(job: number): void;
}

/** The engine as the page holds it. Every promise is rejected with a readable reason if the worker dies. */
export interface EngineClient {
  setModel(document: PresetDocument): Promise<ModelReport>;
  /** The newest request wins: one that is overtaken is answered with the newer result. */
  explore(request: ExploreRequest): Promise<ExploreResult>;
  findEquilibria(
    job: number,
    values: ParameterValues,
    onProgress: (progress: Progress) => void,
  ): Promise<EquilibriaPair>;
  sweep(
    job: number,
    request: SweepRequest,
    onProgress: (progress: Progress<SplitSweepResult>) => void,
  ): Promise<SplitSweepResult>;
  /** Cycles, boundaries, maps and the rest: one call, its result typed by the task. Refused where a name is unknown. */
  analyse<Task extends AnalysisTask>(
    job: number,
    task: Task,
    onProgress: (progress: Progress<AnalysisResultOf<Task>>) => void,
  ): Promise<AnalysisResultOf<Task>>;
  secondOpinion(request: ExploreRequest): Promise<SecondOpinion>;
  cancel(job: number): void;
  /** Ends the workers; later calls are rejected. */
  dispose(): void;
}
