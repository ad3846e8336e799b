import type { Progress } from '../continuation/contract';
import type { CyclesResult } from '../cycles/contract';
import { cycles } from '../cycles/cycles';
import type { EquilibriaPair, SplitSweepResult, SweepRequest } from '../explore/contract';
import { findEquilibriaPair } from '../explore/equilibria-pair';
import { sweepSplitAndTwin } from '../explore/split-sweep';
import type { PictureTask } from '../schema/analysis-tasks';
import type { CompiledModel } from '../system/compile-model';
import type { AnalysisOptions, PictureResult, SplitAnd } from './contract';
import { cyclesAlong } from './cycles';
import { pictureStatus, summarisePicture } from './picture-summary';
import { splitAndTwin, splitSide } from './split-and-twin';

/** The stretch of the whole progress that each stage fills. */
const STAGES = { equilibria: [0, 0.1], sweep: [0.1, 0.45], cycles: [0.45, 1] } as const;

const NOT_BEGUN = 'Cycles were not looked for.';

/**
 * Everything at once along one parameter: all equilibria at the task's own numbers, all branches of a sweep
 * with their special points, and the cycles from each Hopf point (or of the period map), for the model
 * and for its pooled twin, with a table that names them. Partial results come from the first branch on.
 */
export function* runPicture(
  model: CompiledModel,
  task: PictureTask,
  options: AnalysisOptions,
): Generator<Progress<PictureResult>, PictureResult> {
  const { starts } = splitSide(model, task);
  const { isCancelled } = options;
  const box = task.box ?? {};
  const values = task.parameters ?? {};
  const found = yield* inStage(
    findEquilibriaPair(model, values, { starts: [starts], box, ...(isCancelled ? { isCancelled } : {}) }),
    STAGES.equilibria,
    () => null,
  );
  const equilibria: EquilibriaPair = task.twin ? found : { ...found, twin: null };
  const parameter = model.system.parameterKeys[model.parameterIndex(task.parameter)];
  const request: SweepRequest = {
    values,
    parameter,
    from: task.from,
    to: task.to,
    starts: Array.from(starts),
    withTwin: task.twin,
    box,
  };
  const waiting = notBegun(model, request);
  const combine = (sweep: SplitSweepResult, along: SplitAnd<CyclesResult>): PictureResult => {
    const parts = { equilibria, sweep, cycles: along };
    const value = model.valuesToParameters(values)[model.parameterIndex(parameter)];
    return { ...pictureStatus(parts), ...parts, summary: summarisePicture(model, value, parts) };
  };
  const sweep = yield* inStage(
    sweepSplitAndTwin(model, request, { ...options, bands: false, equilibria: found }),
    STAGES.sweep,
    (partial) => combine(partial, waiting),
  );
  if ((sweep.twin ?? sweep.split).status === 'cancelled') return combine(sweep, waiting);
  const along = yield* inStage(
    splitAndTwin(model, task, options, (side) => {
      const swept = side.of === 'split' ? sweep.split : sweep.twin;
      const common = cyclesAlong(model, task, side, options, swept?.specialPoints ?? []);
      return cycles(side.system, side.p, { ...common, beginFrom: 'Hopf points' });
    }),
    STAGES.cycles,
    ({ split, twin }) => combine(sweep, { split, twin: twin ?? waiting.twin }),
  );
  return combine(sweep, along);
}

/** Drives one stage within its stretch of the whole progress. */
function* inStage<Result>(
  run: Generator<Progress<Result>, Result>,
  [from, to]: readonly [number, number],
  combine: (partial: Result) => PictureResult | null,
): Generator<Progress<PictureResult>, Result> {
  for (;;) {
    const next = run.next();
    if (next.done) return next.value;
    const { fraction, stage, partial } = next.value;
    yield { fraction: from + (to - from) * fraction, stage, partial: partial && combine(partial) };
  }
}

/** Stands where cycles will be, so that a picture is whole from its first partial result on. */
function notBegun(model: CompiledModel, { parameter, from, to, withTwin }: SweepRequest) {
  const none = (stateSymbols: readonly string[]): CyclesResult => ({
    status: 'cancelled',
    message: NOT_BEGUN,
    parameterKey: parameter,
    from,
    to,
    stateSymbols,
    forcingPeriod: null,
    branches: [],
    specialPoints: [],
    points: 0,
    milliseconds: 0,
  });
  const { system, twin } = model;
  return {
    split: none(system.stateSymbols),
    twin: withTwin && twin.system ? none(twin.system.stateSymbols) : null,
  };
}
