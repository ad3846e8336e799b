import type { Progress } from '../continuation/contract';
import type { AnalysisName, AnalysisTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, AnalysisResultOf, AnalysisResults } from './contract';
import { runBasins } from './basins';
import { runBoundaries } from './boundaries';
import { runCycles } from './cycles';
import { runExtremes } from './extremes';
import { runLyapunov } from './lyapunov';
import { runMap } from './map';
import { runPicture } from './picture';
import { runSection } from './section';

type TaskNamed = { readonly [Name in AnalysisName]: Extract<AnalysisTask, { readonly task: Name }> };

type Runs = {
  readonly [Name in AnalysisName]: (
    model: CompiledModel,
    task: TaskNamed[Name],
    options: AnalysisOptions,
  ) => Generator<Progress<AnalysisResults[Name]>, AnalysisResults[Name]>;
};

/** What each task is carried out by. */
const RUNS: Runs = {
  basins: runBasins,
  boundaries: runBoundaries,
  cycles: runCycles,
  extremes: runExtremes,
  lyapunov: runLyapunov,
  map: runMap,
  picture: runPicture,
  section: runSection,
};

/**
 * Runs a task on a model: one generator for whichever it is, its result typed by the task. Names in the task
 * are taken as they are: `checkTask` says which the model does not have. Only one may run on a model at
 * a time, since a system holds its parameters.
 */
export function runAnalysis<Task extends AnalysisTask>(
  model: CompiledModel,
  task: Task,
  options?: AnalysisOptions,
): Generator<Progress<AnalysisResultOf<Task>>, AnalysisResultOf<Task>>;
export function runAnalysis<Name extends AnalysisName>(
  model: CompiledModel,
  task: TaskNamed[Name],
  options: AnalysisOptions = {},
): Generator<Progress<AnalysisResults[Name]>, AnalysisResults[Name]> {
  return RUNS[task.task as Name](model, task, options);
}
