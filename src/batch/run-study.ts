import { checkTask } from '@/engine/analyses/check-task';
import { runAnalysis } from '@/engine/analyses/run-analysis';
import type { StudyTask } from '@/engine/schema/study';
import { compileModel, type CompiledModel } from '@/engine/system/compile-model';
import { CAUTION, type Diagnostic } from '@/engine/system/contract';

import { analysisJson } from './json/analysis';
import { byName, type Json, type JsonRecord } from './json/shared';
import { readStudy } from './read-study';
import { runEquilibria } from './tasks/equilibria';
import { runSweep } from './tasks/sweep';
import { finish } from './tasks/task';
import { runTrajectory } from './tasks/trajectory';

export const RESULTS_FORMAT = 'moiety-results';
export const RESULTS_VERSION = 1;

export type StudyOutcome =
  | { readonly ok: true; readonly results: Json }
  | { readonly ok: false; readonly problems: readonly string[] };

/**
 * Runs a study from JSON of unknown origin. Either all tasks are run, each with its own status, or
 * nothing is and the problems say why: a malformed study, a model that does not compile, a name
 * in a task that the model does not have.
 */
export function runStudy(json: unknown): StudyOutcome {
  const read = readStudy(json);
  if (!read.ok) return read;
  const { document, tasks } = read.study;
  const compiled = compileModel(document);
  if (!compiled.ok) return { ok: false, problems: errorsOf(compiled.diagnostics) };
  const { model } = compiled;
  const problems = tasks.flatMap((task, k) =>
    checkTask(model, task).map((problem) => `Task ${k + 1}: ${problem}`),
  );
  if (problems.length > 0) return { ok: false, problems };
  return {
    ok: true,
    results: {
      format: RESULTS_FORMAT,
      formatVersion: RESULTS_VERSION,
      title: document.title,
      timeUnit: document.timeUnit,
      densityUnit: document.densityUnit,
      states: model.system.stateSymbols,
      twin: { ...model.twin.report, states: model.twin.system?.stateSymbols ?? [] },
      cautions: model.report.harvested ? [CAUTION] : [],
      tasks: tasks.map((task) => runTask(model, task)),
    },
  };
}

function errorsOf(diagnostics: readonly Diagnostic[]): string[] {
  return diagnostics.filter((one) => one.severity === 'error').map((one) => one.message);
}

function runTask(model: CompiledModel, task: StudyTask): Json {
  const p = model.valuesToParameters(task.parameters ?? {});
  return {
    task: task.task,
    id: task.id ?? null,
    parameters: byName(model.system.parameterKeys, p),
    ...answerOrReason(model, task),
  };
}

/** A mistake of the engine's own in one task must not cost the results of the others. */
function answerOrReason(model: CompiledModel, task: StudyTask): JsonRecord {
  try {
    return answer(model, task);
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    const message = `The engine stopped unexpectedly in this task: ${reason}`;
    return { status: 'failed', message, split: null, twin: null };
  }
}

function answer(model: CompiledModel, task: StudyTask): JsonRecord {
  switch (task.task) {
    case 'trajectory':
      return runTrajectory(model, task);
    case 'equilibria':
      return runEquilibria(model, task);
    case 'sweep':
      return runSweep(model, task);
    default:
      return analysisJson(model, task, finish(runAnalysis(model, task)));
  }
}
