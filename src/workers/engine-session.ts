import { checkTask } from '../engine/analyses/check-task';
import type { AnalysisResultOf } from '../engine/analyses/contract';
import { runAnalysis } from '../engine/analyses/run-analysis';
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
import { findEquilibriaPair } from '../engine/explore/equilibria-pair';
import { exploreInSlices } from '../engine/explore/explore';
import { sweepSplitAndTwin } from '../engine/explore/split-sweep';
import { secondOpinion } from '../engine/explore/trajectories';
import type { AnalysisTask } from '../engine/schema/analysis-tasks';
import type { PresetDocument } from '../engine/schema/preset';
import { compileModel, type CompiledModel } from '../engine/system/compile-model';
import type { ModelReport } from '../engine/system/contract';
import { driveInSlices } from './drive-in-slices';
import type { EngineApi } from './protocol';
import { invalidReport } from './invalid-report';

/** Partial results are copied to the page, so they go out less often than the numbers of the progress bar. */
const PARTIAL_EVERY_MILLISECONDS = 120;

const NO_MODEL = 'There is no valid model yet. Mend the marked formulas first.';

/**
 * One engine at work: the last valid model, the equilibria known of it, and runs in slices. The
 * worker exposes it; the local engine of the tests holds it directly.
 */
export class EngineSession implements EngineApi {
  private document: PresetDocument | null = null;
  private model: CompiledModel | null = null;
  private known: EquilibriaPair | null = null;
  private explorations = 0;
  private readonly cancelled = new Set<number>();

  setModel(document: PresetDocument): ModelReport {
    const compiled = compileModel(document);
    if (!compiled.ok) return invalidReport(compiled.diagnostics, this.model?.report ?? null);
    this.document = document;
    this.model = compiled.model;
    this.known = null;
    return compiled.model.report;
  }

  async explore(request: ExploreRequest): Promise<ExploreResult | null> {
    const model = this.requireModel();
    const began = performance.now();
    this.explorations += 1;
    const own = this.explorations;
    const found = await driveInSlices(exploreInSlices(model, request, this.known), {
      isSuperseded: () => own !== this.explorations,
    });
    if (!found) return null;
    if (found.equilibria && this.model === model)
      this.known = { split: found.equilibria, twin: found.twinEquilibria };
    return { ...found, milliseconds: performance.now() - began };
  }

  async findEquilibria(
    job: number,
    values: ParameterValues,
    onProgress: (progress: Progress) => void,
  ): Promise<EquilibriaPair> {
    const model = this.modelOfOwn();
    const run = findEquilibriaPair(model, values, { isCancelled: () => this.cancelled.has(job) });
    return this.runJob(job, run, onProgress);
  }

  async sweep(
    job: number,
    request: SweepRequest,
    onProgress: (progress: Progress<SplitSweepResult>) => void,
  ): Promise<SplitSweepResult> {
    const model = this.modelOfOwn();
    const run = sweepSplitAndTwin(model, request, {
      isCancelled: () => this.cancelled.has(job),
      clock: () => performance.now(),
    });
    return this.runJob(job, run, onProgress);
  }

  async analyse<Task extends AnalysisTask>(
    job: number,
    task: Task,
    onProgress: (progress: Progress<AnalysisResultOf<Task>>) => void,
  ): Promise<AnalysisResultOf<Task>> {
    const model = this.modelOfOwn();
    const problems = checkTask(model, task);
    if (problems.length > 0) throw new Error(problems.join('\n'));
    const run = runAnalysis(model, task, {
      isCancelled: () => this.cancelled.has(job),
      clock: () => performance.now(),
    });
    return this.runJob(job, run, onProgress);
  }

  secondOpinion(request: ExploreRequest): SecondOpinion {
    return secondOpinion(this.modelOfOwn(), request);
  }

  cancel(job: number): void {
    this.cancelled.add(job);
  }

  /** Drives a job to its end; a cancelled one ends soon by itself, with what it has. */
  private async runJob<Partial, Result>(
    job: number,
    run: Generator<Progress<Partial>, Result>,
    onProgress: (progress: Progress<Partial>) => void,
  ): Promise<Result> {
    let partialSent = performance.now();
    const onSlice = (progress: Progress<Partial>): void => {
      const due = performance.now() - partialSent >= PARTIAL_EVERY_MILLISECONDS;
      if (due) partialSent = performance.now();
      onProgress(due ? progress : { ...progress, partial: null });
    };
    try {
      const result = await driveInSlices(run, { onSlice });
      if (result === null) throw new Error('A job is never superseded, only cancelled.');
      return result;
    } finally {
      this.cancelled.delete(job);
    }
  }

  private requireModel(): CompiledModel {
    if (!this.model) throw new Error(NO_MODEL);
    return this.model;
  }

  /** A compilation for one job alone: a system holds its parameters, so two runs must not share one. */
  private modelOfOwn(): CompiledModel {
    const compiled = this.document ? compileModel(this.document) : null;
    if (!compiled?.ok) throw new Error(NO_MODEL);
    return compiled.model;
  }
}
