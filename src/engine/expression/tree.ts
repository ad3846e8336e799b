import type { FunctionName } from '../schema/symbols';

/**
 * The checked tree of a formula: what `parseFormula` hands out, immutable. `from` and `to` are
 * character positions in the formula's text (`to` one past the end), without enclosing parentheses.
 */
export type FormulaNode =
  NumberNode | SymbolNode | NegateNode | BinaryNode | CompareNode | CallNode | ConditionalNode;

export type BinaryOperator = '+' | '-' | '*' | '/' | '^';
export type CompareOperator = '<' | '<=' | '>' | '>=' | '==' | '!=';

interface Range {
  readonly from: number;
  readonly to: number;
}
export interface NumberNode extends Range {
  readonly kind: 'number';
  readonly value: number;
}
export interface SymbolNode extends Range {
  readonly kind: 'symbol';
  readonly name: string;
}
export interface NegateNode extends Range {
  readonly kind: 'negate';
  readonly operand: FormulaNode;
}
export interface BinaryNode extends Range {
  readonly kind: 'binary';
  readonly operator: BinaryOperator;
  readonly left: FormulaNode;
  readonly right: FormulaNode;
}
/** Worth 1 where it holds and 0 elsewhere. */
export interface CompareNode extends Range {
  readonly kind: 'compare';
  readonly operator: CompareOperator;
  readonly left: FormulaNode;
  readonly right: FormulaNode;
}
export interface CallNode extends Range {
  readonly kind: 'call';
  readonly name: FunctionName;
  readonly arguments: readonly FormulaNode[];
}
/** `condition ? then : otherwise`; the condition holds where it is not 0. */
export interface ConditionalNode extends Range {
  readonly kind: 'conditional';
  readonly condition: FormulaNode;
  readonly then: FormulaNode;
  readonly otherwise: FormulaNode;
}

/** A refusal in words, at the place it concerns; `suggestion` is a replacement for that range. */
export interface FormulaFailure {
  readonly message: string;
  readonly range: { readonly from: number; readonly to: number };
  readonly suggestion: string | null;
}

export function childrenOf(node: FormulaNode): readonly FormulaNode[] {
  switch (node.kind) {
    case 'number':
    case 'symbol':
      return [];
    case 'negate':
      return [node.operand];
    case 'binary':
    case 'compare':
      return [node.left, node.right];
    case 'call':
      return node.arguments;
    case 'conditional':
      return [node.condition, node.then, node.otherwise];
  }
}

/** Visits every node, parents before children, in the order of the text. */
export function visit(tree: FormulaNode, see: (node: FormulaNode) => void): void {
  see(tree);
  for (const child of childrenOf(tree)) visit(child, see);
}

/** Names of the symbols in a tree, each once, in the order of first appearance (`t` included). */
export function symbolsOf(tree: FormulaNode): readonly string[] {
  const names = new Set<string>();
  visit(tree, (node) => {
    if (node.kind === 'symbol') names.add(node.name);
  });
  return [...names];
}
