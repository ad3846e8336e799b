import type { Progress, SpecialPoint } from '../continuation/contract';
import type { CyclesResult } from '../cycles/contract';
import { cycles, type CyclesOptions } from '../cycles/cycles';
import { sweptRange } from '../explore/swept-range';
import type { CyclesTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, SplitAnd } from './contract';
import { splitAndTwin, type Side } from './split-and-twin';

/** Branches of cycles along one parameter, of the model and of its pooled twin. */
export function* runCycles(
  model: CompiledModel,
  task: CyclesTask,
  options: AnalysisOptions,
): Generator<Progress<SplitAnd<CyclesResult>>, SplitAnd<CyclesResult>> {
  const { beginFrom, intervals, collocationPoints, maximumPoints, doublings, forcingPeriods } = task;
  const own = { beginFrom, intervals, collocationPoints, maximumPoints, doublings, forcingPeriods };
  return yield* splitAndTwin(model, task, options, (side) =>
    cycles(side.system, side.p, { ...own, ...cyclesAlong(model, task, side, options) }),
  );
}

/**
 * What cycles of one side along a range are computed with.
 *
 * @param hopfPoints those of a sweep made before over the same range; without it one is made
 */
export function cyclesAlong(
  model: CompiledModel,
  range: Pick<CyclesTask, 'parameter' | 'from' | 'to'>,
  side: Side,
  { clock }: AnalysisOptions,
  hopfPoints?: readonly SpecialPoint[],
): Omit<CyclesOptions, 'beginFrom'> {
  return {
    ...sweptRange(model, range),
    starts: [side.starts],
    box: side.box,
    horizon: model.document.horizon,
    ...(hopfPoints ? { hopfPoints } : {}),
    ...(clock ? { clock } : {}),
  };
}
