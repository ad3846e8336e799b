/** The door of `expression`: formulas as text, tree, graph and compiled code. */
export { parseFormula, type ParseResult } from './parse';
export { symbolsOf, visit, childrenOf, type FormulaNode, type FormulaFailure } from './tree';
export { nearestSymbol } from './nearest-symbol';
export { ExpressionGraph, type NodeId } from './graph';
export { addTree, type AddResult } from './add-tree';
export { reachable, substitute, dependsOn, kinksOf } from './traverse';
export { differentiate, differentiateByStates } from './differentiate';
export { compileProgram, compileDirectional, type Backend } from './compile';
export type { Program } from './program';
export type { TaylorProgram } from './taylor';
export { toTex, type TexOptions } from './to-tex';
export { symbolToTex } from './symbol-tex';
export { dimensionOf, type DimensionReport, type UnitProblem } from './dimension';
export {
  parseUnit,
  describeDimension,
  multiplyDimensions,
  sameExponents,
  sameScale,
  DIMENSIONLESS,
  type Dimension,
  type UnitResult,
} from './units';
