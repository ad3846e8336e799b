import type { Progress } from '../continuation/contract';
import { splitBox, twinBox } from '../explore/equilibria-pair';
import { untilCancelled, type Outcome } from '../explore/until-cancelled';
import type { AnalysisTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { CompiledSystem } from '../system/contract';
import type { AnalysisOptions, SplitAnd } from './contract';

/** One of the two communities that a task is answered for: the model itself, or its pooled twin. */
export interface Side {
  readonly of: 'split' | 'twin';
  readonly system: CompiledSystem;
  /** All parameters, the task's values in place; the side's own, so a computation may write to it. */
  readonly p: Float64Array;
  /** Start values, the task's in place of the document's; totals for a lumped twin. */
  readonly starts: Float64Array;
  /** Box of each state, the task's sides in place of the document's; null where neither has one. */
  readonly box: readonly ({ readonly from: number; readonly to: number } | null)[];
  /** Values of the split model's states as this side's states: as they are, or as totals. */
  toState(values: Readonly<Record<string, number>>): Float64Array;
}

/**
 * Runs a task for the model and then for its pooled twin, where there is one and the task asks for it.
 * Partial results hold the split model's alone until the twin's turn. Cancelled during the first, the
 * twin is left out; what was found stays.
 */
export function* splitAndTwin<Result extends Outcome>(
  model: CompiledModel,
  task: AnalysisTask,
  options: AnalysisOptions,
  runOne: (side: Side) => Generator<Progress<Result>, Result>,
): Generator<Progress<SplitAnd<Result>>, SplitAnd<Result>> {
  const pooled = task.twin ? twinSide(model, task) : null;
  const share = pooled ? 0.5 : 1;
  const split = yield* untilCancelled(
    runOne(splitSide(model, task)),
    { from: 0, share },
    (partial): SplitAnd<Result> => ({ split: partial, twin: null }),
    options.isCancelled,
  );
  if (!pooled || split.status === 'cancelled') return { split, twin: null };
  const twin = yield* untilCancelled(
    runOne(pooled),
    { from: share, share },
    (partial): SplitAnd<Result> => ({ split, twin: partial }),
    options.isCancelled,
  );
  return { split, twin };
}

/** The model itself, at the numbers of a task. */
export function splitSide(model: CompiledModel, task: AnalysisTask): Side {
  const toState = (values: Readonly<Record<string, number>>): Float64Array =>
    Float64Array.from(model.starts, (own, i) => values[model.system.stateSymbols[i]] ?? own);
  return {
    of: 'split',
    system: model.system,
    p: model.valuesToParameters(task.parameters ?? {}),
    starts: toState(startValues(task)),
    box: splitBox(model, boxSides(task)),
    toState,
  };
}

/** The pooled twin at the numbers of a task; null where there is none. */
export function twinSide(model: CompiledModel, task: AnalysisTask): Side | null {
  const { system } = model.twin;
  if (!system) return null;
  const split = splitSide(model, task);
  return {
    of: 'twin',
    system,
    p: split.p.slice(),
    starts: model.toTwinStarts(split.starts),
    box: twinBox(model, boxSides(task)),
    toState: (values) => model.toTwinStarts(split.toState(values)),
  };
}

function startValues(task: AnalysisTask): Readonly<Record<string, number>> {
  return task.starts ?? {};
}

function boxSides(task: AnalysisTask): Readonly<Record<string, readonly [number, number]>> {
  return ('box' in task ? task.box : undefined) ?? {};
}
