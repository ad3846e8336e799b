import { findEquilibria } from '../equilibria/search';
import { absenceOf } from '../equilibria/faces';
import { nullVector } from '../linalg/null-vector';
import type { CompiledSystem } from '../system/contract';
import { integrateBand, repellingStretch } from './bands';
import { assembleBranch, assembledIndex } from './branch-assembly';
import { BranchSet } from './branch-set';
import type { Band, Branch, Progress, SpecialPoint, SweepResult } from './contract';
import { refineBoundaryCrossing } from './boundary-crossing';
import { Curve } from './curve';
import type { Crossing } from './crossings';
import { followBranch, STEP_DEFAULTS, type Followed } from './pseudo-arclength';
import { pointAlong } from './locate';
import { describeHopf, makeSpecialPoint, withInvaders } from './special-points';
import { invadingBranch, isPitchfork, secondDirection, stepAcross } from './switch-branch';
import { Monitor, type AbsentGroup, type BranchPoint } from './test-functions';

export const SWEEP_DEFAULTS = {
  /** Values along the range at which equilibria are sought, so that separate branches are found too. */
  searches: 4,
  /** Newton runs of each such search. */
  startsPerSearch: 400,
  pointBudget: 20_000,
  branchBudget: 60,
  largestStep: STEP_DEFAULTS.largest,
} as const;

export interface SweepOptions {
  readonly parameterIndex: number;
  readonly from: number;
  readonly to: number;
  /** States to begin from, beside what the searches find; also set the size of the guessed box. */
  readonly starts: readonly Float64Array[];
  readonly box?: readonly ({ readonly from: number; readonly to: number } | null)[];
  /** Long-run bands past Hopf points; true unless told. */
  readonly bands?: boolean;
  /** Largest step in scaled arclength: smaller draws smoother and takes longer. */
  readonly largestStep?: number;
  /** What the parameter is called in sentences. */
  readonly parameterLabel?: string;
  /** Clock for the time told in the result, in milliseconds; without one it is 0. */
  readonly clock?: () => number;
}

/** A state below this share of its scale is taken as absent where its absence lasts. */
const ABSENT_SHARE = 1e-10;

/** A present state below this share of its scale is on its way to zero. */
const VANISHING_SHARE = 1e-3;

/** Where on which branch a crossing was found. */
interface Place {
  readonly at: BranchPoint;
  readonly branch: number;
  readonly index: number;
  readonly accuracy: number;
  readonly label: string;
  /** Whether the branch turns back in the parameter within the same step. */
  readonly turns: boolean;
}

interface Start {
  readonly state: Float64Array;
  readonly parameter: number;
  readonly active: readonly number[];
  /** Point and tangent already known, from switching branches. */
  readonly w: Float64Array | null;
}

const NOT_ISOLATED =
  'Some states that rest lie on a whole curve of such states at one value of the parameter; those cannot be followed.';
const NOT_DIFFERENTIABLE =
  'Some states that rest have no Jacobian, as where the last pair would have to meet; they are not drawn.';
const NEUTRAL_STRETCH =
  'Along a stretch a real part cannot be told from zero, so that the equilibrium is neutral or nearly so there; no Hopf point is claimed on it.';

/** Distance, in scaled arclength, by which a start is moved off a special point. */
const BESIDE_SPECIAL = 7.3e-4;

/** So many neighbouring points without decision are a stretch. */
const STRETCH = 3;

const NEEDS_PERIOD_MAP =
  'The formulas contain the time t, so that nothing rests: a sweep would need the period map, which this version does not compute.';

/**
 * Sweeps one parameter: every equilibrium found along the range is followed in both directions by
 * pseudo-arclength continuation, special points are located on the way and other branches entered there,
 * then long-run bands are integrated past Hopf points. A generator whose progress holds the result so far;
 * leaving it early loses nothing that was found. Trouble is a value: every branch says why it ends.
 *
 * @param p all parameters, in the order of `system.parameterKeys`; the swept one is overwritten
 */
export function* sweep(
  system: CompiledSystem,
  p: Float64Array,
  options: SweepOptions,
): Generator<Progress<SweepResult>, SweepResult> {
  const run = new SweepRun(system, p, options);
  if (!system.autonomous) return run.result('needs-period-map', NEEDS_PERIOD_MAP);
  if (!(options.parameterIndex >= 0 && options.parameterIndex < p.length)) {
    return run.result('failed', 'The parameter to sweep is not one of this model.');
  }
  if (!Number.isFinite(options.from) || !Number.isFinite(options.to) || options.from === options.to) {
    return run.result('failed', 'The range of a sweep needs two different finite ends.');
  }
  yield* run.seed();
  yield* run.followAll();
  if (options.bands !== false) yield* run.integrateBands();
  return run.result('complete', run.summary());
}

