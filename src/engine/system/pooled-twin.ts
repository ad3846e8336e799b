import { differentiateByStates, substitute, type NodeId } from '../expression/index';
import { lowerFirst } from '../schema/document-symbols';
import type { PresetDocument, Trait } from '../schema/preset';
import { compileSystem, type CompileOptions } from './compile-system';
import type { CompiledSystem, TwinReport } from './contract';
import { isLumpable } from './lumpability';
import type { FlowSource, ModelGraph } from './model-graph';
import { classWeights, effectiveTraitValues, spreadGroups } from './spread';

/** The community without the differences, ready to be computed with. */
export interface PooledTwin {
  readonly report: TwinReport;
  /** Null where there is no twin. Takes the same parameters as the split model. */
  readonly system: CompiledSystem | null;
  /** The expressions that it was compiled from, for its own constants of motion. */
  readonly source: FlowSource | null;
  /** For each state of the twin, the states of the split model that it stands for. */
  readonly states: readonly (readonly number[])[];
  /** Part of each split state in its population's total when pooled. */
  readonly weights: Float64Array;
}

const TOO_LARGE =
  'Not comparable, because the formulas are too large for a pooled twin to be made beside them.';

/**
 * Makes the pooled twin. The common dial is held at 0, so that every trait that follows it is at its
 * mean; a trait's own dial still moves traits that do not follow. Where the total of each population
 * then depends on totals alone, the twin is aggregated by putting u_i = w_i U; otherwise it is the
 * split model at spread 0. Without a common trait that differs there is nothing to pool.
 */
export function makePooledTwin(model: ModelGraph, options: CompileOptions = {}): PooledTwin {
  const { document, graph } = model;
  const n = model.stateSymbols.length;
  const weights = Float64Array.from(
    document.populations.flatMap((one) => classWeights(document, one.symbol)),
  );
  const none = { system: null, source: null, states: [], weights };
  const pooled = pooledTraits(document);
  const partial = partialTraits(document);
  const report = { pooledTraits: pooled, leftTraits: partial.map((one) => one.trait.symbol) };
  if (document.populations.every((population) => population.classes.length < 2)) {
    const reason = 'No population is split into classes, so there is nothing to pool.';
    return { ...none, report: { ...report, kind: 'no-split', reason } };
  }
  const tooLarge = (): PooledTwin => {
    graph.forgiveOverflow();
    return { ...none, report: { ...report, kind: 'not-comparable', reason: TOO_LARGE } };
  };
  const spread = graph.parameter(model.spreadIndex);
  const zero = graph.constant(0);
  const pooledEquations = substitute(graph, model.equations, (node) => (node === spread ? zero : null));
  if (graph.full) return tooLarge();
  const jacobian = differentiateByStates(graph, pooledEquations, n);
  const fits = !graph.full;
  graph.forgiveOverflow();
  const lumpable = fits && isLumpable(model, jacobian);
  if (!lumpable && pooled.length === 0) {
    return {
      ...none,
      report: { ...report, kind: 'not-comparable', reason: incomparable(document, partial) },
    };
  }
  const kind = lumpable ? 'lumped' : 'unlumped';
  const full = { ...report, kind, reason: reasonOf(document, lumpable, pooled, partial) } as const;
  const symbols = [...model.symbols];
  const meanings = substitute(
    graph,
    symbols.map(([, node]) => node),
    (node) => (node === spread ? zero : null),
  );
  const split: FlowSource = {
    ...model,
    equations: pooledEquations,
    symbols: new Map(symbols.map(([symbol], k) => [symbol, meanings[k] ?? zero])),
  };
  const source = lumpable ? lump(split, weights) : split;
  if (graph.full) return tooLarge();
  const { parameterKeys, defaults } = model;
  const system = compileSystem({ ...source, parameterKeys, defaults }, options);
  const states = lumpable
    ? model.populations.map((one) => one.states)
    : model.stateSymbols.map((_, i) => [i]);
  return { report: full, system, source, states, weights };
}

