import type { ExpressionGraph, NodeId } from '../expression/index';
import type { PresetDocument, Trait } from '../schema/preset';
import { SPREAD_KEY, traitDialKey, traitEntrySymbol } from '../schema/symbols';

/**
 * Spread of traits between classes. With g the scale of the held mean (identity, logarithm or
 * reciprocal), weights w_i of sum 1 and G = sum_i w_i g(v_i), the trait of class i at spread s is
 *
 *     v_i(s) = g^-1( G + s (g(v_i) - G) ),
 *
 * which is the mean at s = 0 and the value as entered at s = 1. It is evaluated as a blend of the
 * mean value M = g^-1(G) and v_i, so that both ends come out without rounding:
 * arithmetic (1-s) M + s v; geometric M^(1-s) v^s; harmonic 1/((1-s)/M + s/v). Own derivation.
 */
export type MeanRule = Trait['mean'];

/** Classes (or pairs of classes) among which one trait is pooled. */
export interface SpreadGroup {
  readonly trait: number;
  /** Population symbols: one, or consumer and resource for a trait of pairs. */
  readonly populations: readonly string[];
  /** Indices into the trait's entries. */
  readonly entries: readonly number[];
  /** Sum 1; shares at birth as entered, equal where there are none. Constants of the document. */
  readonly weights: readonly number[];
}

/** Traits that keep their classes' values when the common dial moves, and are pooled by equal weights. */
const EQUAL_WEIGHT_ROLES: ReadonlySet<Trait['role']> = new Set([
  'share-of-births',
  'maturation',
  'switching',
]);

/**
 * Groups in which a trait can be pooled: a population of several classes that all have a value (for
 * pairs: all pairs of two populations). Values outside any group stay as entered.
 */
export function spreadGroups(document: PresetDocument): readonly SpreadGroup[] {
  const groups: SpreadGroup[] = [];
  const shares = new Map(document.populations.map((one) => [one.symbol, classWeights(document, one.symbol)]));
  document.traits.forEach((trait, index) => {
    const at = new Map(trait.entries.map((entry, k) => [entry.of.join(' '), k]));
    const equal = EQUAL_WEIGHT_ROLES.has(trait.role);
    for (const first of document.populations) {
      const others = trait.per === 'pair' ? document.populations : [null];
      for (const second of others) {
        const keys = first.classes.flatMap((one, i) =>
          (second?.classes ?? [null]).map((other, j) => ({
            key: other === null ? one.symbol : `${one.symbol} ${other.symbol}`,
            weight:
              (shares.get(first.symbol)?.[i] ?? 0) *
              (second === null ? 1 : (shares.get(second.symbol)?.[j] ?? 0)),
          })),
        );
        if (keys.length < 2 || !keys.every((one) => at.has(one.key))) continue;
        groups.push({
          trait: index,
          populations: second === null ? [first.symbol] : [first.symbol, second.symbol],
          entries: keys.map((one) => at.get(one.key) ?? 0),
          weights: equal ? keys.map(() => 1 / keys.length) : keys.map((one) => one.weight),
        });
      }
    }
  });
  return groups;
}

/** Shares at birth of a population's classes as entered, scaled to sum 1; equal where it has none. */
export function classWeights(document: PresetDocument, population: string): readonly number[] {
  const classes = document.populations.find((one) => one.symbol === population)?.classes ?? [];
  const equal = classes.map(() => 1 / classes.length);
  for (const trait of document.traits) {
    if (trait.role !== 'share-of-births' || trait.per !== 'class') continue;
    const values = classes.map((one) => trait.entries.find((entry) => entry.of[0] === one.symbol)?.value);
    if (!values.every((value) => value !== undefined && value >= 0)) continue;
    const sum = values.reduce<number>((total, value) => total + (value ?? 0), 0);
    return sum > 0 ? values.map((value) => (value ?? 0) / sum) : equal;
  }
  return equal;
}

/** Value held when the group is pooled. Harmonic and geometric means need positive values, else NaN. */
export function meanValue(mean: MeanRule, values: readonly number[], weights: readonly number[]): number {
  const sum = (of: (v: number) => number): number =>
    values.reduce((total, v, k) => (weights[k] === 0 ? total : total + (weights[k] ?? 0) * of(v)), 0);
  if (mean === 'arithmetic') return sum((v) => v);
  if (values.some((v) => v <= 0)) return Number.NaN;
  return mean === 'geometric' ? Math.exp(sum(Math.log)) : 1 / sum((v) => 1 / v);
}

