import type { AnalysisResultOf, AnalysisResults, SplitAnd } from '@/engine/analyses/contract';
import type { AnalysisName, AnalysisTask } from '@/engine/schema/analysis-tasks';
import type { CompiledModel } from '@/engine/system/compile-model';

import { boundariesJson } from './boundaries';
import { cyclesJson } from './cycles';
import { extremesJson } from './extremes';
import { lyapunovJson } from './lyapunov';
import { mapJson } from './map';
import { pictureJson } from './picture';
import { sectionJson } from './section';
import type { Json, JsonRecord } from './shared';
import { overall } from './status';

type TaskNamed = { readonly [Name in AnalysisName]: Extract<AnalysisTask, { readonly task: Name }> };

type Writers = {
  readonly [Name in AnalysisName]: (
    result: AnalysisResults[Name],
    task: TaskNamed[Name],
    model: CompiledModel,
  ) => JsonRecord;
};

/** How the result of each task is written. */
const WRITERS: Writers = {
  cycles: (result, task) => ({
    ...rangeJson(task),
    ...both(result, (one) => cyclesJson(one, task)),
  }),
  boundaries: (result, task) => ({
    first: task.first,
    second: task.second,
    ...both(result, (one) => boundariesJson(one, task.branches)),
  }),
  map: (result) => both(result, mapJson),
  basins: (result) => both(result, mapJson),
  lyapunov: (result, _task, model) => both(result, (one, of) => lyapunovJson(symbolsOf(model, of), one)),
  section: (result, task, model) => ({
    quantity: task.quantity,
    value: task.value,
    direction: task.direction,
    ...both(result, (one, of) => sectionJson(symbolsOf(model, of), one)),
  }),
  extremes: (result, task) => ({ ...rangeJson(task), ...both(result, extremesJson) }),
  picture: (result, task) => ({ ...rangeJson(task), ...pictureJson(result, task) }),
};

/** The result of a task as JSON: its status, then the answer for the model and for its pooled twin. */
export function analysisJson<Task extends AnalysisTask>(
  model: CompiledModel,
  task: Task,
  result: AnalysisResultOf<Task>,
): JsonRecord;
export function analysisJson<Name extends AnalysisName>(
  model: CompiledModel,
  task: TaskNamed[Name],
  result: AnalysisResults[Name],
): JsonRecord {
  return WRITERS[task.task as Name](result, task, model);
}

function rangeJson({ parameter, from, to }: { parameter: string; from: number; to: number }): JsonRecord {
  return { parameter, from, to };
}

function both<Result extends { readonly status: string; readonly message: string }>(
  { split, twin }: SplitAnd<Result>,
  write: (one: Result, of: 'split' | 'twin') => Json,
): JsonRecord {
  return {
    ...overall(split, twin),
    split: write(split, 'split'),
    twin: twin && write(twin, 'twin'),
  };
}

function symbolsOf({ system, twin }: CompiledModel, of: 'split' | 'twin'): readonly string[] {
  return of === 'twin' && twin.system ? twin.system.stateSymbols : system.stateSymbols;
}
