import type { CompiledSystem } from '../system/contract';
import { WHISKER, type Face } from './face-system';
import { lowDiscrepancyPoint } from './low-discrepancy';

/**
 * Faces of the state space on which trajectories stay: sets Z of states with f_i = 0 for all i in Z
 * wherever u_Z = 0. The test is made at sample points of the face; a formula that gives exact zeros
 * there (a rate that is a multiple of the absent density) passes, immigration does not.
 * Where the model is 0/0 on the face the states of Z are set to a hair above zero instead, and f_Z must
 * then be of their size.
 */
export const FACE_LIMITS = {
  /** Faces looked at in one search. */
  faces: 512,
  /** Up to this many states every subset of states is tried, beyond it subsets of whole populations. */
  statesTriedSingly: 9,
  /** Sample points of a face at which invariance is tested. */
  samples: 4,
} as const;

export interface FaceList {
  readonly faces: readonly Face[];
  /** True where there were more faces than the limit. */
  readonly capped: boolean;
}

/** How absence of a set of states holds at sample points. */
export type Absence = 'lasts' | 'lasts, but is 0/0' | 'does not last';

/**
 * Whether the states `absent` stay at zero once there, whatever the others are.
 * @param high upper corner of the box the sample points are drawn from, per state
 */
export function absenceOf(system: CompiledSystem, absent: readonly number[], high: Float64Array): Absence {
  const n = system.dimension;
  const u = new Float64Array(n);
  const f = new Float64Array(n);
  const isAbsent = new Uint8Array(n);
  for (const i of absent) isAbsent[i] = 1;
  const unit = new Float64Array(n);
  let verdict: Absence = 'lasts';
  for (let k = 0; k < FACE_LIMITS.samples; k += 1) {
    lowDiscrepancyPoint(k, 1, unit);
    for (let i = 0; i < n; i += 1) u[i] = isAbsent[i] ? 0 : sample(unit[i], high[i], system.nonnegative[i]);
    system.rhs(0, u, f);
    if (absent.every((i) => Number.isFinite(f[i])) && f.every(Number.isFinite)) {
      if (absent.some((i) => f[i] !== 0)) return 'does not last';
      continue;
    }
    for (const i of absent) u[i] = WHISKER;
    system.rhs(0, u, f);
    if (absent.some((i) => !(Math.abs(f[i]) < Math.sqrt(WHISKER)))) return 'does not last';
    if (!f.every(Number.isFinite)) return 'does not last';
    verdict = 'lasts, but is 0/0';
  }
  return verdict;
}

function sample(unit: number, high: number, nonnegative: boolean): number {
  return nonnegative ? (0.05 + 0.9 * unit) * high : (2 * unit - 1) * high;
}

/** All invariant faces, the emptiest first, the whole space last. */
export function invariantFaces(system: CompiledSystem, high: Float64Array): FaceList {
  const n = system.dimension;
  const units =
    n <= FACE_LIMITS.statesTriedSingly
      ? Array.from({ length: n }, (_, i) => [i])
      : unitsOfManyStates(system, high);
  const subsets = subsetsFromBothEnds(units.length, FACE_LIMITS.faces);
  const faces: Face[] = [];
  for (const subset of subsets.list) {
    const absent = subset.flatMap((k) => units[k]).sort((a, b) => a - b);
    const absence = absent.length === 0 ? 'lasts' : absenceOf(system, absent, high);
    if (absence !== 'does not last')
      faces.push(makeFace(system, absent, absence === 'lasts, but is 0/0', high));
  }
  return { faces: faces.sort((a, b) => b.absent.length - a.absent.length), capped: subsets.capped };
}

/**
 * Subsets of 0..count-1 up to a limit: where there are more, those with fewest members and those with
 * most, so that neither coexistence nor extinction is lost.
 */
export function subsetsFromBothEnds(count: number, limit: number): { list: number[][]; capped: boolean } {
  if (2 ** count <= limit) return subsetsBySize(count, limit);
  const { list } = subsetsBySize(count, limit / 2);
  const all = Array.from({ length: count }, (_, k) => k);
  const complements = list.map((subset) => all.filter((k) => !subset.includes(k)));
  const seen = new Set(list.map((subset) => subset.join(' ')));
  return { list: [...list, ...complements.filter((subset) => !seen.has(subset.join(' ')))], capped: true };
}

function unitsOfManyStates(system: CompiledSystem, high: Float64Array): number[][] {
  const units: number[][] = [];
  for (const { states } of system.populations) {
    const bredTrue =
      states.length <= 3 && states.every((i) => absenceOf(system, [i], high) !== 'does not last');
    units.push(...(bredTrue ? states.map((i) => [i]) : [[...states]]));
  }
  return units;
}

/** The face where `absent` are zero. */
export function makeFace(
  system: CompiledSystem,
  absent: readonly number[],
  whisker: boolean,
  high: Float64Array,
): Face {
  const isAbsent = new Set(absent);
  const free = Array.from({ length: system.dimension }, (_, i) => i).filter((i) => !isAbsent.has(i));
  const ownZero = free.map(
    (i) => !whisker && system.nonnegative[i] && absenceOf(system, [...absent, i], high) === 'lasts',
  );
  return { free, absent, whisker, ownZero };
}

/** Subsets of 0..count-1, the smallest first, up to a limit. */
export function subsetsBySize(count: number, limit: number): { list: number[][]; capped: boolean } {
  const list: number[][] = [];
  const extend = (size: number, from: number, chosen: number[]): boolean => {
    if (chosen.length === size) {
      if (list.length >= limit) return false;
      list.push([...chosen]);
      return true;
    }
    for (let k = from; k <= count - (size - chosen.length); k += 1) {
      chosen.push(k);
      const room = extend(size, k + 1, chosen);
      chosen.pop();
      if (!room) return false;
    }
    return true;
  };
  for (let size = 0; size <= count; size += 1) if (!extend(size, 0, [])) return { list, capped: true };
  return { list, capped: false };
}
