import type { Progress } from '../continuation/contract';
import type { LyapunovResult } from '../lyapunov/contract';
import { lyapunovSpectrum } from '../lyapunov/lyapunov-spectrum';
import type { LyapunovTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, SplitAnd } from './contract';
import { splitAndTwin } from './split-and-twin';

/** Lengths of the document's own horizon, which shows the model's course, that a run takes unless told. */
export const LYAPUNOV_RUN_DEFAULTS = { transient: 5, horizon: 40 } as const;

/** Lyapunov exponents of the solution from the start values, for the model and then its twin. */
export function runLyapunov(
  model: CompiledModel,
  task: LyapunovTask,
  options: AnalysisOptions = {},
): Generator<Progress<SplitAnd<LyapunovResult>>, SplitAnd<LyapunovResult>> {
  const shown = model.document.horizon;
  return splitAndTwin(model, task, options, ({ system, p, starts }) => {
    system.setParameters(p);
    return lyapunovSpectrum(system, starts, {
      transient: task.transient ?? LYAPUNOV_RUN_DEFAULTS.transient * shown,
      horizon: task.horizon ?? LYAPUNOV_RUN_DEFAULTS.horizon * shown,
      ...(task.exponents === undefined ? {} : { count: task.exponents }),
    });
  });
}
