import type { Progress } from '../continuation/contract';
import type { AnalysisName, AnalysisTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, AnalysisResultOf } from './contract';
import { runBasins } from './basins';
import { runCycles } from './cycles';
import { runExtremes } from './extremes';
import { runLyapunov } from './lyapunov';
import { runMap } from './map';
import { runPicture } from './picture';
import { runSection } from './section';

type RunTask<Task extends AnalysisTask> = (
  model: CompiledModel,
  task: Task,
  options: AnalysisOptions,
) => Generator<Progress<AnalysisResultOf<Task>>, AnalysisResultOf<Task>>;

type Runs = {
  readonly [Name in AnalysisName]: RunTask<Extract<AnalysisTask, { readonly task: Name }>>;
};

/** What each task is carried out by. */
const RUNS: Partial<Runs> = {
  basins: runBasins,
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
  options: AnalysisOptions = {},
): ReturnType<RunTask<Task>> {
  // The table has for each name what carries out the task of that name; the compiler cannot see it through Task.
  const run = RUNS[task.task] as RunTask<Task> | undefined;
  if (!run) throw new Error(`There is no task called ${task.task}.`);
  return run(model, task, options);
}
