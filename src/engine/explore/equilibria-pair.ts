import type { Progress } from '../continuation/contract';
import type { EquilibriaResult } from '../equilibria/contract';
import type { DescriptionOptions } from '../equilibria/describe';
import { findEquilibria, type SearchOptions } from '../equilibria/search';
import { trackEquilibria } from '../equilibria/track';
import { SPREAD_KEY } from '../schema/symbols';
import type { CompiledModel } from '../system/compile-model';
import { constantsOfMotionAt } from '../system/constants-of-motion';
import type { BoxSides, EquilibriaPair, ParameterValues } from './contract';

export interface PairSearchOptions {
  /** States of the split model to start from as well; their totals serve the twin. */
  readonly starts?: readonly Float64Array[];
  readonly box?: BoxSides;
  readonly isCancelled?: () => boolean;
}

/**
 * All equilibria of a model and of its pooled twin, in the document's box or the one given. A generator: partial
 * results are those of the split model until the twin's turn.
 */
export function* findEquilibriaPair(
  model: CompiledModel,
  values: ParameterValues,
  options: PairSearchOptions = {},
): Generator<Progress<EquilibriaPair>, EquilibriaPair> {
  const p = model.valuesToParameters(values);
  const { system, twin } = model;
  const starts = options.starts ?? [model.starts];
  const base = options.isCancelled ? { isCancelled: options.isCancelled } : {};
  const share = twin.system ? 0.5 : 1;
  const split = yield* searchOne(
    findEquilibria(system, p, {
      ...base,
      ...describeSplit(model, p),
      box: splitBox(model, options.box),
      starts,
    }),
    (found) => ({ split: found, twin: null }),
    0,
    share,
  );
  if (!twin.system) return { split, twin: null };
  const pooled = yield* searchOne(
    findEquilibria(twin.system, p, {
      ...base,
      ...describeTwin(model, p),
      box: twinBox(model, options.box),
      starts: starts.map((one) => model.toTwinStarts(one)),
    }),
    (found) => ({ split, twin: found }),
    share,
    share,
  );
  return { split, twin: pooled };
}

/** Follows known equilibria of both to new parameters. */
export function followEquilibriaPair(
  model: CompiledModel,
  p: Float64Array,
  known: EquilibriaPair,
): EquilibriaPair {
  const { system, twin } = model;
  return {
    split: trackEquilibria(system, known.split, p, describeSplit(model, p)),
    twin:
      twin.system && known.twin ? trackEquilibria(twin.system, known.twin, p, describeTwin(model, p)) : null,
  };
}

function* searchOne(
  search: Generator<Progress<EquilibriaResult>, EquilibriaResult>,
  pair: (found: EquilibriaResult) => EquilibriaPair,
  from: number,
  share: number,
): Generator<Progress<EquilibriaPair>, EquilibriaResult> {
  for (;;) {
    const next = search.next();
    if (next.done) return next.value;
    const { fraction, stage, partial } = next.value;
    yield { fraction: from + share * fraction, stage, partial: partial && pair(partial) };
  }
}

/**
 * Constants of motion are asked for only where eigenvalues leave the type open. At spread 0 the classes
 * are alike, and modes of their composition alone are told apart.
 */
function describeSplit(model: CompiledModel, p: Float64Array): DescriptionOptions {
  const spread = model.parameterIndex(SPREAD_KEY);
  return {
    constantsOfMotion: () => constantsOfMotionAt(model.source, p),
    compositionModes: spread >= 0 && p[spread] === 0,
  };
}

function describeTwin(model: CompiledModel, p: Float64Array): DescriptionOptions {
  const { source } = model.twin;
  return {
    constantsOfMotion: () => (source ? constantsOfMotionAt(source, p) : []),
    compositionModes: model.twin.report.kind === 'unlumped',
  };
}

export function splitBox(model: CompiledModel, sides: BoxSides = {}): NonNullable<SearchOptions['box']> {
  return model.system.stateSymbols.map((symbol) => {
    if (!Object.hasOwn(sides, symbol)) return model.document.box.find((one) => one.class === symbol) ?? null;
    const [from, to] = sides[symbol];
    return { from, to };
  });
}

/** A total's box is the sum of those of its classes, where all of them have one. */
export function twinBox(model: CompiledModel, sides: BoxSides = {}): NonNullable<SearchOptions['box']> {
  const boxes = splitBox(model, sides);
  return model.twin.states.map((states) => {
    let from = 0;
    let to = 0;
    for (const i of states) {
      const box = boxes[i];
      if (!box) return null;
      from += box.from;
      to += box.to;
    }
    return { from, to };
  });
}
