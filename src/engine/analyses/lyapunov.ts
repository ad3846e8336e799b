import type { Progress } from '../continuation/contract';
import type { LyapunovResult } from '../lyapunov/contract';
import { lyapunovSpectrum } from '../lyapunov/lyapunov-spectrum';
import type { LyapunovTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, SplitAnd } from './contract';
import { LONG_RUN_SETTING, longRunTimes } from './long-run-setting';
import { splitAndTwin } from './split-and-twin';

/** Lyapunov exponents of the solution from the start values, for the model and then its twin. */
export function runLyapunov(
  model: CompiledModel,
  task: LyapunovTask,
  options: AnalysisOptions = {},
): Generator<Progress<SplitAnd<LyapunovResult>>, SplitAnd<LyapunovResult>> {
  const { transient } = longRunTimes(model, task);
  return splitAndTwin(model, task, options, ({ system, p, starts }) => {
    system.setParameters(p);
    return lyapunovSpectrum(system, starts, {
      transient,
      horizon: task.horizon ?? LONG_RUN_SETTING.averaged * model.document.horizon,
      ...(task.exponents === undefined ? {} : { count: task.exponents }),
    });
  });
}