/** v(s) for one value v, mean value M and spread s; NaN beyond the end of g^-1. */
export function spreadValue(mean: MeanRule, M: number, v: number, s: number): number {
  if (mean === 'arithmetic') return (1 - s) * M + s * v;
  if (mean === 'geometric') return Math.pow(M, 1 - s) * Math.pow(v, s);
  const reciprocal = (1 - s) / M + s / v;
  return reciprocal > 0 ? 1 / reciprocal : Number.NaN;
}

/** The same as expressions: effective values of a group from the nodes of its entered values. */
export function spreadNodes(
  graph: ExpressionGraph,
  mean: MeanRule,
  entered: readonly NodeId[],
  weights: readonly number[],
  s: NodeId,
): readonly NodeId[] {
  const one = graph.constant(1);
  const rest = graph.subtract(one, s);
  const weighted = (g: (node: NodeId) => NodeId): NodeId =>
    graph.sum(entered.map((node, k) => graph.multiply(graph.constant(weights[k] ?? 0), g(node))));
  if (mean === 'arithmetic') {
    const M = weighted((node) => node);
    return entered.map((v) => graph.add(graph.multiply(rest, M), graph.multiply(s, v)));
  }
  if (mean === 'geometric') {
    const M = graph.exp(weighted((node) => graph.log(node)));
    return entered.map((v) => graph.multiply(graph.power(M, rest), graph.power(v, s)));
  }
  const G = weighted((node) => graph.divide(one, node));
  return entered.map((v) => graph.divide(one, graph.add(graph.multiply(rest, G), graph.divide(s, v))));
}

/** One value of the trait table as entered and under the dials. */
export interface EffectiveTraitValue {
  readonly trait: string;
  readonly of: readonly string[];
  /** Symbol by which formulas read it. */
  readonly symbol: string;
  readonly entered: number;
  readonly effective: number;
  /** Mean of its group, null where the trait is not pooled. */
  readonly mean: number | null;
  /** Index into `groups`, null where it is not pooled. */
  readonly group: number | null;
}

export interface EffectiveTraits {
  readonly values: readonly EffectiveTraitValue[];
  readonly groups: readonly (SpreadGroup & {
    readonly symbol: string;
    /** Spread in force: own dial, times the common one where it follows. */
    readonly spread: number;
    readonly mean: number;
    /** Weighted standard deviation over weighted mean of the values in force. */
    readonly coefficientOfVariation: number;
  })[];
}

/** Trait values in force, with values of trait entries and dials that override the document's by key. */
export function effectiveTraitValues(
  document: PresetDocument,
  values: Readonly<Record<string, number>> = {},
): EffectiveTraits {
  const symbols = document.traits.map((trait) =>
    trait.entries.map((entry) => traitEntrySymbol(trait.symbol, entry.of)),
  );
  const entered = document.traits.map((trait, t) =>
    trait.entries.map((entry, k) => values[symbols[t]?.[k] ?? ''] ?? entry.value),
  );
  const inForce = new Map<string, { effective: number; mean: number; group: number }>();
  const groups = spreadGroups(document).map((group, g) => {
    const trait = document.traits[group.trait] as Trait;
    const own = group.entries.map((k) => entered[group.trait]?.[k] ?? 0);
    const mean = meanValue(trait.mean, own, group.weights);
    const spread = spreadInForce(document, trait, values);
    const effective = own.map((v) => spreadValue(trait.mean, mean, v, spread));
    group.entries.forEach((k, i) =>
      inForce.set(`${group.trait} ${k}`, { effective: effective[i] ?? 0, mean, group: g }),
    );
    const coefficientOfVariation = variation(effective, group.weights);
    return { ...group, symbol: trait.symbol, spread, mean, coefficientOfVariation };
  });
  const table = document.traits.flatMap((trait, t) =>
    trait.entries.map((entry, k) => {
      const value = entered[t]?.[k] ?? entry.value;
      const found = inForce.get(`${t} ${k}`);
      return {
        trait: trait.symbol,
        of: entry.of,
        symbol: symbols[t]?.[k] ?? '',
        entered: value,
        effective: found?.effective ?? value,
        mean: found?.mean ?? null,
        group: found?.group ?? null,
      };
    }),
  );
  return { values: table, groups };
}

function spreadInForce(
  document: PresetDocument,
  trait: Trait,
  values: Readonly<Record<string, number>>,
): number {
  const own = values[traitDialKey(trait.symbol)] ?? trait.dial;
  return trait.followsSpread ? own * (values[SPREAD_KEY] ?? document.spread) : own;
}

function variation(values: readonly number[], weights: readonly number[]): number {
  const mean = values.reduce((sum, v, k) => sum + (weights[k] ?? 0) * v, 0);
  const square = values.reduce((sum, v, k) => sum + (weights[k] ?? 0) * (v - mean) ** 2, 0);
  return square === 0 ? 0 : Math.sqrt(square) / Math.abs(mean);
}
