import { integrateTo } from '@/engine/integrators/driver';
import type { MethodName, Trajectory } from '@/engine/integrators/contract';
import type { CompiledModel } from '@/engine/system/compile-model';

import type { JsonRecord } from '../json/shared';
import { overall } from '../json/status';
import { trajectoryJson } from '../json/trajectory';
import { startsOf, type TaskOf } from './task';

export function runTrajectory(model: CompiledModel, task: TaskOf<'trajectory'>): JsonRecord {
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
  let pooled: Trajectory | null = null;
  if (task.twin && twin !== null) {
    twin.setParameters(p);
    pooled = integrateTo(twin, model.toTwinStarts(starts), times, options);
  }
  return {
    ...overall(split, pooled),
    split: trajectoryJson(model.system, split, early),
    twin: twin && pooled && trajectoryJson(twin, pooled, early),
  };
}

const METHODS: Readonly<Record<TaskOf<'trajectory'>['method'], MethodName>> = {
  automatic: 'auto',
  'dormand-prince-54': 'dormand-prince-54',
  'dormand-prince-853': 'dormand-prince-853',
  odex: 'odex',
  rosenbrock: 'rodas',
};
