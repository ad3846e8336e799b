import type { Progress } from '../continuation/contract';
import type { SectionResult } from '../lyapunov/contract';
import { recordSection } from '../lyapunov/record-section';
import type { SectionTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, SplitAnd } from './contract';
import { LONG_RUN_SETTING, longRunTimes, quantityOn } from './long-run-setting';
import { splitAndTwin } from './split-and-twin';

/**
 * Crossings of a class or a population's total through a value, for the model and then its twin; where the twin has
 * no such class, its population's total stands for it.
 */
export function runSection(
  model: CompiledModel,
  task: SectionTask,
  options: AnalysisOptions = {},
): Generator<Progress<SplitAnd<SectionResult>>, SplitAnd<SectionResult>> {
  const { transient } = longRunTimes(model, task);
  return splitAndTwin(model, task, options, (side) => {
    const { system, p, starts } = side;
    system.setParameters(p);
    return recordSection(system, starts, {
      quantity: quantityOn(model, side, task.quantity),
      value: task.value,
      direction: task.direction,
      transient,
      crossings: task.crossings,
      maximumTime: LONG_RUN_SETTING.section * model.document.horizon,
    });
  });
}
