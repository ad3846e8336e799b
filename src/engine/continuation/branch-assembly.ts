import type { Branch } from './contract';
import type { Followed } from './pseudo-arclength';
import { BRANCH_TYPES } from './spectrum';
import type { BranchPoint } from './test-functions';

/** One branch from its two directions, in order along its arc from the end of `back` to the end of `forth`. */
export function assembleBranch(
  back: Followed,
  forth: Followed,
  dimension: number,
  feasible: (point: BranchPoint) => boolean,
  absent: readonly string[],
): Branch {
  const points = [...back.points.slice(1).reverse(), ...forth.points];
  const count = points.length;
  const branch = {
    parameters: new Float64Array(count),
    states: new Float64Array(count * dimension),
    leading: new Float64Array(count),
    attracts: new Uint8Array(count),
    feasible: new Uint8Array(count),
    typeIndex: new Uint8Array(count),
  };
  points.forEach((point, k) => {
    branch.parameters[k] = point.parameter;
    branch.states.set(point.u, k * dimension);
    branch.leading[k] = point.leading;
    branch.attracts[k] = point.attracts;
    branch.feasible[k] = feasible(point) ? 1 : 0;
    branch.typeIndex[k] = point.typeIndex;
  });
  return { ...branch, dimension, types: BRANCH_TYPES, absent, startEnd: back.end, endEnd: forth.end };
}

/** Index in the assembled branch of the point before a crossing found in one direction. */
export function assembledIndex(back: Followed, direction: 'back' | 'forth', index: number): number {
  const middle = back.points.length - 1;
  return direction === 'forth' ? middle + index : Math.max(0, middle - index - 1);
}
