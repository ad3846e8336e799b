import type { NodeId } from '../expression/index';
import { evaluateNodes } from './evaluate-graph';
import type { ModelGraph } from './model-graph';
import { sampleParameters, sampleState } from './sample-points';
import { seededRandom } from './seeded-random';

/**
 * An identity of rational or analytic expressions that fails anywhere fails at almost every point, so
 * agreement at a few random points is proof but for a set of measure zero (Schwartz, J. ACM 27 (1980)
 * 701, for polynomials; from memory).
 */
const IDENTITY_TEST = { points: 4, attempts: 12, relativeTolerance: 1e-9, seed: 20_231 } as const;

/**
 * Whether classes can be lumped: with f_Q the sum of f over population Q, the derivative of f_Q by
 * u_i is the same for all classes i of one population, at every state and for all parameters.
 * @param jacobian nodes of J at spread 0, row-major
 * Cost: a few evaluations of the Jacobian.
 */
export function isLumpable(model: ModelGraph, jacobian: readonly NodeId[]): boolean {
  const n = model.stateSymbols.length;
  const split = model.populations.filter((population) => population.states.length > 1);
  const evaluate = evaluateNodes(model.graph, jacobian);
  const J = new Float64Array(n * n);
  const random = seededRandom(IDENTITY_TEST.seed);
  let points = 0;
  for (let k = 0; k < IDENTITY_TEST.attempts && points < IDENTITY_TEST.points; k += 1) {
    evaluate(1 + random(), sampleState(model, random), sampleParameters(model, random), J);
    if (!J.every(Number.isFinite)) continue;
    points += 1;
    for (const row of model.populations) {
      for (const column of split) {
        if (!sameColumns(J, n, row.states, column.states)) return false;
      }
    }
  }
  return points > 0;
}

function sameColumns(
  J: Float64Array,
  n: number,
  rows: readonly number[],
  columns: readonly number[],
): boolean {
  const total = (j: number, size: boolean): number =>
    rows.reduce((sum, i) => sum + (size ? Math.abs(J[i * n + j] ?? 0) : (J[i * n + j] ?? 0)), 0);
  const [first, ...others] = columns;
  if (first === undefined) return true;
  const sum = total(first, false);
  return others.every((j) => {
    const scale = Math.max(total(first, true), total(j, true));
    return Math.abs(total(j, false) - sum) <= IDENTITY_TEST.relativeTolerance * scale;
  });
}
