/** Branches of cycles as lines: special points stand on them, and each stretch has one stability. */
import type { CycleBranch, CyclesResult, CycleSpecialPoint } from '@/engine/cycles/contract';
import type { PresetDocument, Quantity } from '@/engine/schema/preset';

import { cycleExtent, quantityColumn, type CycleExtent } from './cycle-quantity';

/** A stretch of a branch of cycles along which stability and feasibility stay the same. */
export interface CycleRun extends CycleExtent {
  readonly branch: number;
  /** 1 attracts, 0 repels, 2 undecided. */
  readonly attracts: number;
  readonly feasible: boolean;
  readonly parameters: Float64Array;
}

/** A point of the line: one of the branch, or a special point between two of them. */
interface Vertex {
  readonly parameter: number;
  readonly low: number;
  readonly high: number;
  readonly mean: number;
  /** Null at a special point, which belongs to both sides. */
  readonly attracts: number | null;
  readonly feasible: boolean;
  /** Whether the branch turns back in the parameter here. */
  readonly turns: boolean;
}

const known = new WeakMap<CyclesResult, Map<string, readonly CycleRun[]>>();

/** All branches of a result as runs of one quantity; worked out once for each result and quantity. */
export function cycleRuns(
  model: PresetDocument,
  result: CyclesResult,
  quantity: Quantity,
): readonly CycleRun[] {
  const of = known.get(result) ?? new Map<string, readonly CycleRun[]>();
  known.set(result, of);
  const key = `${quantity.quantity}:${quantity.of}`;
  const runs =
    of.get(key) ?? result.branches.flatMap((branch, index) => runsOf(model, result, branch, index, quantity));
  of.set(key, runs);
  return runs;
}

function runsOf(
  model: PresetDocument,
  result: CyclesResult,
  branch: CycleBranch,
  index: number,
  quantity: Quantity,
): readonly CycleRun[] {
  const extent = cycleExtent(model, branch, result.stateSymbols, quantity);
  if (!extent || branch.parameters.length === 0) return [];
  const special = result.specialPoints.filter((point) => point.branch === index);
  const line = vertices(model, branch, extent, special, quantity);
  const runs: CycleRun[] = [];
  let from = 0;
  let attracts = sideOf(line, 0, 2);
  for (let k = 1; k < line.length; k++) {
    const next = k + 1 < line.length ? sideOf(line, k, attracts) : null;
    const here = line[k];
    const same = next === attracts && here?.feasible === line[from]?.feasible && !here?.turns;
    if (same) continue;
    runs.push(runBetween(line.slice(from, k + 1), index, attracts));
    from = k;
    if (next !== null) attracts = next;
  }
  return runs;
}

/** Stability between the vertices k and k + 1; a lone undecided end does not speak for the stretch. */
function sideOf(line: readonly Vertex[], k: number, before: number): number {
  const ends = [line[k]?.attracts, line[k + 1]?.attracts].filter((one) => one !== null && one !== undefined);
  return ends.find((one) => one !== 2) ?? ends[0] ?? before;
}

function runBetween(line: readonly Vertex[], branch: number, attracts: number): CycleRun {
  const pick = (read: (vertex: Vertex) => number) => Float64Array.from(line, read);
  return {
    branch,
    attracts,
    feasible: line.every((one) => one.feasible),
    parameters: pick((one) => one.parameter),
    low: pick((one) => one.low),
    high: pick((one) => one.high),
    mean: pick((one) => one.mean),
  };
}

function vertices(
  model: PresetDocument,
  branch: CycleBranch,
  extent: CycleExtent,
  special: readonly CycleSpecialPoint[],
  quantity: Quantity,
): readonly Vertex[] {
  const line: Vertex[] = [];
  for (let k = 0; k < branch.parameters.length; k++) {
    const parameter = branch.parameters[k] ?? NaN;
    const own: Vertex = {
      parameter,
      low: extent.low[k] ?? NaN,
      high: extent.high[k] ?? NaN,
      mean: extent.mean[k] ?? NaN,
      attracts: branch.attracts[k] ?? 2,
      feasible: branch.feasible[k] === 1,
      turns: false,
    };
    line.push(own);
    const next = branch.parameters[k + 1];
    if (next === undefined) continue;
    const between = special
      .filter((point) => point.index === k)
      .sort((a, b) => Math.abs(a.parameter - parameter) - Math.abs(b.parameter - parameter));
    for (const point of between) {
      const reach = specialExtent(model, branch, point, quantity);
      if (!reach) continue;
      const share = next === parameter ? 0.5 : (point.parameter - parameter) / (next - parameter);
      const mean = extent.mean[k + 1] ?? NaN;
      line.push({
        parameter: point.parameter,
        ...reach,
        mean: own.mean + Math.min(1, Math.max(0, share)) * (mean - own.mean),
        attracts: null,
        feasible: own.feasible,
        turns: point.kind === 'fold of cycles',
      });
    }
  }
  return line;
}

/** Lowest and highest value of a quantity at a special point; null where it is not held there. */
export function specialExtent(
  model: PresetDocument,
  branch: CycleBranch,
  point: CycleSpecialPoint,
  quantity: Quantity,
): { readonly low: number; readonly high: number } | null {
  if (quantity.quantity === 'period') return { low: point.period, high: point.period };
  const column = quantityColumn(model, branch.quantities, quantity);
  if (!column) return null;
  return {
    low: column[1] * (point.lowest[column[0]] ?? NaN),
    high: column[1] * (point.highest[column[0]] ?? NaN),
  };
}
