import {
  addTree,
  differentiate,
  differentiateByStates,
  ExpressionGraph,
  type NodeId,
} from '../expression/index';
import { nullspace, reduceToEchelon } from '../linalg/nullspace';
import { candidateTerms, writeSum, type CandidateTerm } from './candidate-terms';
import type { Diagnostic } from './contract';
import { evaluateNodes } from './evaluate-graph';
import { parseCached, type FlowSource, type ModelGraph } from './model-graph';
import { remark } from './remark';
import { sampleState } from './sample-points';
import { seededRandom } from './seeded-random';

/** A quantity that never changes along trajectories, proven by identity testing. */
export interface ConstantOfMotion {
  readonly formula: string;
  /** Entered with the document, or found by search. */
  readonly origin: 'given' | 'found';
  value(u: ArrayLike<number>): number;
  /** out[i] = dV/du_i. */
  gradient(u: ArrayLike<number>, out: Float64Array): void;
  /** out[i*n+j] = d2V/du_i du_j. */
  hessian(u: ArrayLike<number>, out: Float64Array): void;
}

const PROOF = { points: 8, attempts: 24, relativeTolerance: 1e-9, seed: 90_001, searchSeed: 55_117 } as const;

/**
 * Constants of motion of a flow (the split model's, or the twin's) at given parameters: those entered that hold there, then
 * those found over the terms u_i, log u_i, u_i^2, u_i u_j, logarithms of totals and of sums of two.
 *
 * Search: with phi_k the terms, sum c_k phi_k is constant where sum c_k (grad phi_k . f) = 0 at every
 * state, so c lies in the nullspace of the matrix of grad phi_k . f over sample states. Each candidate
 * is then tested afresh, at states not used to find it. Own derivation.
 * Forced models have none of this form, and get an empty list.
 * Cost: one singular value decomposition of about 60 columns at most; call on demand.
 * @param p parameters, in the order of parameterKeys
 */
export function constantsOfMotionAt(source: FlowSource, p: ArrayLike<number>): readonly ConstantOfMotion[] {
  if (source.equations.some((node) => source.graph.dependsOnTime(node))) return [];
  const given = source.givenConstants.flatMap((formula) => {
    const constant = proveConstant(source, formula, p, 'given');
    return constant === null ? [] : [constant];
  });
  const found = searchConstants(source, p).flatMap((formula) => {
    const constant = proveConstant(source, formula, p, 'found');
    return constant === null ? [] : [constant];
  });
  // A given constant that the search finds again is told once, as given.
  return [...given, ...found.filter((one) => !given.some((other) => isMultiple(source, one, other)))];
}

/** The formula as a constant of motion at these parameters, or null where it is none or cannot be read. */
export function proveConstant(
  source: FlowSource,
  formula: string,
  p: ArrayLike<number>,
  origin: ConstantOfMotion['origin'],
): ConstantOfMotion | null {
  // A found formula changes with the parameters; a graph of its own keeps the model's from filling up.
  const own = origin === 'found';
  const graph = own ? new ExpressionGraph() : source.graph;
  const symbols = own ? stateNodes(graph, source) : source.symbols;
  const n = source.stateSymbols.length;
  const parsed = parseCached(formula);
  if (!parsed.ok) return null;
  const added = addTree(graph, parsed.tree, (symbol) => symbols.get(symbol) ?? null);
  if (!added.ok) graph.forgiveOverflow();
  if (!added.ok || !graph.dependsOnState(added.node) || graph.dependsOnTime(added.node)) return null;
  const V = added.node;
  const slopes = differentiateByStates(graph, [V], n);
  if (graph.full) {
    graph.forgiveOverflow();
    return null;
  }
  const gradient = evaluateNodes(graph, slopes);
  if (!staysPut(source, gradient, p)) return null;
  const value = evaluateNodes(graph, [V]);
  const curvatures = slopes.flatMap((_, i) =>
    slopes.map((_slope, j) => differentiate(graph, [slopes[j] ?? V], graph.state(i))[0] ?? V),
  );
  const hessian = evaluateNodes(graph, curvatures);
  const single = new Float64Array(1);
  return {
    formula,
    origin,
    value(u) {
      value(0, u, p, single);
      return single[0] ?? Number.NaN;
    },
    gradient: (u, out) => gradient(0, u, p, out),
    hessian: (u, out) => hessian(0, u, p, out),
  };
}

/** Nodes of the states and totals, which is all that a found formula reads. */
function stateNodes(graph: ExpressionGraph, source: FlowSource): ReadonlyMap<string, NodeId> {
  const nodes = new Map(source.stateSymbols.map((symbol, i) => [symbol, graph.state(i)]));
  for (const { symbol, states } of source.populations) {
    if (!nodes.has(symbol)) nodes.set(symbol, graph.sum(states.map((i) => graph.state(i))));
  }
  return nodes;
}

