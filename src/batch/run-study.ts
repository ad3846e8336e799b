import { checkTask } from '@/engine/analyses/check-task';
import { findEquilibriaPair } from '@/engine/explore/equilibria-pair';
import { judgeModel, pairEquilibria } from '@/engine/explore/judge';
import { answersUnderOtherMeans } from '@/engine/explore/other-means';
import { sweepSplitAndTwin } from '@/engine/explore/split-sweep';
import { integrateTo } from '@/engine/integrators/driver';
import type { MethodName } from '@/engine/integrators/contract';
import type { PresetDocument } from '@/engine/schema/preset';
import type { StudyTask } from '@/engine/schema/study';
import { compileModel, type CompiledModel } from '@/engine/system/compile-model';
import { CAUTION } from '@/engine/system/contract';
import { specialPointShifts } from '@/engine/verdict/special-point-shifts';

import { equilibriaJson, shiftJson, sweepJson, trajectoryJson, type Json } from './result-json';
import { readStudy } from './read-study';

export const RESULTS_FORMAT = 'moiety-results';
export const RESULTS_VERSION = 1;

export type StudyOutcome =
  | { readonly ok: true; readonly results: Json }
  | { readonly ok: false; readonly problems: readonly string[] };

type TaskOf<Name extends StudyTask['task']> = Extract<StudyTask, { task: Name }>;

/**
 * Runs a study from JSON of unknown origin. Either all tasks are run, each with its own status, or
 * nothing is and the problems say why: a malformed study, a model that does not compile, a name
 * in a task that the model does not have.
 */
export function runStudy(json: unknown): StudyOutcome {
  const read = readStudy(json);
  if (!read.ok) return read;
  const { document, tasks } = read.study;
  const problems: string[] = [];
  const prepared: { task: StudyTask; model: CompiledModel }[] = [];
  for (const [k, task] of tasks.entries()) {
    const compiled = compileModel(withBox(document, task));
    if (!compiled.ok)
      return {
        ok: false,
        problems: compiled.diagnostics.filter((one) => one.severity === 'error').map((one) => one.message),
      };
    problems.push(...checkTask(compiled.model, task).map((problem) => `Task ${k + 1}: ${problem}`));
    prepared.push({ task, model: compiled.model });
  }
  if (problems.length > 0) return { ok: false, problems };
  const [{ model }] = prepared;
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
      tasks: prepared.map((one) => runTask(one.model, one.task)),
    },
  };
}

function runTask(model: CompiledModel, task: StudyTask): Json {
  const head = {
    task: task.task,
    id: task.id ?? null,
    parameters: Object.fromEntries(
      model.system.parameterKeys.map((key, k) => [key, model.valuesToParameters(task.parameters ?? {})[k]]),
    ),
  };
  if (task.task === 'trajectory') return { ...head, ...runTrajectory(model, task) };
  if (task.task === 'equilibria') return { ...head, ...runEquilibria(model, task) };
  return { ...head, ...runSweep(model, task) };
}

function runTrajectory(model: CompiledModel, task: TaskOf<'trajectory'>): Record<string, Json> {
  const p = model.valuesToParameters(task.parameters ?? {});
  const starts = startsOf(model, task);
  const horizon = task.horizon ?? model.document.horizon;
  const wanted =
    task.times ??
    Array.from({ length: task.samples }, (_, k) => task.startTime + (horizon * k) / (task.samples - 1));
  // A method begins at times[0]; a first wanted time after the start is reached from the start.
  const early = wanted[0] !== task.startTime;
  const times = Float64Array.from(early ? [task.startTime, ...wanted] : wanted);
  const options = {
    method: METHODS[task.method],
    relativeTolerance: task.relativeTolerance,
    absoluteTolerance: task.absoluteTolerance,
  };
  model.system.setParameters(p);
  const split = integrateTo(model.system, starts, times, options);
  const { system: twin } = model.twin;
  let pooled: Json = null;
  if (task.twin && twin !== null) {
    twin.setParameters(p);
    pooled = trajectoryJson(twin, integrateTo(twin, model.toTwinStarts(starts), times, options), early);
  }
  return { split: trajectoryJson(model.system, split, early), twin: pooled };
}

const METHODS: Readonly<Record<TaskOf<'trajectory'>['method'], MethodName>> = {
  automatic: 'auto',
  'dormand-prince-54': 'dormand-prince-54',
  'dormand-prince-853': 'dormand-prince-853',
  odex: 'odex',
  rosenbrock: 'rodas',
};

function runEquilibria(model: CompiledModel, task: TaskOf<'equilibria'>): Record<string, Json> {
  const values = task.parameters ?? {};
  const p = model.valuesToParameters(values);
  const found = finish(findEquilibriaPair(model, values, { starts: [startsOf(model, task)] }));
  const others = task.twin ? finish(answersUnderOtherMeans(model, values)) : [];
  const verdict = task.twin
    ? judgeModel(model, p, found, pairEquilibria(model, p, found), null, others)
    : null;
  return {
    split: equilibriaJson(model.system, found.split),
    twin: task.twin && found.twin && model.twin.system ? equilibriaJson(model.twin.system, found.twin) : null,
    verdict,
  };
}

function runSweep(model: CompiledModel, task: TaskOf<'sweep'>): Record<string, Json> {
  const request = {
    values: task.parameters ?? {},
    parameter: model.system.parameterKeys[model.parameterIndex(task.parameter)],
    from: task.from,
    to: task.to,
    starts: Array.from(startsOf(model, task)),
    withTwin: task.twin,
  };
  const { split, twin, verdict } = finish(sweepSplitAndTwin(model, request, { bands: task.bands }));
  return {
    parameter: request.parameter,
    from: task.from,
    to: task.to,
    split: sweepJson(split, task.branches),
    twin: twin && sweepJson(twin, task.branches),
    shifts: twin === null ? [] : specialPointShifts(split, twin).map(shiftJson),
    verdict: task.twin ? verdict : null,
  };
}

/** Start values of the document, with those of the task in their place. */
function startsOf(model: CompiledModel, task: StudyTask): Float64Array {
  return Float64Array.from(model.starts, (own, i) => task.starts?.[model.system.stateSymbols[i]] ?? own);
}

/** The document with the sides of a task's box in place of its own. */
function withBox(document: PresetDocument, task: StudyTask): PresetDocument {
  if (!('box' in task) || task.box === undefined) return document;
  const sides = Object.entries(task.box).map(([symbol, [from, to]]) => ({ class: symbol, from, to }));
  const kept = document.box.filter((side) => !sides.some((other) => other.class === side.class));
  return { ...document, box: [...kept, ...sides] };
}

function finish<Result>(work: Generator<unknown, Result>): Result {
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
  }
}
