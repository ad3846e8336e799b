import type { Progress } from '../continuation/contract';
import { attractorMap } from '../maps/attractor-map';
import type { MapAxis, MapResult } from '../maps/contract';
import { marginMap } from '../maps/margin-map';
import type { MapTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, SplitAnd } from './contract';
import { extinctBelow, longRunTimes } from './long-run-setting';
import { splitAndTwin } from './split-and-twin';

/** A quantity over two parameters, for the model and then its twin. */
export function runMap(
  model: CompiledModel,
  task: MapTask,
  options: AnalysisOptions = {},
): Generator<Progress<SplitAnd<MapResult>>, SplitAnd<MapResult>> {
  const axis = ({ parameter, ...rest }: MapTask['x']): MapAxis => ({ key: parameter, ...rest });
  const shared = {
    x: axis(task.x),
    y: axis(task.y),
    columns: [model.parameterIndex(task.x.parameter), model.parameterIndex(task.y.parameter)] as const,
    ...(options.clock ? { clock: options.clock } : {}),
  };
  const quantity = task.show;
  return splitAndTwin(model, task, options, (side) => {
    const { system, p, starts, box } = side;
    if (quantity === 'margin') return marginMap(system, p, { ...shared, starts, box });
    return attractorMap(system, p, {
      ...shared,
      ...longRunTimes(model, task),
      quantity,
      starts,
      extinctBelow: extinctBelow(model, side, task.extinctBelow),
    });
  });
}
