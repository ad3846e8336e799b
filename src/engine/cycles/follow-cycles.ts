import type { CycleBranchEnd } from './contract';
import { CycleCurve, type CyclePoint } from './cycle-curve';
import { cycleExtremes, type CycleExtremes } from './cycle-extremes';
import { crossingKinds, isUpright, locateCycle, type CycleCrossing } from './locate-cycle';
import { REST_DEFAULTS, restOnCycle } from './rest-on-cycle';

/** Steps are in scaled arclength; see `Collocation.inner2`. */
export const CYCLE_STEP_DEFAULTS = {
  first: 0.02,
  smallest: 1e-6,
  largest: 0.3,
  /** Most of the swept range in one step. */
  largestShare: 0.02,
  grow: 1.4,
  shrink: 0.5,
  /** Newton steps after which a step may grow. */
  easy: 3,
  /** Least cosine between tangents of neighbouring cycles. */
  bend: 0.93,
  /** Cycles between two adaptations of the mesh. */
  adaptEvery: 4,
  /** Error of the discretisation that asks for a finer mesh, how much finer, and how fine at most. */
  resolution: 1e-7,
  refine: 1.5,
  mostIntervals: 240,
  /** Cycles in a row at one value of the parameter after which a family is left; fewer once a branch left it. */
  upright: 120,
  uprightBeyond: 12,
  /** Times the first period from which on a homoclinic orbit is looked for. */
  longPeriod: 3,
  /** A population whose highest density is below this share of its scale has reached zero. */
  vanished: 1e-9,
} as const;

/** Share of the farthest distance within which a branch counts as back. */
const CLOSED = 0.1;

export interface CycleFollowSettings {
  readonly lower: number;
  readonly upper: number;
  readonly pointBudget: number;
  readonly refine: boolean;
  /** Size of the cycle (or of its difference from the cycle it doubled from) at which the branch is back. */
  readonly isBack: (
    curve: CycleCurve,
    point: CyclePoint,
  ) => { reason: CycleBranchEnd; message: string } | null;
}

export interface AcceptedCycle {
  readonly point: CyclePoint;
  readonly extremes: CycleExtremes;
}

export interface CyclesFollowed {
  readonly cycles: AcceptedCycle[];
  readonly crossings: CycleCrossing[];
  end: { reason: CycleBranchEnd; message: string };
}

/**
 * Follows a branch of cycles from one in the direction of its tangent by pseudo-arclength continuation, with
 * mesh adaptation, refinement where the discretisation asks for it, and location of special points. A
 * generator that yields the number of cycles so far; it never ends without a reason.
 */
