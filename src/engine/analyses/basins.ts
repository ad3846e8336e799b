import type { Progress } from '../continuation/contract';
import { basinsOfAttraction } from '../maps/basins';
import type { MapAxis, MapResult } from '../maps/contract';
import type { BasinsTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, SplitAnd } from './contract';
import { extinctBelow, longRunTimes } from './long-run-setting';
import { splitAndTwin } from './split-and-twin';

/**
 * Basins of attraction over the start values of two classes, for the model and then its twin; the twin begins from
 * the same starts, pooled.
 */
export function runBasins(
  model: CompiledModel,
  task: BasinsTask,
  options: AnalysisOptions = {},
): Generator<Progress<SplitAnd<MapResult>>, SplitAnd<MapResult>> {
  const axis = ({ state, ...rest }: BasinsTask['x']): MapAxis => ({ key: state, ...rest });
  return splitAndTwin(model, task, options, (side) => {
    const { system, p } = side;
    system.setParameters(p);
    return basinsOfAttraction(system, {
      x: axis(task.x),
      y: axis(task.y),
      ...longRunTimes(model, task),
      ...(options.clock ? { clock: options.clock } : {}),
      extinctBelow: extinctBelow(model, side, task.extinctBelow),
      startAt: (x, y) => side.toState({ ...task.starts, [task.x.state]: x, [task.y.state]: y }),
    });
  });
}
