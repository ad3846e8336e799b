import type { ExpressionGraph, NodeId } from './graph';
import { OPERANDS, OPERATION } from './operations';
import { reachable } from './traverse';

/**
 * Exact derivatives of the outputs with respect to one leaf (a state, a parameter or the time), as
 * nodes of the same graph: out[i] = d outputs[i] / d variable.
 *
 * Forward accumulation over the shared nodes, so that common parts are shared again. Where min, max,
 * abs or a conditional switches, the result is the derivative of the active branch (of the first
 * operand at a tie of min and max, of the positive side at abs(0)); `kinksOf` lists these places.
 * Powers: d(a^b) = b a^(b-1) da + a^b log(a) db, with the second part 0 where a^b is 0 and the
 * first 0 where b is 0, so that a = 0 is no false singularity.
 * Failure: none of its own; a graph that gets full says so in `graph.full`.
 * Cost: nodes that the outputs need, times a small constant, per variable.
 */
export function differentiate(
  graph: ExpressionGraph,
  outputs: readonly NodeId[],
  variable: NodeId,
  nodes: readonly NodeId[] = reachable(graph, outputs),
): NodeId[] {
  const zero = graph.constant(0);
  const derivative = new Map<NodeId, NodeId>([[variable, graph.constant(1)]]);
  const of = (node: NodeId): NodeId => derivative.get(node) ?? zero;
  for (const node of nodes) {
    if (node === variable) continue;
    const operands = OPERANDS[graph.operation(node)] as number;
    if (operands === 0) continue;
    const [a, b, c] = [graph.operand(node, 0), graph.operand(node, 1), graph.operand(node, 2)];
    const [da, db, dc] = [of(a), operands > 1 ? of(b) : zero, operands > 2 ? of(c) : zero];
    if (da === zero && db === zero && dc === zero) continue;
    const result =
      operands === 1 ? ofFunction(graph, node, a, da) : ofOperator(graph, node, [a, b], [da, db, dc]);
    if (result !== zero) derivative.set(node, result);
  }
  return outputs.map(of);
}

/** f'(a) da of an operation with one operand. */
function ofFunction(graph: ExpressionGraph, node: NodeId, a: NodeId, da: NodeId): NodeId {
  switch (graph.operation(node)) {
    case OPERATION.negate:
      return graph.negate(da);
    case OPERATION.exp:
      return graph.multiply(node, da);
    case OPERATION.log:
      return graph.divide(da, a);
    case OPERATION.sqrt:
      return graph.divide(da, graph.multiply(graph.constant(2), node));
    case OPERATION.abs:
      return graph.select(graph.less(a, graph.constant(0)), graph.negate(da), da);
    case OPERATION.sin:
      return graph.multiply(graph.cos(a), da);
    case OPERATION.cos:
      return graph.negate(graph.multiply(graph.sin(a), da));
    case OPERATION.tanh:
      return graph.multiply(graph.subtract(graph.constant(1), graph.multiply(node, node)), da);
    default:
      throw new Error(`No derivative is defined for operation ${graph.operation(node)}.`);
  }
}

type Pair = readonly [NodeId, NodeId];
type Triple = readonly [NodeId, NodeId, NodeId];

/** Derivative of an operation with two or three operands. */
function ofOperator(graph: ExpressionGraph, node: NodeId, [a, b]: Pair, [da, db, dc]: Triple): NodeId {
  switch (graph.operation(node)) {
    case OPERATION.add:
      return graph.add(da, db);
    case OPERATION.subtract:
      return graph.subtract(da, db);
    case OPERATION.multiply:
      return graph.add(graph.multiply(da, b), graph.multiply(a, db));
    case OPERATION.divide:
      return ofQuotient(graph, node, b, da, db);
    case OPERATION.power:
      return ofPower(graph, node, [a, b], [da, db]);
    case OPERATION.minimum:
      return graph.select(graph.lessEqual(a, b), da, db);
    case OPERATION.maximum:
      return graph.select(graph.lessEqual(b, a), da, db);
    case OPERATION.select:
      return graph.select(a, db, dc);
    case OPERATION.less:
    case OPERATION.lessEqual:
    case OPERATION.equal:
    case OPERATION.notEqual:
      return graph.constant(0);
    default:
      throw new Error(`No derivative is defined for operation ${graph.operation(node)}.`);
  }
}

/** d(a/b) = (da - (a/b) db) / b, which reuses the quotient and does not square b. */
function ofQuotient(graph: ExpressionGraph, node: NodeId, b: NodeId, da: NodeId, db: NodeId): NodeId {
  const numerator = graph.subtract(da, graph.multiply(node, db));
  return graph.isNumber(numerator, 0) ? numerator : graph.divide(numerator, b);
}

function ofPower(graph: ExpressionGraph, node: NodeId, [a, b]: Pair, [da, db]: Pair): NodeId {
  const zero = graph.constant(0);
  let byBase = zero;
  if (da !== zero) {
    const slope = graph.multiply(b, graph.power(a, graph.subtract(b, graph.constant(1))));
    const guarded = graph.isConstant(b) ? slope : graph.select(graph.equal(b, zero), zero, slope);
    byBase = graph.multiply(guarded, da);
  }
  if (db === zero) return byBase;
  const slope = graph.multiply(node, graph.log(a));
  return graph.add(byBase, graph.multiply(graph.select(graph.equal(node, zero), zero, slope), db));
}

/** J[i*n + j] = d outputs[i] / d state j, row-major, as nodes of the graph. */
export function differentiateByStates(
  graph: ExpressionGraph,
  outputs: readonly NodeId[],
  dimension: number,
): NodeId[] {
  const nodes = reachable(graph, outputs);
  const jacobian = new Array<NodeId>(outputs.length * dimension);
  for (let j = 0; j < dimension; j += 1) {
    const column = differentiate(graph, outputs, graph.state(j), nodes);
    column.forEach((entry, i) => {
      jacobian[i * dimension + j] = entry;
    });
    if (graph.full) break;
  }
  return jacobian;
}