export function* followCycles(
  first: CycleCurve,
  begin: CyclePoint,
  settings: CycleFollowSettings,
): Generator<number, CyclesFollowed> {
  let curve = first;
  let start = begin;
  for (let finer = refined(curve, start, settings); finer; finer = refined(curve, start, settings)) {
    ({ curve, point: start } = finer);
    yield 0;
  }
  const accept = (point: CyclePoint): AcceptedCycle => ({
    point,
    extremes: cycleExtremes(curve.cycles, curve.basis, point.orbit, point.period),
  });
  const followed: CyclesFollowed = {
    cycles: [accept(start)],
    crossings: [],
    end: { reason: 'point budget spent', message: 'The point budget was spent.' },
  };
  const finish = (reason: CycleBranchEnd, message: string): CyclesFollowed => {
    followed.end = { reason, message };
    return followed;
  };
  let current = start;
  let h: number = CYCLE_STEP_DEFAULTS.first;
  let upright = 0;
  const closure = new ClosureWatch();
  while (followed.cycles.length < settings.pointBudget) {
    h = Math.min(h, CYCLE_STEP_DEFAULTS.largestShare / Math.max(Math.abs(current.tangent.parameter), 1e-12));
    const next = curve.correct(current.orbit, current.tangent, h);
    const kinds = next ? crossingKinds(current, next) : [];
    const bend = next ? curve.inner(current.orbit.mesh, current.tangent, next.tangent) : 0;
    const tooLong = next === null || bend < CYCLE_STEP_DEFAULTS.bend || (kinds.length > 1 && h > 1e-4);
    if (next === null || (tooLong && h > 10 * CYCLE_STEP_DEFAULTS.smallest)) {
      h *= CYCLE_STEP_DEFAULTS.shrink;
      if (h >= CYCLE_STEP_DEFAULTS.smallest) continue;
      return endUnresolved(followed, curve, current);
    }
    const index = followed.cycles.length - 1;
    const found = kinds.flatMap((kind): CycleCrossing[] => {
      const located = locateCycle(curve, current, next, h, kind);
      return located ? [{ kind, ...located, index }] : [];
    });
    const bound = next.orbit.parameter < settings.lower ? settings.lower : settings.upper;
    if (next.orbit.parameter < settings.lower || next.orbit.parameter > settings.upper) {
      const inside = ({ point }: CycleCrossing): boolean =>
        point.orbit.parameter >= settings.lower && point.orbit.parameter <= settings.upper;
      followed.crossings.push(...found.filter(inside));
      const along = curve.parameterDirection();
      const share = (bound - current.orbit.parameter) / curve.cycles.parameterScale;
      const last = curve.correct(current.orbit, along, share);
      if (last) followed.cycles.push(accept(last));
      return finish('left the range', `The end of the range, ${format(bound)}, was reached.`);
    }
    followed.crossings.push(...found);
    const negative = negativeState(curve, next);
    if (negative !== null)
      return finish(
        'left the state box',
        `${negative} reaches zero on the cycle at ${format(next.orbit.parameter)}; beyond it the density would be negative.`,
      );
    const iterations = next.iterations;
    let settled: CyclePoint | null = next;
    if (followed.cycles.length % CYCLE_STEP_DEFAULTS.adaptEvery === 0) {
      settled = curve.adapt(next) ?? next;
      const finer = refined(curve, settled, settings);
      if (finer) ({ curve, point: settled } = finer);
    }
    followed.cycles.push(accept(settled));
    const vanished = vanishedPopulation(curve, followed.cycles[followed.cycles.length - 1]);
    if (vanished !== null) {
      const note = `${vanished} reaches zero on the cycle at ${format(settled.orbit.parameter)}: from there it can invade the cycle without it.`;
      followed.crossings.push({ kind: 'branch point of cycles', point: settled, bracket: 1e-9, index, note });
      return finish('left the state box', note);
    }
    const back = settings.isBack(curve, settled);
    if (back) return finish(back.reason, back.message);
    upright = isUpright(settled) && !isLong(settled, start) ? upright + 1 : 0;
    const shown =
      followed.crossings.length > 0 ? CYCLE_STEP_DEFAULTS.uprightBeyond : CYCLE_STEP_DEFAULTS.upright;
    if (upright >= shown)
      return finish(
        'could not be resolved further',
        `At ${format(settled.orbit.parameter)} there is a whole family of cycles; it was not followed further.`,
      );
    if (isLong(settled, start)) {
      const rest = nearHomoclinic(curve, settled);
      if (rest) return finish(rest.reason, rest.message);
    }
    if (closure.isClosed(followed, curve.cycles.parameterScale, h))
      return finish('closed on itself', 'The branch closed on itself.');
    if (iterations <= CYCLE_STEP_DEFAULTS.easy) h *= CYCLE_STEP_DEFAULTS.grow;
    else if (iterations > 5) h *= 0.7;
    h = Math.min(h, CYCLE_STEP_DEFAULTS.largest);
    current = settled;
    yield followed.cycles.length;
  }
  return followed;
}

const isLong = (point: CyclePoint, start: CyclePoint): boolean =>
  point.period > CYCLE_STEP_DEFAULTS.longPeriod * start.period;

/** The same cycle on a finer mesh, where its resolution asks for one. */
function refined(
  curve: CycleCurve,
  point: CyclePoint,
  { refine }: CycleFollowSettings,
): { curve: CycleCurve; point: CyclePoint } | null {
  const N = Math.round(curve.N * CYCLE_STEP_DEFAULTS.refine);
  if (!refine || N > CYCLE_STEP_DEFAULTS.mostIntervals) return null;
  if (!(point.resolution > CYCLE_STEP_DEFAULTS.resolution)) return null;
  return onFinerMesh(curve, point, N);
}

/** The same cycle with N intervals. */
function onFinerMesh(
  curve: CycleCurve,
  point: CyclePoint,
  N: number,
): { curve: CycleCurve; point: CyclePoint } | null {
  const finer = new CycleCurve(curve.cycles, N, curve.m);
  const moved = finer.adapt(point);
  return moved && { curve: finer, point: moved };
}