/** Whether grad V . f vanishes at random states, relative to the size of its terms. */
function staysPut(
  source: FlowSource,
  gradient: ReturnType<typeof evaluateNodes>,
  p: ArrayLike<number>,
): boolean {
  const n = source.stateSymbols.length;
  const flow = evaluateNodes(source.graph, source.equations);
  const [slope, f] = [new Float64Array(n), new Float64Array(n)];
  const random = seededRandom(PROOF.seed);
  let points = 0;
  let moving = false;
  for (let k = 0; k < PROOF.attempts && points < PROOF.points; k += 1) {
    const u = sampleState(source, random);
    gradient(0, u, p, slope);
    flow(0, u, p, f);
    if (!slope.every(Number.isFinite) || !f.every(Number.isFinite)) continue;
    points += 1;
    let sum = 0;
    let size = 0;
    for (let i = 0; i < n; i += 1) {
      const term = (slope[i] ?? 0) * (f[i] ?? 0);
      sum += term;
      size += Math.abs(term);
    }
    if (size > 0) moving = true;
    if (Math.abs(sum) > PROOF.relativeTolerance * size) return false;
  }
  // A function of states that never move is constant for want of motion, and says nothing.
  return points === PROOF.points && moving;
}

function searchConstants(source: FlowSource, p: ArrayLike<number>): readonly string[] {
  const n = source.stateSymbols.length;
  const evaluate = evaluateNodes(source.graph, source.equations);
  const terms = candidateTerms(source);
  const rows = 2 * terms.length + 10;
  const A = new Float64Array(rows * terms.length);
  const f = new Float64Array(n);
  const random = seededRandom(PROOF.searchSeed);
  let filled = 0;
  for (let k = 0; k < 2 * rows && filled < rows; k += 1) {
    const u = sampleState(source, random);
    evaluate(0, u, p, f);
    if (!f.every(Number.isFinite)) continue;
    terms.forEach((term, j) => {
      A[filled * terms.length + j] = term.rate(u, f);
    });
    filled += 1;
  }
  if (filled < rows) return [];
  const kept = scaleColumns(A, rows, terms);
  const vectors = nullspace(kept.matrix, rows, kept.terms.length);
  const coefficients = vectors.map((vector) => vector.map((value, j) => value / (kept.scales[j] ?? 1)));
  reduceToEchelon(coefficients);
  for (const vector of coefficients) clearRounding(vector, kept.scales);
  return coefficients.map((vector) => writeSum(kept.terms, vector)).filter((formula) => formula !== '');
}

/** Sets to zero what counts for less than this part of the largest term, which is rounding. */
const ROUNDING = 1e-9;

function clearRounding(vector: Float64Array, scales: readonly number[]): void {
  const weight = (k: number): number => Math.abs(vector[k] ?? 0) * (scales[k] ?? 1);
  const largest = vector.reduce((most, _, k) => Math.max(most, weight(k)), 0);
  vector.forEach((_, k) => {
    if (weight(k) <= ROUNDING * largest) vector[k] = 0;
  });
}

/** Drops terms that never change and scales the others to the same size, so that one tolerance fits all. */
function scaleColumns(A: Float64Array, rows: number, terms: readonly CandidateTerm[]) {
  const sizes = terms.map((_, j) => {
    let square = 0;
    for (let k = 0; k < rows; k += 1) square += (A[k * terms.length + j] ?? 0) ** 2;
    return Math.sqrt(square / rows);
  });
  const columns = terms.map((_, j) => j).filter((j) => (sizes[j] ?? 0) > 0);
  const matrix = new Float64Array(rows * columns.length);
  for (let k = 0; k < rows; k += 1) {
    columns.forEach((j, c) => {
      matrix[k * columns.length + c] = (A[k * terms.length + j] ?? 0) / (sizes[j] ?? 1);
    });
  }
  return {
    matrix,
    terms: columns.map((j) => terms[j] as CandidateTerm),
    scales: columns.map((j) => sizes[j] ?? 1),
  };
}

/** Whether two constants have parallel gradients wherever it was tried. */
function isMultiple(source: FlowSource, one: ConstantOfMotion, other: ConstantOfMotion): boolean {
  const n = source.stateSymbols.length;
  const [a, b] = [new Float64Array(n), new Float64Array(n)];
  const random = seededRandom(PROOF.seed);
  for (let k = 0; k < 4; k += 1) {
    const u = sampleState(source, random);
    one.gradient(u, a);
    other.gradient(u, b);
    const dot = a.reduce((sum, value, i) => sum + value * (b[i] ?? 0), 0);
    const [aa, bb] = [a, b].map((v) => v.reduce((sum, value) => sum + value * value, 0));
    if (Math.abs(dot * dot - (aa ?? 0) * (bb ?? 0)) > PROOF.relativeTolerance * (aa ?? 0) * (bb ?? 0))
      return false;
  }
  return true;
}

/** Remarks on the constants entered: unreadable, or changing along trajectories at the document's parameters. */
export function checkConstants(model: ModelGraph): readonly Diagnostic[] {
  return model.givenConstants.flatMap((formula, k) => {
    const path = ['constantsOfMotion', k];
    const parsed = parseCached(formula);
    if (!parsed.ok) {
      const { message, range, suggestion } = parsed.failure;
      return [{ severity: 'error' as const, path, range, message, suggestion }];
    }
    const added = addTree(model.graph, parsed.tree, (symbol) => model.symbols.get(symbol) ?? null);
    if (!added.ok) {
      model.graph.forgiveOverflow();
      const { message, range, suggestion } = added.failure;
      return [{ severity: 'error' as const, path, range, message, suggestion }];
    }
    if (proveConstant(model, formula, model.defaults, 'given') !== null) return [];
    return [
      remark(
        'warning',
        path,
        'This formula changes along trajectories, so it is no constant of motion here.',
      ),
    ];
  });
}
