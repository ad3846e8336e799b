import type { Progress, SpecialPoint } from '../continuation/contract';
import { scaleOfStates } from '../continuation/seeds';
import type { CompiledSystem } from '../system/contract';
import { beginAtHopf, sizeOfCycle } from './begin-at-hopf';
import { cycleThrough } from './begin-on-trajectory';
import type { CycleBranch, CycleBranchEnd, CycleOrigin, CyclesResult, CycleSpecialPoint } from './contract';
import { assembleCycleBranch, isFeasible, sampleOrbit, type BranchParts } from './cycle-branch';
import { CycleCurve, type CyclePoint } from './cycle-curve';
import { cycleExtremes } from './cycle-extremes';
import { CycleSystem } from './cycle-system';
import { CYCLES_DEFAULTS, type CyclesOptions } from './cycles-options';
import { describeCyclePoint } from './describe-cycle';
import { followCycles, type CyclesFollowed, type CycleFollowSettings } from './follow-cycles';
import { isKnownCycle } from './known-cycles';
import type { CycleCrossing } from './locate-cycle';
import { halvesDiffer, switchAtBranchPoint, switchToDoubled } from './switch-cycle';

const FOLLOWING = 'following cycles';
const STOPPED = 'Stopped before the end; what was found is kept.';
/** A cycle below this share of its first size is back where it began. */
const SHRUNK = 0.7;
/** Cycles between two reports of progress. */
const POINTS_PER_SLICE = 2;

/** A special point at which another branch is to be entered. */
interface Switch {
  readonly curve: CycleCurve;
  readonly at: CyclePoint;
  readonly special: CycleSpecialPoint;
  readonly generation: number;
}

