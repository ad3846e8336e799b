import type { ExpressionGraph, NodeId } from './graph';
import { KINKED, OPERANDS } from './operations';

/** All nodes that the outputs need, operands before their users. Cost: nodes of the graph. */
export function reachable(graph: ExpressionGraph, outputs: readonly NodeId[]): readonly NodeId[] {
  let last = -1;
  for (const output of outputs) last = Math.max(last, output);
  const needed = new Uint8Array(last + 1);
  for (const output of outputs) needed[output] = 1;
  let count = 0;
  for (let node = last; node >= 0; node -= 1) {
    if (needed[node] === 0) continue;
    count += 1;
    const operands = OPERANDS[graph.operation(node)] as number;
    for (let k = 0; k < operands; k += 1) needed[graph.operand(node, k as 0 | 1 | 2)] = 1;
  }
  const nodes = new Array<NodeId>(count);
  for (let node = 0, k = 0; node <= last; node += 1) {
    if (needed[node] === 1) {
      nodes[k] = node;
      k += 1;
    }
  }
  return nodes;
}

/**
 * The outputs with some nodes replaced, e.g. parameters by expressions. `replace` is asked for every
 * node that the outputs need and answers null to keep it; replacements are not searched again.
 */
export function substitute(
  graph: ExpressionGraph,
  outputs: readonly NodeId[],
  replace: (node: NodeId) => NodeId | null,
): NodeId[] {
  const image = new Map<NodeId, NodeId>();
  const of = (node: NodeId): NodeId => (node < 0 ? node : (image.get(node) ?? node));
  for (const node of reachable(graph, outputs)) {
    const replaced = replace(node);
    if (replaced !== null) {
      image.set(node, replaced);
      continue;
    }
    const [a, b, c] = [graph.operand(node, 0), graph.operand(node, 1), graph.operand(node, 2)];
    const [x, y, z] = [of(a), of(b), of(c)];
    if (x !== a || y !== b || z !== c) image.set(node, graph.combine(graph.operation(node), x, y, z));
  }
  return outputs.map(of);
}

/** Whether any of the outputs needs the node. */
export function dependsOn(graph: ExpressionGraph, outputs: readonly NodeId[], node: NodeId): boolean {
  return reachable(graph, outputs).includes(node);
}

/**
 * Nodes with a kink (min, max, abs, comparison, conditional) that move with the state or the time:
 * where these switch, derivatives of second and higher order do not exist.
 */
export function kinksOf(graph: ExpressionGraph, outputs: readonly NodeId[]): readonly NodeId[] {
  return reachable(graph, outputs).filter(
    (node) => KINKED.has(graph.operation(node)) && (graph.dependsOnState(node) || graph.dependsOnTime(node)),
  );
}
