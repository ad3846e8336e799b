import { differentiateByStates, substitute, type NodeId } from '../expression/index';
import { lowerFirst } from '../schema/document-symbols';
import type { PresetDocument, Trait } from '../schema/preset';
import { compileSystem, type CompileOptions } from './compile-system';
import type { CompiledSystem, TwinReport } from './contract';
import { isLumpable } from './lumpability';
import type { ModelGraph } from './model-graph';
import { classWeights, effectiveTraitValues, spreadGroups } from './spread';

/** The community without the differences, ready to be computed with. */
export interface PooledTwin {
  readonly report: TwinReport;
  /** Null where there is no twin. Takes the same parameters as the split model. */
  readonly system: CompiledSystem | null;
  /** For each state of the twin, the states of the split model that it stands for. */
  readonly states: readonly (readonly number[])[];
  /** Part of each split state in its population's total when pooled. */
  readonly weights: Float64Array;
}

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
  const none = { system: null, states: [], weights };
  const pooled = pooledTraits(document);
  const partial = partialTraits(document);
  const report = { pooledTraits: pooled, leftTraits: partial.map((one) => one.trait.symbol) };
  if (document.populations.every((population) => population.classes.length < 2)) {
    const reason = 'No population is split into classes, so there is nothing to pool.';
    return { ...none, report: { ...report, kind: 'no-split', reason } };
  }
  const spread = graph.parameter(model.spreadIndex);
  const zero = graph.constant(0);
  const pooledEquations = substitute(graph, model.equations, (node) => (node === spread ? zero : null));
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
  if (!lumpable) {
    const states = model.stateSymbols.map((_, i) => [i]);
    return {
      report: full,
      system: compileSystem({ ...model, equations: pooledEquations }, options),
      states,
      weights,
    };
  }
  const system = compileLumped(model, pooledEquations, weights, options);
  return { report: full, system, states: model.populations.map((one) => one.states), weights };
}

/** One state a population: the sum of its equations with u_i = w_i U. */
function compileLumped(
  model: ModelGraph,
  equations: readonly NodeId[],
  weights: Float64Array,
  options: CompileOptions,
): CompiledSystem {
  const { graph, populations } = model;
  const stands = new Map<NodeId, NodeId>();
  populations.forEach((population, k) => {
    const total = graph.state(k);
    // A lone class is its population's total; shares of a split one add up to it.
    for (const i of population.states) {
      const weight = population.states.length === 1 ? 1 : (weights[i] ?? 0);
      stands.set(graph.state(i), graph.multiply(graph.constant(weight), total));
    }
  });
  const sums = populations.map((population) => graph.sum(population.states.map((i) => equations[i] ?? 0)));
  const lumped = substitute(graph, sums, (node) => stands.get(node) ?? null);
  return compileSystem(
    {
      graph,
      equations: lumped,
      stateSymbols: populations.map((population) => population.symbol),
      parameterKeys: model.parameterKeys,
      defaults: model.defaults,
      nonnegative: populations.map((population) => model.nonnegative[population.states[0] ?? 0] ?? true),
      populations: populations.map((population, k) => ({ ...population, states: [k] })),
    },
    options,
  );
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
