import { addTree, ExpressionGraph, parseFormula, type NodeId } from '@/engine/expression';

/** Adds formulas over states x, y and parameters a, b to one graph; throws where one is refused. */
export function graphOf(texts: readonly string[]): { graph: ExpressionGraph; nodes: NodeId[] } {
  const graph = new ExpressionGraph();
  const names = new Map<string, NodeId>([
    ['x', graph.state(0)],
    ['y', graph.state(1)],
    ['a', graph.parameter(0)],
    ['b', graph.parameter(1)],
  ]);
  const nodes = texts.map((text) => {
    const parsed = parseFormula(text);
    if (!parsed.ok) throw new Error(parsed.failure.message);
    const added = addTree(graph, parsed.tree, (symbol) => names.get(symbol) ?? null);
    if (!added.ok) throw new Error(added.failure.message);
    return added.node;
  });
  return { graph, nodes };
}
