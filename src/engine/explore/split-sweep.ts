import type { Progress, SweepResult } from '../continuation/contract';
import { sweep } from '../continuation/sweep';
import type { CompiledModel } from '../system/compile-model';
import type { EquilibriaPair, SplitSweepResult, SweepRequest } from './contract';
import { findEquilibriaPair, splitBox, twinBox } from './equilibria-pair';
import { judgeModel, pairEquilibria } from './judge';
import { answersUnderOtherMeans, type OtherMean } from './other-means';
import { sweptRange } from './swept-range';
import { startsOf } from './trajectories';
import { untilCancelled } from './until-cancelled';

export interface SplitSweepOptions {
  /** Asked between slices; true ends the sweep with what was found. */
  readonly isCancelled?: () => boolean;
  /** Long-run bands past Hopf points, whatever the request says. */
  readonly bands?: boolean;
  /** Equilibria at the request's own numbers, where they are known; else they are sought first. */
  readonly equilibria?: EquilibriaPair;
  /** Milliseconds; the engine has no clock of its own. */
  readonly clock?: () => number;
}

/**
 * Sweeps one parameter of a model and then of its pooled twin, and judges both. A generator whose
 * progress holds the result so far, the verdict on it included; cancelled or left early, nothing found is
 * lost.
 */
export function* sweepSplitAndTwin(
  model: CompiledModel,
  request: SweepRequest,
  options: SplitSweepOptions = {},
): Generator<Progress<SplitSweepResult>, SplitSweepResult> {
  const p = model.valuesToParameters(request.values);
  const starts = startsOf(model, request);
  const twinSystem = request.withTwin ? model.twin.system : null;
  const share = twinSystem ? 0.5 : 1;
  const bands = options.bands ?? request.bands;
  const shared = {
    ...sweptRange(model, request),
    ...(options.clock ? { clock: options.clock } : {}),
    ...(bands === undefined ? {} : { bands }),
  };
  // The verdict rests on the equilibria at the present numbers as well. They are paired before the sweeps
  // begin, since pairing moves the parameters of the split system.
  const found = options.equilibria ?? (yield* pairAtPresent(model, request, options));
  const pairs = pairEquilibria(model, p, found);
  const combine = (
    split: SweepResult,
    twin: SweepResult | null,
    others: readonly OtherMean[] = [],
  ): SplitSweepResult => ({
    split,
    twin,
    verdict: judgeModel(model, p, found, pairs, { parameter: request.parameter, split, twin }, others),
  });
  // The swept value is written to the parameters, so each sweep has its own.
  const split = yield* untilCancelled(
    sweep(model.system, p.slice(), { ...shared, starts: [starts], box: splitBox(model, request.box) }),
    { from: 0, share },
    (partial) => combine(partial, null),
    options.isCancelled,
  );
  if (!twinSystem || split.status === 'cancelled') return combine(split, null);
  const twin = yield* untilCancelled(
    sweep(twinSystem, p.slice(), {
      ...shared,
      starts: [model.toTwinStarts(starts)],
      box: twinBox(model, request.box),
    }),
    { from: share, share },
    (partial) => combine(split, partial),
    options.isCancelled,
  );
  if (twin.status === 'cancelled') return combine(split, twin);
  return combine(split, twin, yield* underOtherMeans(model, request));
}

function* underOtherMeans(
  model: CompiledModel,
  request: SweepRequest,
): Generator<Progress<SplitSweepResult>, readonly OtherMean[]> {
  const work = answersUnderOtherMeans(model, request.values, request.box);
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
    yield { fraction: 1, stage: 'the same under other means', partial: null };
  }
}

function* pairAtPresent(
  model: CompiledModel,
  request: SweepRequest,
  { isCancelled }: SplitSweepOptions,
): Generator<Progress<SplitSweepResult>, EquilibriaPair> {
  const search = findEquilibriaPair(model, request.values, {
    starts: [startsOf(model, request)],
    ...(request.box ? { box: request.box } : {}),
    ...(isCancelled ? { isCancelled } : {}),
  });
  for (;;) {
    const next = search.next();
    if (next.done) return next.value;
    yield { fraction: 0, stage: next.value.stage, partial: null };
  }
}
