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
/** Ends of stretches this near to a located special point, as a share of the range, lie there. */
const NEAR_POINT = 2e-3;
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
  const onlyIn = (a: SweepResult, b: SweepResult) => (value: number) =>
    statusAt(a, value) === 'attracts' && statusAt(b, value) === 'does not attract';
  // Between the points of a branch real parts are interpolated; located special points are exact.
  const located = [split, pooled].flatMap((sweep) => sweep.specialPoints.map((point) => point.parameter));
  const exact = (value: number): number =>
    located.find((point) => Math.abs(point - value) <= NEAR_POINT * Math.abs(to - from)) ?? value;
  const atPoints = (stretch: Stretch): Stretch => ({ from: exact(stretch.from), to: exact(stretch.to) });
  return {
    gained: stretches(values, onlyIn(split, pooled)).map(atPoints),
    lost: stretches(values, onlyIn(pooled, split)).map(atPoints),
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

/** Stretches of a range where a condition holds, their ends bisected between samples. */
function stretches(values: readonly number[], holds: (value: number) => boolean): Stretch[] {
  const found: { from: number; to: number }[] = [];
  const held = values.map(holds);
  held.forEach((now, k) => {
    const before = k > 0 && held[k - 1];
    if (now && !before)
      found.push({ from: k === 0 ? values[0] : edge(holds, values[k - 1], values[k]), to: values[k] });
    if (!now && before) found[found.length - 1].to = edge(holds, values[k], values[k - 1]);
    else if (now) found[found.length - 1].to = values[k];
  });
  return found;
}

/** Where a condition begins to hold between a value where it does not and one where it does. */
function edge(holds: (value: number) => boolean, outside: number, inside: number): number {
  let [a, b] = [outside, inside];
  for (let k = 0; k < 40; k += 1) {
    const middle = (a + b) / 2;
    if (holds(middle)) b = middle;
    else a = middle;
  }
  return b;
}
