import { differentiate, reachable, substitute, type ExpressionGraph, type NodeId } from '../expression/index';
import { OPERATION } from '../expression/operations';

/** Ratios of frequencies are matched by whole numbers up to this. */
const MOST_TURNS = 64;
/** Relative agreement of a ratio with whole numbers. */
const SAME_RATIO = 1e-9;

/**
 * Angular frequencies with which explicit time enters: d(argument)/dt of every sine and cosine of an argument
 * that is linear in time. Null where time enters in any other way, so that no period is known.
 */
export function forcingFrequencies(
  graph: ExpressionGraph,
  equations: readonly NodeId[],
): readonly NodeId[] | null {
  const turning = reachable(graph, equations).filter(
    (node) =>
      (graph.operation(node) === OPERATION.sin || graph.operation(node) === OPERATION.cos) &&
      graph.dependsOnTime(node),
  );
  const phases = [...new Set(turning.map((node) => graph.operand(node, 0)))];
  const rates = differentiate(graph, phases, graph.time());
  if (rates.some((rate) => graph.dependsOnTime(rate) || graph.dependsOnState(rate))) return null;
  // With those replaced by something that does not move, no time may be left.
  const still = graph.parameter(0);
  const rest = substitute(graph, equations, (node) => (turning.includes(node) ? still : null));
  return rest.some((node) => graph.dependsOnTime(node)) ? null : rates;
}

/**
 * Smallest common period of given angular frequencies: the least T with w_j T / (2 pi) whole for all j. Null
 * where there is none up to `MOST_TURNS` turns, or where all are zero.
 */
export function commonPeriod(frequencies: ArrayLike<number>): number | null {
  const turning = Array.from(frequencies, Math.abs).filter((value) => value > 0);
  if (turning.length === 0 || !turning.every(Number.isFinite)) return null;
  const slowest = Math.min(...turning);
  for (let turns = 1; turns <= MOST_TURNS; turns += 1) {
    const whole = turning.every((frequency) => {
      const count = (turns * frequency) / slowest;
      return Math.abs(count - Math.round(count)) <= SAME_RATIO * count;
    });
    if (whole) return (2 * Math.PI * turns) / slowest;
  }
  return null;
}