function nearHomoclinic(
  curve: CycleCurve,
  point: CyclePoint,
): { reason: CycleBranchEnd; message: string } | null {
  if (curve.cycles.forced) return null;
  const { share, equilibria } = restOnCycle(curve.cycles, curve.m, point.orbit, point.period);
  if (share < REST_DEFAULTS.share || equilibria.length === 0) return null;
  if (Math.abs(point.tangent.parameter) > 1e-6) return null;
  const [at, period] = [format(point.orbit.parameter), format(point.period)];
  return equilibria.length === 1
    ? {
        reason: 'approaches a homoclinic orbit',
        message: `The period has grown to ${period} while the cycle passes ever closer to an equilibrium: it approaches a homoclinic orbit near ${at}.`,
      }
    : {
        reason: 'approaches a heteroclinic cycle',
        message: `The period has grown to ${period} while the cycle dwells near ${equilibria.length} equilibria in turn: it approaches a heteroclinic cycle near ${at}.`,
      };
}

function endUnresolved(followed: CyclesFollowed, curve: CycleCurve, point: CyclePoint): CyclesFollowed {
  const { share, equilibria } = curve.cycles.forced
    ? { share: 0, equilibria: [] }
    : restOnCycle(curve.cycles, curve.m, point.orbit, point.period);
  const at = format(point.orbit.parameter);
  const resting =
    share > REST_DEFAULTS.share / 2 && equilibria.length > 0
      ? ' The cycle dwells near an equilibrium there and may be approaching a homoclinic orbit.'
      : '';
  followed.end = {
    reason: 'could not be resolved further',
    message: `The branch could not be resolved further near ${at}, at a period of ${format(point.period)}.${resting}`,
  };
  return followed;
}

function negativeState(curve: CycleCurve, point: CyclePoint): string | null {
  const { n, system, logarithmic } = curve.cycles;
  const { values } = point.orbit;
  for (let i = 0; i < n; i += 1) {
    if (!system.nonnegative[i] || logarithmic[i]) continue;
    for (let at = i; at < values.length; at += n) if (values[at] < -1e-9) return system.stateSymbols[i];
  }
  return null;
}

function vanishedPopulation(curve: CycleCurve, { extremes, point }: AcceptedCycle): string | null {
  const { system, logarithmic, stateScale } = curve.cycles;
  if (point.period === 0) return null;
  const gone = system.populations.find(
    ({ states }) =>
      states.every((i) => logarithmic[i]) &&
      states.every((i) => extremes.highest[i] < CYCLE_STEP_DEFAULTS.vanished * stateScale[i]),
  );
  return gone?.name ?? null;
}

/** Tells when a branch is back at its first cycle, whatever the phase: near it after having been away. */
class ClosureWatch {
  private farthest = 0;
  private before = 0;

  isClosed({ cycles }: CyclesFollowed, parameterScale: number, h: number): boolean {
    const [first, last] = [cycles[0], cycles[cycles.length - 1]];
    const distance = distanceOf(first, last, parameterScale);
    const nearer = distance < this.before;
    this.before = distance;
    this.farthest = Math.max(this.farthest, distance);
    const [a, b] = [first.point.tangent, last.point.tangent];
    const sameWay = a.parameter * b.parameter >= 0 && a.logPeriod * b.logPeriod >= 0;
    return sameWay && nearer && distance < h && distance < CLOSED * this.farthest;
  }
}

function distanceOf(a: AcceptedCycle, b: AcceptedCycle, parameterScale: number): number {
  let largest = Math.abs(a.point.orbit.parameter - b.point.orbit.parameter) / parameterScale;
  largest = Math.max(largest, Math.abs(Math.log(a.point.period / b.point.period)));
  for (const key of ['lowest', 'highest'] as const)
    a.extremes[key].forEach((value, q) => {
      const size = Math.max(Math.abs(value), Math.abs(b.extremes[key][q]), Number.MIN_VALUE);
      largest = Math.max(largest, Math.abs(value - b.extremes[key][q]) / size);
    });
  return largest;
}

function format(value: number): string {
  return Number(value.toPrecision(6)).toString();
}
