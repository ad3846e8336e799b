import type { BoundariesResult, BoundaryStart } from '../boundaries/contract';
import { traceBoundaries } from '../boundaries/trace-boundaries';
import type { Progress } from '../continuation/contract';
import type { BoundariesTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, SplitAnd } from './contract';
import { splitAndTwin, type Side } from './split-and-twin';

/** Curves of special points in two parameters, of the model and of its pooled twin. */
export function* runBoundaries(
  model: CompiledModel,
  task: BoundariesTask,
  options: AnalysisOptions,
): Generator<Progress<SplitAnd<BoundariesResult>>, SplitAnd<BoundariesResult>> {
  return yield* splitAndTwin(model, task, options, (side) =>
    traceBoundaries(side.system, side.p, {
      firstIndex: model.parameterIndex(task.first.parameter),
      firstRange: [task.first.from, task.first.to],
      secondIndex: model.parameterIndex(task.second.parameter),
      secondRange: [task.second.from, task.second.to],
      kinds: task.kinds,
      // A point of the split model is none of the twin's: there a sweep looks for points of the same kind.
      ...(task.point && side.of === 'split' ? { start: startFrom(task.point, side) } : {}),
      ...(task.point ? { kinds: [task.point.kind] } : {}),
      starts: [side.starts],
      box: side.box,
      maximumPoints: task.maximumPoints,
      ...(options.clock ? { clock: options.clock } : {}),
    }),
  );
}

function startFrom(point: NonNullable<BoundariesTask['point']>, side: Side): BoundaryStart {
  const { kind, first, second, omega } = point;
  return { kind, first, second, state: side.toState(point.state), omega: omega ?? null, specialPoint: null };
}
