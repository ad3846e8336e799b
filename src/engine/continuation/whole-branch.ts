import { assembleBranch, assembledIndex } from './branch-assembly';
import type { Branch } from './contract';
import type { Crossing } from './crossings';
import { pointAlong } from './locate';
import { followBranch, STEP_DEFAULTS, type Followed } from './pseudo-arclength';
import type { SweepScope } from './sweep-scope';
import { Monitor, type BranchPoint } from './test-functions';
import type { Entry, Place } from './treat-crossing';

/** Distance, in scaled arclength, by which a start is moved off a special point. */
const BESIDE_SPECIAL = 7.3e-4;
/** Points between two yields. */
const POINTS_PER_SLICE = 32;

export interface WholeBranch {
  readonly branch: Branch;
  readonly monitor: Monitor;
  readonly crossings: readonly { readonly crossing: Crossing; readonly place: Omit<Place, 'branch'> }[];
}

export interface WholeBranchSettings {
  readonly largestStep: number;
  readonly pointBudget: number;
}

/**
 * The branch through an entry, followed in both directions, with its crossings located. Null where the
 * corrector or the tangent fails at the entry itself. A generator that yields between slices of points.
 */
export function* followWholeBranch(
  scope: SweepScope,
  entry: Entry,
  settings: WholeBranchSettings,
): Generator<void, WholeBranch | null> {
  const curve = scope.curveOn(entry.active);
  const groups = scope.groupsAbsent(entry.active);
  const monitor = new Monitor(curve, groups);
  const starts = startsAt(scope, monitor, entry);
  if (starts === null) return null;
  const directions: Followed[] = [];
  for (const first of starts) {
    const follow = followBranch(monitor, first, {
      lower: scope.lower,
      upper: scope.upper,
      label: (state) => scope.system.stateSymbols[state],
      largestStep: settings.largestStep,
      pointBudget: Math.max(2, Math.min(STEP_DEFAULTS.points, settings.pointBudget)),
    });
    let step = follow.next();
    while (!step.done) {
      if (step.value % POINTS_PER_SLICE === 0) yield;
      step = follow.next();
    }
    directions.push(step.value);
    if (step.value.end.reason === 'closed on itself') break;
  }
  const [back, forth = { points: [starts[1]], crossings: [], end: back.end }] = directions;
  const absent = groups.filter((group) => scope.isWhole(group)).map((group) => group.population);
  const feasible = (point: BranchPoint): boolean => scope.isFeasible(point.u);
  return {
    branch: assembleBranch(back, forth, scope.system.dimension, feasible, absent),
    monitor,
    crossings: [...placed(back, back, 'back'), ...placed(forth, back, 'forth')],
  };
}

function placed(followed: Followed, back: Followed, direction: 'back' | 'forth'): WholeBranch['crossings'] {
  const { crossings } = followed;
  return crossings.map((crossing) => ({
    crossing,
    place: {
      index: assembledIndex(back, direction, crossing.index),
      turns: crossings.some((other) => other.kind === 'fold' && other.index === crossing.index),
    },
  }));
}

/** The first point with its tangent one way and the other. */
function startsAt(scope: SweepScope, monitor: Monitor, entry: Entry): [BranchPoint, BranchPoint] | null {
  const { curve } = monitor;
  const w = entry.w ?? curve.pointOf(entry.state, entry.parameter);
  if (entry.w === null) {
    const across = new Float64Array(curve.m + 1);
    across[curve.m] = 1;
    if (curve.correct(w, across, entry.parameter / scope.parameterScale) < 0) return null;
  }
  const tangent = new Float64Array(curve.m + 1);
  if (!curve.evaluate(w) || !curve.firstTangent(tangent)) return null;
  const forth = besideSpecial(scope, monitor, monitor.pointAt(w, tangent));
  if (forth === null) return null;
  const turned = forth.tangent.map((value) => -value);
  const back = monitor.pointAt(forth.w, turned);
  return back && [back, forth];
}

/** A start at a special point would hide it: its neighbour within the range serves instead. */
function besideSpecial(scope: SweepScope, monitor: Monitor, start: BranchPoint | null): BranchPoint | null {
  if (start === null || start.monitors.undecided === 0) return start;
  for (const s of [BESIDE_SPECIAL, -BESIDE_SPECIAL]) {
    const beside = pointAlong(monitor, start, s);
    if (beside && beside.parameter > scope.lower && beside.parameter < scope.upper) return beside;
  }
  return start;
}
