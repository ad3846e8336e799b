import { compileClosure } from './closure';
import type { ExpressionGraph, NodeId } from './graph';
import { planProgram, type Program } from './program';
import { compileTaylor, type TaylorProgram } from './taylor';
import { compileWasm } from './wasm-program';

export type Backend = 'wasm' | 'closure';

/**
 * Compiles groups of outputs of a graph for evaluation with the given numbers of states and
 * parameters. `backend` defaults to WebAssembly with closures where it cannot be had.
 *
 * @param workspace doubles of memory left free for compiled code beside the formulas
 */
export function compileProgram(
  graph: ExpressionGraph,
  groups: readonly (readonly NodeId[])[],
  stateCount: number,
  parameterCount: number,
  backend: Backend = 'wasm',
  workspace = 0,
): Program {
  const plan = planProgram(graph, groups, stateCount, parameterCount);
  return (backend === 'wasm' ? compileWasm(plan, workspace) : null) ?? compileClosure(plan);
}

/** Compiles the outputs for derivatives along a direction; see `compileTaylor`. */
export function compileDirectional(
  graph: ExpressionGraph,
  outputs: readonly NodeId[],
  stateCount: number,
  parameterCount: number,
): TaylorProgram {
  return compileTaylor(planProgram(graph, [outputs], stateCount, parameterCount));
}
