import { determinant } from '../linalg/solve';
import { nullVector } from '../linalg/null-vector';
import { refineBoundaryCrossing } from './boundary-crossing';
import type { SpecialPoint } from './contract';
import type { Curve } from './curve';
import type { Crossing } from './crossings';
import { describeHopf, makeSpecialPoint } from './special-points';
import { invadingBranch, isPitchfork, secondDirection, stepAcross } from './switch-branch';
import type { SweepScope } from './sweep-scope';
import { Monitor, type BranchPoint } from './test-functions';

/** A present state below this share of its scale is on its way to zero. */
const VANISHING_SHARE = 1e-3;
/** Entries of a composition below this are rounding. */
const MIXED = 1e-9;

/** Where on which branch a crossing was found. */
export interface Place {
  readonly branch: number;
  readonly index: number;
  /** Whether the branch turns back in the parameter within the same step. */
  readonly turns: boolean;
}

/** Where another branch is to be entered: a point of it, or a state on it. */
export interface Entry {
  readonly state: Float64Array;
  readonly parameter: number;
  readonly active: readonly number[];
  /** The point on the curve of `active`, where the corrector has been there. */
  readonly w: Float64Array | null;
}

/** What a crossing turns out to be. */
export interface Treated {
  /** Null where it is nothing that concerns a feasible state. */
  readonly point: SpecialPoint | null;
  readonly entries: readonly Entry[];
}

type Located = Place & { readonly at: BranchPoint; readonly accuracy: number; readonly label: string };

const NOTHING: Treated = { point: null, entries: [] };

/** Names a crossing and finds where other branches begin there. */
export function treatCrossing(
  scope: SweepScope,
  monitor: Monitor,
  crossing: Crossing,
  place: Place,
): Treated {
  const { point: at, bracket } = crossing.located;
  const here: Located = { ...place, at, accuracy: bracket, label: scope.label };
  switch (crossing.kind) {
    case 'fold':
      return { point: makeSpecialPoint(monitor, scope.system, { ...here, kind: 'fold' }), entries: [] };
    case 'Hopf': {
      const hopf = describeHopf(monitor, at);
      if (hopf === null) return NOTHING;
      return { point: makeSpecialPoint(monitor, scope.system, { ...here, kind: 'Hopf', hopf }), entries: [] };
    }
    case 'zero':
      return treatZero(scope, monitor, here);
    case 'transversal':
      return treatInvasion(scope, monitor, here, crossing.which);
    case 'branch':
      return treatBranchPoint(scope, monitor, here);
  }
}

function vanishing(scope: SweepScope, curve: Curve, at: BranchPoint): number[] {
  return curve.active.filter(
    (i) => scope.system.nonnegative[i] && Math.abs(at.u[i]) < VANISHING_SHARE * scope.stateScale[i],
  );
}

/** A present population that reaches zero: the branch meets the one without it, where the crossing is located anew. */
function treatZero(scope: SweepScope, monitor: Monitor, here: Located): Treated {
  const { at } = here;
  const vanished = vanishing(scope, monitor.curve, at);
  const zero = [...scope.without(monitor.curve.active), ...vanished].sort((a, b) => a - b);
  if (!scope.absenceLasts(zero)) return NOTHING;
  const state = at.u.map((value, i) => (zero.includes(i) ? 0 : value));
  const active = scope.activeOf(state);
  const face = new Monitor(scope.curveOn(active), scope.groupsAbsent(active));
  const gone = face.absent
    .map((group, g) => ({ group, g }))
    .filter(({ group }) => group.states.some((i) => vanished.includes(i)));
  const invader = mostMarginal(face, state, at.parameter, gone);
  const refined = invader ? refineBoundaryCrossing(face, state, at.parameter, invader.g) : null;
  const point = makeSpecialPoint(refined ? face : monitor, scope.system, {
    ...here,
    at: refined ?? at,
    accuracy: refined ? 0 : here.accuracy,
    kind: 'transcritical',
    invades: (refined && invader ? [invader] : gone).map(({ group }) => group.population),
  });
  return { point, entries: [{ state, parameter: at.parameter, active, w: null }] };
}

/** Of the populations that vanish together, the one whose growth from low density is nearest to zero; others follow it. */
function mostMarginal<Gone extends { readonly g: number }>(
  face: Monitor,
  state: Float64Array,
  parameter: number,
  gone: readonly Gone[],
): Gone | null {
  if (gone.length < 2) return gone[0] ?? null;
  if (!face.curve.evaluate(face.curve.pointOf(state, parameter))) return null;
  const sizes = gone.map(({ g }) => {
    const block = face.block(g);
    const size = Math.sqrt(block.length);
    return Math.abs(determinant(block, size)) ** (1 / size);
  });
  return gone[sizes.indexOf(Math.min(...sizes))];
}

/** An absent population whose growth from low density passes zero. */
function treatInvasion(scope: SweepScope, monitor: Monitor, here: Located, which: number): Treated {
  const { at } = here;
  const { states, population } = monitor.absent[which];
  if (!monitor.curve.evaluate(at.w)) return NOTHING;
  const { vector } = nullVector(monitor.block(which), states.length);
  // Of mixed signs: no feasible state lies that way.
  if (vector.some((x) => x > MIXED) && vector.some((x) => x < -MIXED)) return NOTHING;
  const point = makeSpecialPoint(monitor, scope.system, {
    ...here,
    kind: 'transcritical',
    invades: [population],
  });
  const wide = scope.curveOn(scope.withFed([...monitor.curve.active, ...states]));
  const w = invadingBranch(wide, at.u, at.parameter, states, vector.map(Math.abs));
  return { point, entries: w ? [entryAt(wide, w)] : [] };
}

/** Two branches of one face that cross. */
function treatBranchPoint(scope: SweepScope, monitor: Monitor, here: Located): Treated {
  const { at } = here;
  const { curve } = monitor;
  // The end of the branch at zero is such a point too, and is treated as one.
  const vanished = vanishing(scope, curve, at);
  if (vanished.length > 0 && scope.absenceLasts(vanished)) return NOTHING;
  const across = secondDirection(monitor, at);
  const plus = across && stepAcross(curve, at, across, 1);
  const minus = across && stepAcross(curve, at, across, -1);
  // Seen from the branch that turns back there, or from the one that does not.
  const mirrored = plus !== null && minus !== null && (here.turns || isPitchfork(at.w, plus, minus));
  const kind = plus && minus ? (mirrored ? 'pitchfork' : 'transcritical') : 'branch point';
  const point = makeSpecialPoint(monitor, scope.system, { ...here, kind });
  return { point, entries: [plus, minus].flatMap((w) => (w ? [entryAt(curve, w)] : [])) };
}

function entryAt(curve: Curve, w: Float64Array): Entry {
  curve.load(w);
  return { state: curve.u.slice(), parameter: curve.parameterAt(w), active: curve.active, w };
}
