import type { CycleBranch } from './contract';

/** Agreement of a cycle with a branch interpolated at its parameter. */
const SAME = 2e-3;
/** Share of a step by which a cycle may lie outside it, by rounding. */
const SLACK = 1e-6;

export interface CycleLike {
  readonly parameter: number;
  readonly period: number;
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
}

/** Whether a cycle lies on a branch already followed: same period and extremes at its parameter. */
export function isKnownCycle(branches: readonly CycleBranch[], cycle: CycleLike): boolean {
  return branches.some((branch) => {
    const { parameters } = branch;
    for (let k = 0; k + 1 < parameters.length; k += 1) {
      const [a, b] = [parameters[k], parameters[k + 1]];
      if (a === b) continue;
      const share = (cycle.parameter - a) / (b - a);
      if (share < -SLACK || share > 1 + SLACK) continue;
      if (agreesBetween(branch, k, share, cycle)) return true;
    }
    return false;
  });
}

function agreesBetween(branch: CycleBranch, k: number, share: number, cycle: CycleLike): boolean {
  const q = branch.quantities.length;
  const at = (values: Float64Array, index: number): number =>
    (1 - share) * values[index] + share * values[index + q];
  const period = (1 - share) * branch.periods[k] + share * branch.periods[k + 1];
  if (Math.abs(period - cycle.period) > SAME * period) return false;
  for (let i = 0; i < q; i += 1) {
    const [low, high] = [at(branch.lowest, k * q + i), at(branch.highest, k * q + i)];
    const size = Math.max(Math.abs(low), Math.abs(high), Number.MIN_VALUE);
    if (Math.abs(high - cycle.highest[i]) > SAME * size || Math.abs(low - cycle.lowest[i]) > SAME * size)
      return false;
  }
  return true;
}
