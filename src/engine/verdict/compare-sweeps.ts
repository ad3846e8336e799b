import type { Branch, SweepResult } from '../continuation/contract';
import { specialPointShifts, type SpecialPointShift } from './special-point-shifts';

/** Where along the swept range the split gains or loses an attracting coexistence equilibrium. */
export interface SweepComparison {
  /** Stretches where coexistence attracts with the split but not pooled. */
  readonly gained: readonly Stretch[];
  /** Stretches where coexistence attracts pooled but not with the split. */
  readonly lost: readonly Stretch[];
  /** Whether both sweeps had a coexistence equilibrium somewhere along the range. */
  readonly comparable: boolean;
  readonly shifts: readonly SpecialPointShift[];
}

export interface Stretch {
  readonly from: number;
  readonly to: number;
}

type Status = 'attracts' | 'does not attract' | 'none';

/** Values along the range at which both are compared, beside those between shifted special points. */
const SAMPLES = 400;
/** Leading real parts this small are not counted as attracting. */
const SMALLEST_RATE = 1e-10;

/** Compares two sweeps of one parameter over one range. Both must be results, whole or partial. */
export function compareSweeps(split: SweepResult, pooled: SweepResult): SweepComparison {
  const shifts = specialPointShifts(split, pooled);
  const { from, to } = split;
  const values = Array.from({ length: SAMPLES + 1 }, (_, k) => from + (k / SAMPLES) * (to - from));
  for (const { split: a, pooled: b } of shifts)
    if (a !== null && b !== null) values.push((a.parameter + b.parameter) / 2);
  values.sort((a, b) => a - b);
  const mine = values.map((value) => statusAt(split, value));
  const theirs = values.map((value) => statusAt(pooled, value));
  return {
    gained: stretches(values, (k) => mine[k] === 'attracts' && theirs[k] === 'does not attract'),
    lost: stretches(values, (k) => theirs[k] === 'attracts' && mine[k] === 'does not attract'),
    comparable: mine.some((one) => one !== 'none') && theirs.some((one) => one !== 'none'),
    shifts,
  };
}

/** Whether some feasible coexistence equilibrium attracts at a value of the swept parameter. */
function statusAt(sweep: SweepResult, value: number): Status {
  let status: Status = 'none';
  for (const branch of sweep.branches) {
    if (branch.absent.length > 0) continue;
    const best = leadingAt(branch, value);
    if (best === null) continue;
    if (best < -SMALLEST_RATE) return 'attracts';
    status = 'does not attract';
  }
  return status;
}

/** Smallest leading real part of a branch at a value, over all its passes there; null where it has none. */
function leadingAt(branch: Branch, value: number): number | null {
  const { parameters, leading, feasible } = branch;
  let best: number | null = null;
  for (let k = 0; k + 1 < parameters.length; k += 1) {
    const a = parameters[k];
    const b = parameters[k + 1];
    if (a === b || (value - a) * (value - b) > 0 || feasible[k] === 0 || feasible[k + 1] === 0) continue;
    const here = leading[k] + ((value - a) / (b - a)) * (leading[k + 1] - leading[k]);
    if (best === null || here < best) best = here;
  }
  return best;
}

function stretches(values: readonly number[], holds: (k: number) => boolean): Stretch[] {
  const found: { from: number; to: number }[] = [];
  let open = false;
  values.forEach((value, k) => {
    if (!holds(k)) open = false;
    else if (open) found[found.length - 1].to = value;
    else {
      found.push({ from: value, to: value });
      open = true;
    }
  });
  return found;
}
