import { TIME_SYMBOL, type FunctionName } from '../schema/symbols';
import type { ExpressionGraph, NodeId } from './graph';
import type { BinaryOperator, CallNode, CompareOperator, FormulaFailure, FormulaNode } from './tree';

export type AddResult =
  { readonly ok: true; readonly node: NodeId } | { readonly ok: false; readonly failure: FormulaFailure };

/**
 * Adds a formula's tree to a graph. `resolve` gives the node of a symbol, or null where it is
 * unknown (a failure with the symbol's place); `t` is the time unless `resolve` gives it a meaning.
 * Fails also when the graph is full.
 */
export function addTree(
  graph: ExpressionGraph,
  tree: FormulaNode,
  resolve: (symbol: string) => NodeId | null,
): AddResult {
  const addition = new Addition(graph, resolve);
  const node = addition.add(tree);
  if (addition.failure !== null) return { ok: false, failure: addition.failure };
  if (!graph.full) return { ok: true, node };
  const message = `The formulas together have more than ${graph.capacity} parts; make the model smaller.`;
  return { ok: false, failure: { message, range: { from: tree.from, to: tree.to }, suggestion: null } };
}

class Addition {
  failure: FormulaFailure | null = null;

  constructor(
    private readonly graph: ExpressionGraph,
    private readonly resolve: (symbol: string) => NodeId | null,
  ) {}

  add(tree: FormulaNode): NodeId {
    const { graph } = this;
    switch (tree.kind) {
      case 'number':
        return graph.constant(tree.value);
      case 'symbol':
        return this.symbol(tree.name, tree.from, tree.to);
      case 'negate':
        return graph.negate(this.add(tree.operand));
      case 'binary':
        return this.binary(tree.operator, this.add(tree.left), this.add(tree.right));
      case 'compare':
        return this.compare(tree.operator, this.add(tree.left), this.add(tree.right));
      case 'call':
        return this.call(tree);
      case 'conditional':
        return graph.select(this.add(tree.condition), this.add(tree.then), this.add(tree.otherwise));
    }
  }

  private symbol(name: string, from: number, to: number): NodeId {
    const node = this.resolve(name);
    if (node !== null) return node;
    if (name === TIME_SYMBOL) return this.graph.time();
    this.failure ??= { message: `The symbol ${name} is unknown.`, range: { from, to }, suggestion: null };
    return this.graph.constant(Number.NaN);
  }

  private binary(operator: BinaryOperator, a: NodeId, b: NodeId): NodeId {
    switch (operator) {
      case '+':
        return this.graph.add(a, b);
      case '-':
        return this.graph.subtract(a, b);
      case '*':
        return this.graph.multiply(a, b);
      case '/':
        return this.graph.divide(a, b);
      case '^':
        return this.graph.power(a, b);
    }
  }

  private compare(operator: CompareOperator, a: NodeId, b: NodeId): NodeId {
    switch (operator) {
      case '<':
        return this.graph.less(a, b);
      case '<=':
        return this.graph.lessEqual(a, b);
      case '>':
        return this.graph.less(b, a);
      case '>=':
        return this.graph.lessEqual(b, a);
      case '==':
        return this.graph.equal(a, b);
      case '!=':
        return this.graph.notEqual(a, b);
    }
  }

  private call(tree: CallNode): NodeId {
    const [first, ...others] = tree.arguments.map((argument) => this.add(argument));
    if (first === undefined) return this.graph.constant(Number.NaN);
    const name: FunctionName = tree.name;
    if (name === 'min' || name === 'max') return others.reduce((a, b) => this.graph[name](a, b), first);
    return this.graph[name](first);
  }
}