class SweepRun {
  private readonly lower: number;
  private readonly upper: number;
  private readonly scale: number;
  private readonly label: string;
  private stateScale: Float64Array;
  private set: BranchSet | null = null;
  private readonly queue: Start[] = [];
  private readonly points: SpecialPoint[] = [];
  private readonly bands: Band[] = [];
  private readonly invariance = new Map<string, boolean>();
  private count = 0;
  private readonly began: number;
  private budgetSpent = false;
  /** Sentences that the message of the result ends with. */
  private readonly notes = new Set<string>();

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly options: SweepOptions,
  ) {
    this.lower = Math.min(options.from, options.to);
    this.upper = Math.max(options.from, options.to);
    this.scale = this.upper - this.lower || 1;
    this.label = options.parameterLabel ?? system.parameterKeys[options.parameterIndex] ?? 'the parameter';
    this.stateScale = new Float64Array(system.dimension).fill(1);
    this.began = options.clock?.() ?? 0;
  }

  /** Equilibria at values along the range. */
  *seed(): Generator<Progress<SweepResult>, void> {
    const { system, options } = this;
    const current = this.p[options.parameterIndex];
    const values = Array.from(
      { length: SWEEP_DEFAULTS.searches },
      (_, k) => options.from + ((options.to - options.from) * k) / (SWEEP_DEFAULTS.searches - 1),
    );
    if (current > this.lower && current < this.upper) values.unshift(current);
    const found: { state: Float64Array; parameter: number }[] = [];
    for (const [k, value] of values.entries()) {
      const p = Float64Array.from(this.p);
      p[options.parameterIndex] = value;
      const search = findEquilibria(system, p, {
        starts: [...options.starts, ...found.map((one) => one.state)],
        maximumStarts: SWEEP_DEFAULTS.startsPerSearch,
        ...(options.box ? { box: options.box } : {}),
      });
      let step = search.next();
      while (!step.done) {
        yield this.progress((0.3 * k) / values.length, 'looking for equilibria along the range');
        step = search.next();
      }
      for (const one of step.value.equilibria) {
        if (!one.feasible) continue;
        if (one.type === 'not isolated') this.notes.add(NOT_ISOLATED);
        else if (one.type === 'not differentiable') {
          if (one.absent.length > 0) this.notes.add(NOT_DIFFERENTIABLE);
        } else found.push({ state: one.state, parameter: value });
      }
    }
    this.chooseScale(found.map((one) => one.state));
    for (const { state, parameter } of found) this.enqueue(state, parameter);
  }

  /** Scale of each state: the largest equilibrium value seen, of its population where it has none itself. */
  private chooseScale(states: readonly Float64Array[]): void {
    const n = this.system.dimension;
    const largest = new Float64Array(n);
    for (const state of [...states, ...this.options.starts]) {
      for (let i = 0; i < n; i += 1) largest[i] = Math.max(largest[i], Math.abs(state[i]));
    }
    const overall = Math.max(...largest) || 1;
    this.stateScale = largest.map((value) => (value > 1e-6 * overall ? value : overall));
    this.set = new BranchSet(this.system, this.p, this.options.parameterIndex, this.stateScale, this.scale);
  }

  /** States that are present: all but those at exactly zero whose absence lasts. */
  private activeOf(state: Float64Array): readonly number[] {
    const { system } = this;
    const zero = system.stateSymbols
      .map((_, i) => i)
      .filter((i) => system.nonnegative[i] && Math.abs(state[i]) <= ABSENT_SHARE * this.stateScale[i]);
    const absent = this.absenceLasts(zero) ? zero : zero.filter((i) => this.absenceLasts([i]));
    return system.stateSymbols.map((_, i) => i).filter((i) => !absent.includes(i));
  }

  private enqueue(state: Float64Array, parameter: number): void {
    const active = this.activeOf(state);
    const exact = state.map((value, i) => (active.includes(i) ? value : 0));
    this.queue.push({ state: exact, parameter, active, w: null });
  }

  private absenceLasts(states: readonly number[]): boolean {
    const key = states.join(' ');
    let lasts = this.invariance.get(key);
    if (lasts === undefined) {
      this.system.setParameters(this.p);
      lasts = states.length === 0 || absenceOf(this.system, states, this.stateScale) === 'lasts';
      this.invariance.set(key, lasts);
    }
    return lasts;
  }

  *followAll(): Generator<Progress<SweepResult>, void> {
    const set = this.set;
    if (set === null) return;
    while (this.queue.length > 0) {
      const start = this.queue.shift();
      if (start === undefined || set.holds(start.state, start.parameter, start.active)) continue;
      if (set.branches.length >= SWEEP_DEFAULTS.branchBudget || this.count >= SWEEP_DEFAULTS.pointBudget) {
        this.budgetSpent = true;
        return;
      }
      yield* this.followOne(start, set);
    }
  }

  private groupsAbsent(active: readonly number[]): AbsentGroup[] {
    return this.system.populations
      .map(({ symbol, states }) => ({
        population: symbol,
        states: states.filter((i) => !active.includes(i)),
      }))
      .filter((group) => group.states.length > 0);
  }

  private *followOne(start: Start, set: BranchSet): Generator<Progress<SweepResult>, void> {
    // Entered beyond an end of the range, the branch is not seen within it.
    if (start.parameter < this.lower || start.parameter > this.upper) return;
    // A corrector that slid onto a smaller face has found a branch of that face.
    if (start.w !== null && this.activeOf(start.state).length < start.active.length) {
      this.enqueue(start.state, start.parameter);
      return;
    }
    const curve = this.curveOn(start.active);
    const groups = this.groupsAbsent(start.active);
    const monitor = new Monitor(curve, groups);
    const w = start.w ?? curve.pointOf(start.state, start.parameter);
    if (start.w === null) {
      const across = new Float64Array(curve.m + 1);
      across[curve.m] = 1;
      if (curve.correct(w, across, start.parameter / this.scale) < 0) return;
    }
    const tangent = new Float64Array(curve.m + 1);
    if (!curve.evaluate(w) || !curve.firstTangent(tangent)) return;
    const forthStart = this.besideSpecial(monitor, monitor.pointAt(w, tangent));
    const backStart =
      forthStart &&
      monitor.pointAt(
        forthStart.w,
        forthStart.tangent.map((value) => -value),
      );
    if (forthStart === null || backStart === null) return;
    const directions: Followed[] = [];
    for (const first of [backStart, forthStart]) {
      const follow = followBranch(monitor, first, {
        lower: this.lower,
        upper: this.upper,
        label: (state) => this.system.stateSymbols[state],
        largestStep: this.options.largestStep ?? SWEEP_DEFAULTS.largestStep,
        pointBudget: Math.max(2, Math.min(STEP_DEFAULTS.points, SWEEP_DEFAULTS.pointBudget - this.count)),
      });
      let step = follow.next();
      while (!step.done) {
        if (step.value % 32 === 0)
          yield this.progress(0.3 + 0.4 * (1 - 1 / (1 + set.branches.length)), 'following branches');
        step = follow.next();
      }
      directions.push(step.value);
      if (step.value.end.reason === 'closed on itself') break;
    }
    const [back, forth = { points: [forthStart], crossings: [], end: back.end }] = directions;
    this.count += back.points.length + forth.points.length - 1;
    const absent = groups.filter((group) => this.isWhole(group)).map((group) => group.population);
    const index = set.branches.length;
    set.add(
      assembleBranch(back, forth, this.system.dimension, (point) => this.isFeasible(point, curve), absent),
      start.active,
    );
    for (const [direction, { crossings }] of [
      ['back', back],
      ['forth', forth],
    ] as const) {
      for (const crossing of crossings) {
        this.treat(crossing, monitor, {
          branch: index,
          index: assembledIndex(back, direction, crossing.index),
          turns: crossings.some((other) => other.kind === 'fold' && other.index === crossing.index),
        });
      }
    }
  }

  /** A start at a special point would hide it: its neighbour within the range serves instead. */
  private besideSpecial(monitor: Monitor, start: BranchPoint | null): BranchPoint | null {
    if (start === null || start.monitors.undecided === 0) return start;
    for (const s of [BESIDE_SPECIAL, -BESIDE_SPECIAL]) {
      const beside = pointAlong(monitor, start, s);
      if (beside && beside.parameter > this.lower && beside.parameter < this.upper) return beside;
    }
    return start;
  }

  private isWhole(group: AbsentGroup): boolean {
    return this.system.populations.some(
      (one) => one.symbol === group.population && one.states.length === group.states.length,
    );
  }

  private isFeasible(point: BranchPoint, curve: Curve): boolean {
    return this.system.nonnegative.every((needed, i) => !needed || point.u[i] >= -1e-9 * curve.stateScale[i]);
  }

  private curveOn(active: readonly number[]): Curve {
    return new Curve(this.system, this.p, this.options.parameterIndex, active, this.stateScale, this.scale);
  }

  /** Names the crossing, records it, and queues the branches that begin there. */
  private treat(
    crossing: Crossing,
    monitor: Monitor,
    place: Pick<Place, 'branch' | 'index' | 'turns'>,
  ): void {
    const at = crossing.located.point;
    const common = { ...place, at, accuracy: crossing.located.bracket, label: this.label };
    switch (crossing.kind) {
      case 'fold': {
        this.record(makeSpecialPoint(monitor, this.system, { ...common, kind: 'fold' }));
        return;
      }
      case 'Hopf': {
        const hopf = describeHopf(monitor, at);
        if (hopf) this.record(makeSpecialPoint(monitor, this.system, { ...common, kind: 'Hopf', hopf }));
        return;
      }
      case 'zero':
        this.treatZero(monitor, common);
        return;
      case 'transversal':
        this.treatInvasion(crossing, monitor, common);
        return;
      case 'branch':
        this.treatBranchPoint(monitor, common);
    }
  }

  /** States that all but vanish at a point. */
  private vanishing(monitor: Monitor, at: BranchPoint): number[] {
    return monitor.curve.active.filter(
      (i) => this.system.nonnegative[i] && Math.abs(at.u[i]) < VANISHING_SHARE * this.stateScale[i],
    );
  }

  /** A present population that reaches zero: the branch meets the one without it, where the crossing is located anew. */
  private treatZero(monitor: Monitor, common: Place): void {
    const { at } = common;
    const vanished = this.vanishing(monitor, at);
    const zero = this.system.stateSymbols
      .map((_, i) => i)
      .filter((i) => !monitor.curve.active.includes(i) || vanished.includes(i));
    if (!this.absenceLasts(zero)) return;
    const state = at.u.map((value, i) => (zero.includes(i) ? 0 : value));
    const active = this.activeOf(state);
    const face = new Monitor(this.curveOn(active), this.groupsAbsent(active));
    const gone = face.absent
      .map((group, g) => ({ group, g }))
      .filter(({ group }) => group.states.some((i) => vanished.includes(i)));
    const only = gone[0];
    const refined =
      gone.length === 1 && only ? refineBoundaryCrossing(face, state, at.parameter, only.g) : null;
    this.record(
      makeSpecialPoint(refined ? face : monitor, this.system, {
        ...common,
        at: refined ?? at,
        accuracy: refined ? 0 : common.accuracy,
        kind: 'transcritical',
        invades: gone.map(({ group }) => group.population),
      }),
    );
    this.enqueue(state, at.parameter);
  }

  private treatInvasion(crossing: Crossing, monitor: Monitor, common: Place): void {
    const { at } = common;
    const group = monitor.absent[crossing.which];
    if (!monitor.curve.evaluate(at.w)) return;
    const { vector } = nullVector(monitor.block(crossing.which), group.states.length);
    const active = this.withFed([...monitor.curve.active, ...group.states]);
    const wide = this.curveOn(active);
    const w = invadingBranch(wide, at.u, at.parameter, group.states, vector);
    const mixed = vector.some((x) => x > 1e-9) && vector.some((x) => x < -1e-9);
    if (mixed) return;
    this.record(
      makeSpecialPoint(monitor, this.system, {
        ...common,
        kind: 'transcritical',
        invades: [group.population],
      }),
    );
    if (w) {
      wide.load(w);
      this.queue.push({ state: wide.u.slice(), parameter: wide.parameterAt(w), active, w });
    }
  }

  /** Present states together with absent populations that they feed, so that the rest stays absent. */
  private withFed(present: readonly number[]): number[] {
    const states = this.system.stateSymbols.map((_, i) => i);
    let active = [...present];
    const rest = (): number[] => states.filter((i) => !active.includes(i));
    while (!this.absenceLasts(rest())) {
      const fed = rest().filter((i) => !this.absenceLasts([i]));
      active = fed.length > 0 ? [...active, ...fed] : states;
    }
    return active.sort((a, b) => a - b);
  }

  private treatBranchPoint(monitor: Monitor, common: Place): void {
    const { at } = common;
    const { curve } = monitor;
    // The end of the branch at zero is such a point too, and is treated as one.
    const vanished = this.vanishing(monitor, at);
    if (vanished.length > 0 && this.absenceLasts(vanished)) return;
    const across = secondDirection(monitor, at);
    const plus = across && stepAcross(curve, at, across, 1);
    const minus = across && stepAcross(curve, at, across, -1);
    // Seen from the branch that turns back there, or from the one that does not.
    const mirrored = plus !== null && minus !== null && (common.turns || isPitchfork(at.w, plus, minus));
    const kind = plus && minus ? (mirrored ? 'pitchfork' : 'transcritical') : 'branch point';
    this.record(makeSpecialPoint(monitor, this.system, { ...common, kind }));
    for (const w of [plus, minus]) {
      if (!w) continue;
      curve.load(w);
      this.queue.push({ state: curve.u.slice(), parameter: curve.parameterAt(w), active: curve.active, w });
    }
  }

  /** Adds a point unless another branch has shown it; the sharper one is kept. */
  private record(point: SpecialPoint): void {
    const twin = this.points.findIndex(
      (known) =>
        Math.abs(known.parameter - point.parameter) < 1e-6 * this.scale &&
        known.state.every((value, i) => Math.abs(value - point.state[i]) < 1e-4 * this.stateScale[i]),
    );
    if (twin >= 0) {
      this.points[twin] = merged(this.points[twin], point);
      return;
    }
    this.points.push(point);
  }

  *integrateBands(): Generator<Progress<SweepResult>, void> {
    const set = this.set;
    if (set === null) return;
    const hopfs = this.points.filter((point) => point.kind === 'Hopf' && point.feasible);
    for (const [k, hopf] of hopfs.entries()) {
      const stretch = repellingStretch(set.branches[hopf.branch], hopf);
      if (stretch === null) continue;
      const run = integrateBand(this.system, this.p, this.options.parameterIndex, stretch);
      let step = run.next();
      while (!step.done) {
        yield this.progress(
          0.7 + (0.3 * (k + step.value)) / hopfs.length,
          'following the long run past Hopf points',
        );
        step = run.next();
      }
      this.bands.push(step.value);
    }
  }

  private progress(fraction: number, stage: string): Progress<SweepResult> {
    return {
      fraction,
      stage,
      partial: this.result('cancelled', 'Stopped before the end; what was found is shown.'),
    };
  }

  summary(): string {
    const branches = this.set?.branches.length ?? 0;
    if (this.set?.branches.some(hasNeutralStretch)) this.notes.add(NEUTRAL_STRETCH);
    const spent = this.budgetSpent ? ['The point budget was spent, so that branches may be missing.'] : [];
    const count = branches === 1 ? '1 branch' : `${branches} branches`;
    const told =
      branches === 0 ? 'No equilibrium was followed along the range.' : `${count}, ${this.count} points.`;
    return [told, ...spent, ...this.notes].join(' ');
  }

  result(status: SweepResult['status'], message: string): SweepResult {
    const { options, system } = this;
    const ordered = [...this.points].sort((a, b) => a.parameter - b.parameter);
    return {
      status,
      message,
      parameterKey: system.parameterKeys[options.parameterIndex] ?? '',
      from: options.from,
      to: options.to,
      stateSymbols: system.stateSymbols,
      branches: this.set?.branches.slice() ?? [],
      specialPoints: ordered.map((point, k) => ({ ...point, id: `${point.kind}-${k + 1}` })),
      bands: this.bands.slice(),
      points: this.count,
      milliseconds: (options.clock?.() ?? 0) - this.began,
    };
  }
}

function hasNeutralStretch(branch: Branch): boolean {
  let run = 0;
  return branch.attracts.some((value, k) => {
    run = value === 2 && branch.feasible[k] === 1 ? run + 1 : 0;
    return run >= STRETCH;
  });
}

/** Of two views of one point the more telling, and of equals the sharper; invaders of both. */
function merged(known: SpecialPoint, point: SpecialPoint): SpecialPoint {
  const tells = (one: SpecialPoint): number => ['fold', 'branch point'].indexOf(one.kind) + 1 || 3;
  const better =
    tells(point) > tells(known) || (tells(point) === tells(known) && point.accuracy < known.accuracy);
  const kept = better ? point : known;
  const other = better ? known : point;
  const more = other.kind === kept.kind ? other.invades.filter((one) => !kept.invades.includes(one)) : [];
  return more.length === 0 ? kept : withInvaders(kept, [...kept.invades, ...more]);
}
