import type { ExpressionGraph, NodeId } from './graph';
import { OPERATION } from './operations';
import { reachable } from './traverse';

/**
 * Compiled outputs of a graph, in groups that are evaluated separately (rhs, Jacobian) and share
 * what depends on parameters alone.
 */
export interface Program {
  readonly backend: 'wasm' | 'closure';
  /** Sets the parameters of every later evaluation and computes what depends on them alone. */
  prepare(parameters: Float64Array): void;
  /** out[i] = value of output i of the group at time t and state u; out is the caller's. */
  evaluate(group: number, t: number, u: Float64Array, out: Float64Array): void;
  /** The emitted functions themselves and the memory they work in, for compiled code beside them. */
  readonly emitted?: EmittedFunctions;
}

export interface EmittedFunctions {
  readonly memory: { readonly buffer: ArrayBuffer };
  readonly prepare: () => void;
  /** Group k from the state at byte address u to byte address out. */
  readonly groups: readonly ((t: number, u: number, out: number) => void)[];
  /** Where the parameters lie, and where nothing lies from there on, in doubles. */
  readonly parameters: number;
  readonly free: number;
}

/** What is computed when: the order of work that both backends follow. */
export interface Plan {
  readonly graph: ExpressionGraph;
  readonly stateCount: number;
  readonly parameterCount: number;
  readonly groups: readonly (readonly NodeId[])[];
  /** Operations on parameters alone, operands first: computed once per set of parameters. */
  readonly prepared: readonly NodeId[];
  /** Those of them that a group reads, in the order in which they are stored. */
  readonly stored: readonly NodeId[];
  /** Per group the operations that move with state or time, operands first. */
  readonly live: readonly (readonly NodeId[])[];
}

/** Sorts the nodes that the groups need into work per set of parameters and work per evaluation. */
export function planProgram(
  graph: ExpressionGraph,
  groups: readonly (readonly NodeId[])[],
  stateCount: number,
  parameterCount: number,
): Plan {
  const isLive = (node: NodeId) => graph.dependsOnState(node) || graph.dependsOnTime(node);
  const isPrepared = (node: NodeId) =>
    node > 0 && !isLive(node) && graph.operation(node) > OPERATION.time && graph.dependsOnParameter(node);
  const stored = new Set<NodeId>();
  const live = groups.map((outputs) => {
    const nodes = reachable(graph, outputs).filter(
      (node) => isLive(node) && graph.operation(node) > OPERATION.time,
    );
    for (const node of nodes) {
      for (const which of [0, 1, 2] as const) {
        const operand = graph.operand(node, which);
        if (isPrepared(operand)) stored.add(operand);
      }
    }
    for (const output of outputs) if (isPrepared(output)) stored.add(output);
    return nodes;
  });
  const sorted = [...stored].sort((a, b) => a - b);
  const prepared = reachable(graph, sorted).filter(isPrepared);
  return { graph, stateCount, parameterCount, groups, prepared, stored: sorted, live };
}