/** One state a population: the sum of its equations with u_i = w_i U. */
function lump(split: FlowSource, weights: Float64Array): FlowSource {
  const { graph, populations } = split;
  const stands = new Map<NodeId, NodeId>();
  populations.forEach((population, k) => {
    const total = graph.state(k);
    // A lone class is its population's total; shares of a split one add up to it.
    for (const i of population.states) {
      const weight = population.states.length === 1 ? 1 : (weights[i] ?? 0);
      stands.set(graph.state(i), graph.multiply(graph.constant(weight), total));
    }
  });
  const lumped = (nodes: readonly NodeId[]): NodeId[] =>
    substitute(graph, nodes, (node) => stands.get(node) ?? null);
  const sums = populations.map((population) =>
    graph.sum(population.states.map((i) => split.equations[i] ?? 0)),
  );
  const names = [...split.symbols.keys()];
  const meanings = lumped([...split.symbols.values()]);
  const totals = populations.map((one, k) => [one.symbol, graph.state(k)] as const);
  return {
    graph,
    equations: lumped(sums),
    stateSymbols: populations.map((population) => population.symbol),
    nonnegative: populations.map((population) => split.nonnegative[population.states[0] ?? 0] ?? true),
    populations: populations.map((population, k) => ({ ...population, states: [k] })),
    starts: Float64Array.from(populations, (one) =>
      one.states.reduce((sum, i) => sum + (split.starts[i] ?? 0), 0),
    ),
    symbols: new Map([...names.map((name, k) => [name, meanings[k] ?? 0] as const), ...totals]),
    givenConstants: split.givenConstants,
  };
}

/** Traits that the common dial pools and that differ between classes, as entered. */
function pooledTraits(document: PresetDocument): TwinReport['pooledTraits'] {
  const inForce = effectiveTraitValues(document);
  return document.traits.flatMap((trait, index) => {
    if (!trait.followsSpread) return [];
    const groups = inForce.groups.filter((group) => group.trait === index);
    const differs = groups.some((group) => {
      const values = group.entries.map((k) => trait.entries[k]?.value);
      return values.some((value) => value !== values[0]);
    });
    if (!differs) return [];
    const coefficientOfVariation = Math.max(...groups.map((group) => group.coefficientOfVariation));
    return [{ trait: trait.symbol, mean: trait.mean, coefficientOfVariation }];
  });
}

interface PartialTrait {
  readonly trait: Trait;
  readonly population: string;
}

/** Traits that some classes of a split population have and others lack. */
function partialTraits(document: PresetDocument): readonly PartialTrait[] {
  const complete = spreadGroups(document);
  return document.traits.flatMap((trait, index) => {
    const population = document.populations.find(
      (one) =>
        one.classes.length > 1 &&
        trait.entries.some((entry) => one.classes.some((other) => entry.of.includes(other.symbol))) &&
        !complete.some((group) => group.trait === index && group.populations.includes(one.symbol)),
    );
    return population === undefined ? [] : [{ trait, population: population.name || population.symbol }];
  });
}

function incomparable(document: PresetDocument, partial: readonly PartialTrait[]): string {
  const split = document.populations
    .filter((one) => one.classes.length > 1)
    .map((one) => lowerFirst(one.name || one.symbol));
  const [first] = partial;
  if (first !== undefined) {
    return `Not comparable, because the classes of ${lowerFirst(first.population)} differ only in traits that some of them lack (${partial.map((one) => lowerFirst(one.trait.name || one.trait.symbol)).join(', ')}), and a mean over those means nothing.`;
  }
  return `Not comparable, because the classes of ${split.join(' and ')} differ in their processes and not in a trait that all of them have and that the spread dial moves; there is no mean to hold.`;
}

function reasonOf(
  document: PresetDocument,
  lumpable: boolean,
  pooled: TwinReport['pooledTraits'],
  partial: readonly PartialTrait[],
): string {
  const names = pooled.map((one) => {
    const trait = document.traits.find((other) => other.symbol === one.trait);
    return `${lowerFirst(trait?.name || one.trait)} (${one.mean} mean)`;
  });
  const left = partial.map((one) => lowerFirst(one.trait.name || one.trait.symbol));
  const held =
    names.length === 0 ? 'The classes differ in no trait that the dial moves' : `Pooled: ${names.join(', ')}`;
  const kept =
    left.length === 0 ? '' : `; left as entered, because only some classes have them: ${left.join(', ')}`;
  const form = lumpable
    ? 'at spread 0 totals depend on totals alone, so the twin has one state a population'
    : 'not lumpable, because at spread 0 totals still depend on the composition of classes; the twin is the split model at spread 0 from pooled start values';
  return `${held}${kept}; ${form}.`;
}
