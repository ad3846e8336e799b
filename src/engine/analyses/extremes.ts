import type { Progress } from '../continuation/contract';
import type { ExtremesResult } from '../lyapunov/contract';
import { extremesSweep } from '../lyapunov/extremes-sweep';
import type { ExtremesTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, SplitAnd } from './contract';
import { longRunTimes, quantityOn, smallestDensity } from './long-run-setting';
import { splitAndTwin } from './split-and-twin';

/** Long-run extremes along a parameter, upward and downward, for the model and then its twin. */
export function runExtremes(
  model: CompiledModel,
  task: ExtremesTask,
  options: AnalysisOptions = {},
): Generator<Progress<SplitAnd<ExtremesResult>>, SplitAnd<ExtremesResult>> {
  return splitAndTwin(model, task, options, (side) =>
    extremesSweep(side.system, side.p, {
      parameterIndex: model.parameterIndex(task.parameter),
      parameterKey: task.parameter,
      from: task.from,
      to: task.to,
      values: task.values,
      directions: task.directions,
      observe: quantityOn(model, side, task.observe),
      starts: side.starts,
      ...longRunTimes(model, task),
      floor: smallestDensity(model, side),
      ...(options.clock ? { clock: options.clock } : {}),
    }),
  );
}
