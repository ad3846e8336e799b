import { reachable, type ExpressionGraph, type NodeId } from '../expression/index';
import { applyOperation, OPERATION } from '../expression/operations';

/**
 * Values of some nodes of a graph, worked out node by node without compiling anything: right for the
 * few evaluations of an identity test, where compiling would cost more than it saves.
 * Returns an evaluator that writes out[k] = value of outputs[k] at time t, state u and parameters p.
 */
export function evaluateNodes(
  graph: ExpressionGraph,
  outputs: readonly NodeId[],
): (t: number, u: ArrayLike<number>, p: ArrayLike<number>, out: Float64Array) => void {
  const nodes = reachable(graph, outputs);
  const values = new Float64Array(nodes.length === 0 ? 0 : (nodes[nodes.length - 1] ?? 0) + 1);
  return (t, u, p, out) => {
    for (const node of nodes) {
      const operation = graph.operation(node);
      values[node] =
        operation === OPERATION.constant
          ? graph.value(node)
          : operation === OPERATION.state
            ? (u[graph.value(node)] ?? Number.NaN)
            : operation === OPERATION.parameter
              ? (p[graph.value(node)] ?? Number.NaN)
              : operation === OPERATION.time
                ? t
                : applyOperation(
                    operation,
                    values[graph.operand(node, 0)] ?? 0,
                    values[graph.operand(node, 1)] ?? 0,
                    values[graph.operand(node, 2)] ?? 0,
                  );
    }
    outputs.forEach((node, k) => {
      out[k] = values[node] ?? Number.NaN;
    });
  };
}
