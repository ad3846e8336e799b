import { addTree, ExpressionGraph, nearestSymbol, parseFormula, type NodeId } from '../expression/index';
import { isSymbol } from '../schema/symbols';
import { compileSystem, type CompileOptions } from './compile-system';
import type { CompiledSystem } from './contract';

/** A system in the notation of textbooks. */
export interface EquationsInput extends CompileOptions {
  /** One a state, in order: `x' = x*(1 - y)`. */
  readonly equations: readonly string[];
  readonly parameters?: Readonly<Record<string, number>>;
  /** Start values; absent ones are 0. */
  readonly init?: Readonly<Record<string, number>>;
  /** Whether every state must stay >= 0; false unless told. */
  readonly nonnegative?: boolean;
}

export type EquationsResult =
  | { readonly ok: true; readonly system: CompiledSystem; readonly starts: Float64Array }
  | { readonly ok: false; readonly message: string };

const EQUATION = /^\s*([A-Za-z][A-Za-z0-9_]*)\s*'\s*=(?!=)([\s\S]*)$/;

/**
 * Compiles a system of equations given as text: states are the names with a prime, in order, each a
 * population of its own; everything else in the formulas is a parameter or the time `t`. Parameter keys are
 * the names of `parameters` in their order. Fails with a message that quotes the equation.
 */
export function systemFromEquations(input: EquationsInput): EquationsResult {
  const sides: { readonly symbol: string; readonly formula: string; readonly text: string }[] = [];
  for (const text of input.equations) {
    const match = EQUATION.exec(text);
    if (match === null) return refuse(text, "An equation is written x' = formula.");
    const [, symbol = '', formula = ''] = match;
    if (!isSymbol(symbol)) return refuse(text, `${symbol} cannot name a state.`);
    if (sides.some((side) => side.symbol === symbol)) return refuse(text, `${symbol} has two equations.`);
    sides.push({ symbol, formula, text });
  }
  const stateSymbols = sides.map((side) => side.symbol);
  const parameters = input.parameters ?? {};
  const parameterKeys = Object.keys(parameters);
  const clash = parameterKeys.find((key) => stateSymbols.includes(key));
  if (clash !== undefined) return { ok: false, message: `${clash} is both a state and a parameter.` };

  const graph = new ExpressionGraph();
  const known = new Map<string, NodeId>();
  parameterKeys.forEach((key, k) => known.set(key, graph.parameter(k)));
  stateSymbols.forEach((symbol, i) => known.set(symbol, graph.state(i)));
  const resolve = (symbol: string): NodeId | null => known.get(symbol) ?? null;
  const equations: NodeId[] = [];
  for (const { formula, text } of sides) {
    const parsed = parseFormula(formula);
    if (!parsed.ok) return refuse(text, parsed.failure.message);
    const added = addTree(graph, parsed.tree, resolve);
    if (!added.ok)
      return refuse(text, withSuggestion(added.failure.message, formula, added.failure.range, known));
    equations.push(added.node);
  }

  const system = compileSystem(
    {
      graph,
      equations,
      stateSymbols,
      parameterKeys,
      defaults: Object.values(parameters),
      nonnegative: stateSymbols.map(() => input.nonnegative ?? false),
      populations: stateSymbols.map((symbol, i) => ({ symbol, name: symbol, states: [i] })),
    },
    input.backend === undefined ? {} : { backend: input.backend },
  );
  const starts = Float64Array.from(stateSymbols, (symbol) => input.init?.[symbol] ?? 0);
  return { ok: true, system, starts };
}

function refuse(equation: string, message: string): EquationsResult {
  return { ok: false, message: `${equation.trim()}: ${message}` };
}

function withSuggestion(
  message: string,
  formula: string,
  range: { readonly from: number; readonly to: number },
  known: ReadonlyMap<string, NodeId>,
): string {
  const nearest = nearestSymbol(formula.slice(range.from, range.to), known.keys());
  return nearest === null ? message : `${message} Perhaps ${nearest} is meant.`;
}