/** One run: branches, special points and notes as they come. */
export class CyclesRun {
  private readonly branches: CycleBranch[] = [];
  private readonly points: CycleSpecialPoint[] = [];
  private readonly switches: Switch[] = [];
  private readonly notes = new Set<string>();
  private readonly began: number;
  private readonly parameterScale: number;
  private fraction = 0;
  private count = 0;

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly options: CyclesOptions,
  ) {
    this.began = options.clock?.() ?? 0;
    this.parameterScale = Math.abs(options.to - options.from) || 1;
  }

  note(sentence: string): void {
    this.notes.add(sentence);
  }

  progress(fraction: number, stage: string): Progress<CyclesResult> {
    this.fraction = Math.max(this.fraction, fraction);
    return { fraction: this.fraction, stage, partial: this.result('cancelled', STOPPED) };
  }

  result(status: CyclesResult['status'], message: string): CyclesResult {
    const { system, options } = this;
    system.setParameters(this.p);
    return {
      status,
      message,
      parameterKey: system.parameterKeys[options.parameterIndex] ?? '',
      from: options.from,
      to: options.to,
      stateSymbols: system.stateSymbols,
      forcingPeriod: system.forcingPeriod(),
      branches: [...this.branches],
      specialPoints: [...this.points],
      points: this.count,
      milliseconds: (options.clock?.() ?? 0) - this.began,
    };
  }

  summary(): string {
    const { branches, count } = this;
    const found =
      branches.length === 0
        ? 'No branch of cycles was found.'
        : `${branches.length === 1 ? 'One branch' : `${branches.length} branches`} of cycles, ${count} cycles.`;
    return [found, ...this.notes].join(' ');
  }

  *fromHopf(hopf: SpecialPoint, fraction: number): Generator<Progress<CyclesResult>, void> {
    if (this.endsThere(hopf)) return;
    const curve = this.curveFor(hopf.state, hopf.parameter, 0);
    const point = beginAtHopf(curve, hopf);
    if (point === null) {
      this.note(`No cycle could be followed from the Hopf point at ${format(hopf.parameter)}.`);
      return;
    }
    const first = sizeOfCycle(curve, point.orbit);
    const isBack: CycleFollowSettings['isBack'] = (own, { orbit }) =>
      sizeOfCycle(own, orbit) < SHRUNK * first
        ? {
            reason: 'shrank to a Hopf point',
            message: `The cycle shrank to an equilibrium: a Hopf point lies at ${format(orbit.parameter)}.`,
          }
        : null;
    yield* this.follow(curve, point, isBack, {
      origin: { kind: 'Hopf', parameter: hopf.parameter, specialPoint: hopf.id },
      hopf,
      fraction,
      generation: 0,
      bothWays: false,
    });
  }

  *fromState(
    state: Float64Array,
    period: number,
    parameter: number,
    kind: 'trajectory' | 'period map',
  ): Generator<Progress<CyclesResult>, void> {
    const forcings =
      kind === 'period map' ? (this.options.forcingPeriods ?? CYCLES_DEFAULTS.forcingPeriods) : 0;
    const curve = this.curveFor(state, parameter, forcings);
    const point = cycleThrough(curve, state, period, parameter);
    if (point === null) {
      this.note(`The run from the start values is not on a cycle of period ${format(period)}.`);
      return;
    }
    if (this.isKnown(curve, point)) return;
    const isBack: CycleFollowSettings['isBack'] = (own, { orbit }) =>
      !own.cycles.forced && sizeOfCycle(own, orbit) < 0.01
        ? {
            reason: 'shrank to a Hopf point',
            message: `The cycle shrank to an equilibrium: a Hopf point lies near ${format(orbit.parameter)}.`,
          }
        : null;
    yield* this.follow(curve, point, isBack, {
      origin: { kind, parameter },
      hopf: null,
      fraction: this.fraction,
      generation: 0,
      bothWays: true,
    });
  }

  /** Branches entered at the special points of those followed before, as long as there are any. */
  *followSwitches(): Generator<Progress<CyclesResult>, void> {
    for (let next = this.switches.shift(); next !== undefined; next = this.switches.shift()) {
      if (this.branches.length >= CYCLES_DEFAULTS.branchBudget) {
        this.note('The budget of branches was spent.');
        return;
      }
      if (next.special.kind === 'period doubling') yield* this.enterDoubled(next);
      else yield* this.enterOther(next);
    }
  }

  private *enterDoubled({ curve, at, special, generation }: Switch): Generator<Progress<CyclesResult>, void> {
    const entered = switchToDoubled(curve, at);
    if (entered === null) {
      this.note(`The doubled cycle at ${format(special.parameter)} could not be entered.`);
      return;
    }
    if (this.isKnown(entered.curve, entered.point)) return;
    const first = halvesDiffer(entered.curve, entered.point.orbit);
    const isBack: CycleFollowSettings['isBack'] = (own, { orbit }) =>
      halvesDiffer(own, orbit) < SHRUNK * first
        ? {
            reason: 'joined the cycle it doubled from',
            message: `Its two turns became alike again at ${format(orbit.parameter)}.`,
          }
        : null;
    const { parameter, id } = special;
    yield* this.follow(entered.curve, entered.point, isBack, {
      origin: { kind: 'period doubling', parameter, specialPoint: id },
      hopf: null,
      fraction: this.fraction,
      generation: generation + 1,
      bothWays: false,
    });
  }

  private *enterOther({ curve, at, special, generation }: Switch): Generator<Progress<CyclesResult>, void> {
    for (const entered of switchAtBranchPoint(curve, at)) {
      const { lowest } = cycleExtremes(
        entered.curve.cycles,
        entered.curve.basis,
        entered.point.orbit,
        entered.point.period,
      );
      if (!isFeasible(entered.curve.cycles, lowest)) continue;
      // Close to the branch point the cycle is hardly told from the one it leaves.
      if (this.isKnown(entered.curve, entered.point, special.branch)) continue;
      const { parameter, id } = special;
      yield* this.follow(entered.curve, entered.point, () => null, {
        origin: { kind: 'branch point of cycles', parameter, specialPoint: id },
        hopf: null,
        fraction: this.fraction,
        generation,
        bothWays: false,
      });
    }
  }

  private *follow(
    curve: CycleCurve,
    start: CyclePoint,
    isBack: CycleFollowSettings['isBack'],
    how: {
      readonly origin: CycleOrigin;
      readonly hopf: SpecialPoint | null;
      readonly fraction: number;
      readonly generation: number;
      readonly bothWays: boolean;
    },
  ): Generator<Progress<CyclesResult>, void> {
    const { from, to } = this.options;
    const settings: CycleFollowSettings = {
      lower: Math.min(from, to),
      upper: Math.max(from, to),
      pointBudget: this.options.maximumPoints ?? CYCLES_DEFAULTS.maximumPoints,
      refine: this.options.refine ?? true,
      isBack,
    };
    const forth = yield* this.drive(followCycles(curve, start, settings), how.fraction);
    const turned: CyclePoint = {
      ...start,
      tangent: {
        values: start.tangent.values.map((value) => -value),
        parameter: -start.tangent.parameter,
        logPeriod: -start.tangent.logPeriod,
      },
    };
    const closed = forth.end.reason === 'closed on itself';
    const back =
      how.bothWays && !closed ? yield* this.drive(followCycles(curve, turned, settings), how.fraction) : null;
    this.keep(curve, { origin: how.origin, hopf: how.hopf, back, forth }, how.generation);
    yield this.progress(this.fraction, FOLLOWING);
  }

  private *drive(
    work: Generator<number, CyclesFollowed>,
    fraction: number,
  ): Generator<Progress<CyclesResult>, CyclesFollowed> {
    for (;;) {
      const step = work.next();
      if (step.done) return step.value;
      if (step.value % POINTS_PER_SLICE === 0) yield this.progress(fraction, FOLLOWING);
    }
  }

  private keep(
    curve: CycleCurve,
    followed: Pick<BranchParts, 'origin' | 'hopf' | 'back' | 'forth'>,
    generation: number,
  ): void {
    const parts: BranchParts = {
      ...followed,
      cycles: curve.cycles,
      m: curve.m,
      startMessage: { reason: START_REASON[followed.origin.kind], message: beginning(followed.origin) },
    };
    const index = this.branches.length;
    const branch = assembleCycleBranch(parts, (point) => sampleOrbit(curve, point));
    this.branches.push(branch);
    this.count += branch.parameters.length;
    const lead = followed.hopf ? 1 : 0;
    const backLength = followed.back ? followed.back.cycles.length - 1 : 0;
    const { back, forth } = followed;
    const placed = [
      ...(back?.crossings ?? []).map((one) => ({ one, at: backLength - one.index - 1 })),
      ...forth.crossings.map((one) => ({ one, at: backLength + one.index + lead })),
    ].sort((a, b) => a.at - b.at);
    for (const { one, at } of placed) this.keepPoint(curve, one, index, at, generation);
  }

  private keepPoint(
    curve: CycleCurve,
    { kind, point, bracket, note }: CycleCrossing,
    branch: number,
    index: number,
    generation: number,
  ): void {
    const { cycles } = curve;
    const extremes = cycleExtremes(cycles, curve.basis, point.orbit, point.period);
    const special = describeCyclePoint(cycles, kind, point, {
      id: `cycle-${this.points.length + 1}`,
      branch,
      index,
      accuracy: Math.min(1, bracket * Math.max(Math.abs(point.tangent.parameter), 1e-3)),
      extremes,
      feasible: isFeasible(cycles, extremes.lowest),
      note: note ?? null,
    });
    this.points.push(special);
    const own =
      curve.N === point.orbit.mesh.length - 1
        ? curve
        : new CycleCurve(cycles, point.orbit.mesh.length - 1, curve.m);
    const most = this.options.doublings ?? CYCLES_DEFAULTS.doublings;
    if (!special.feasible || note) return;
    if (kind === 'period doubling' ? generation < most : kind === 'branch point of cycles')
      this.switches.push({ curve: own, at: point, special, generation });
  }

  private curveFor(state: Float64Array, parameter: number, forcingPeriods: number): CycleCurve {
    const { system, options } = this;
    const p = Float64Array.from(this.p);
    p[options.parameterIndex] = parameter;
    const scale = scaleOfStates(system.dimension, [state, ...options.starts]);
    const cycles = new CycleSystem(
      system,
      p,
      options.parameterIndex,
      this.parameterScale,
      state,
      scale,
      forcingPeriods,
    );
    return new CycleCurve(
      cycles,
      (options.intervals ?? CYCLES_DEFAULTS.intervals) * Math.max(1, forcingPeriods),
      options.collocationPoints ?? CYCLES_DEFAULTS.collocationPoints,
    );
  }

  private isKnown(curve: CycleCurve, point: CyclePoint, besides = -1): boolean {
    const { lowest, highest } = cycleExtremes(curve.cycles, curve.basis, point.orbit, point.period);
    const others = this.branches.filter((_, k) => k !== besides);
    return isKnownCycle(others, {
      parameter: point.orbit.parameter,
      period: point.period,
      lowest,
      highest,
    });
  }

  /** Whether a branch already followed shrank to this Hopf point. */
  private endsThere(hopf: SpecialPoint): boolean {
    const ends = (reason: CycleBranchEnd): boolean => reason === 'shrank to a Hopf point';
    return this.branches.some((branch) => {
      const last = branch.parameters.length - 1;
      const q = branch.quantities.length;
      const near = (k: number): boolean =>
        Math.abs(branch.parameters[k] - hopf.parameter) < 1e-2 * this.parameterScale &&
        hopf.state.every(
          (value, i) => Math.abs(branch.mean[k * q + i] - value) <= 0.05 * Math.max(Math.abs(value), 1e-12),
        );
      return (ends(branch.endEnd.reason) && near(last)) || (ends(branch.startEnd.reason) && near(0));
    });
  }
}

const START_REASON: Readonly<Record<CycleOrigin['kind'], CycleBranchEnd>> = {
  Hopf: 'shrank to a Hopf point',
  trajectory: 'could not be resolved further',
  'period map': 'could not be resolved further',
  'period doubling': 'joined the cycle it doubled from',
  'branch point of cycles': 'joined a branch already followed',
};

function beginning({ kind, parameter }: CycleOrigin): string {
  const at = format(parameter);
  switch (kind) {
    case 'Hopf':
      return `Begins at the Hopf point at ${at}.`;
    case 'period doubling':
      return `Begins at the period doubling at ${at}.`;
    case 'branch point of cycles':
      return `Begins at the branch point at ${at}.`;
    case 'trajectory':
    case 'period map':
      return `Begins at ${at}.`;
  }
}

function format(value: number): string {
  return Number(value.toPrecision(6)).toString();
}
