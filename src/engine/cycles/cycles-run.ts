import type { Progress, SpecialPoint } from '../continuation/contract';
import { scaleOfStates } from '../continuation/seeds';
import type { CompiledSystem } from '../system/contract';
import { beginAtHopf, sizeOfCycle } from './begin-at-hopf';
import { cycleThrough } from './begin-on-trajectory';
import type { CycleOrigin, CyclesResult } from './contract';
import { isFeasible } from './cycle-branch';
import { CycleCurve, type CyclePoint } from './cycle-curve';
import { cycleExtremes } from './cycle-extremes';
import { CycleSystem } from './cycle-system';
import { CYCLES_DEFAULTS, type CyclesOptions } from './cycles-options';
import { CyclesRecord, type Switch } from './cycles-record';
import { followCycles, type CyclesFollowed, type CycleFollowSettings } from './follow-cycles';
import { isUpright } from './locate-cycle';
import { halvesDiffer, switchAtBranchPoint, switchToDoubled, turned } from './switch-cycle';

const FOLLOWING = 'following cycles';
/** A cycle below this share of its first size is back where it began. */
const SHRUNK = 0.7;
/** Size, in scaled coordinates, below which a cycle found by a trajectory has shrunk to an equilibrium. */
const NO_SIZE = 0.01;
/** Cycles between two reports of progress. */
const POINTS_PER_SLICE = 2;

/** Enters branches of cycles and follows them; what is found goes to its record. */
export class CyclesRun {
  readonly record: CyclesRecord;
  private readonly parameterScale: number;

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly options: CyclesOptions,
  ) {
    this.parameterScale = Math.abs(options.to - options.from) || 1;
    this.record = new CyclesRecord(system, p, options, this.parameterScale);
  }

  *fromHopf(hopf: SpecialPoint, fraction: number): Generator<Progress<CyclesResult>, void> {
    if (this.record.endsThere(hopf)) return;
    const curve = this.curveFor(hopf.state, hopf.parameter, 0);
    const point = beginAtHopf(curve, hopf);
    if (point === null) {
      this.record.note(`No cycle could be followed from the Hopf point at ${format(hopf.parameter)}.`);
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
      this.record.note(
        `The run from the start values repeats itself after ${format(period)}, but no isolated cycle could be followed from it; a neutral model has cycles of all sizes.`,
      );
      return;
    }
    if (this.record.isKnown(curve, point)) return;
    const isBack: CycleFollowSettings['isBack'] = (own, { orbit }) =>
      !own.cycles.forced && sizeOfCycle(own, orbit) < NO_SIZE
        ? {
            reason: 'shrank to a Hopf point',
            message: `The cycle shrank to an equilibrium: a Hopf point lies near ${format(orbit.parameter)}.`,
          }
        : null;
    yield* this.follow(curve, point, isBack, {
      origin: { kind, parameter },
      hopf: null,
      fraction: this.record.fraction,
      generation: 0,
      bothWays: true,
    });
  }

  /** Branches entered at the special points of those followed before, as long as there are any. */
  *followSwitches(): Generator<Progress<CyclesResult>, void> {
    for (let next = this.record.switches.shift(); next !== undefined; next = this.record.switches.shift()) {
      if (this.record.branchCount >= CYCLES_DEFAULTS.branchBudget) {
        this.record.note('The budget of branches was spent.');
        return;
      }
      if (next.special.kind === 'period doubling') yield* this.enterDoubled(next);
      else yield* this.enterOther(next);
    }
  }

  private *enterDoubled({ curve, at, special, generation }: Switch): Generator<Progress<CyclesResult>, void> {
    const entered = switchToDoubled(curve, at);
    if (entered === null) {
      this.record.note(`The doubled cycle at ${format(special.parameter)} could not be entered.`);
      return;
    }
    if (this.record.isKnown(entered.curve, entered.point)) return;
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
      fraction: this.record.fraction,
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
      if (this.record.isKnown(entered.curve, entered.point, special.branch)) continue;
      const { parameter, id } = special;
      yield* this.follow(entered.curve, entered.point, () => null, {
        origin: { kind: 'branch point of cycles', parameter, specialPoint: id },
        hopf: null,
        fraction: this.record.fraction,
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
    const backwards: CyclePoint = { ...start, tangent: turned(start.tangent) };
    const closed = forth.end.reason === 'closed on itself';
    const back =
      how.bothWays && !closed
        ? yield* this.drive(followCycles(curve, backwards, settings), how.fraction)
        : null;
    const cyclesFound = [...(back?.cycles ?? []), ...forth.cycles];
    const crossed = forth.crossings.length > 0 || (back !== null && back.crossings.length > 0);
    if (how.origin.kind === 'trajectory' && !crossed && cyclesFound.every(({ point }) => isUpright(point))) {
      this.record.note(forth.end.message);
      return;
    }
    this.record.keep(curve, { origin: how.origin, hopf: how.hopf, back, forth }, how.generation);
    yield this.record.progress(this.record.fraction, FOLLOWING);
  }

  private *drive(
    work: Generator<number, CyclesFollowed>,
    fraction: number,
  ): Generator<Progress<CyclesResult>, CyclesFollowed> {
    for (;;) {
      const step = work.next();
      if (step.done) return step.value;
      if (step.value % POINTS_PER_SLICE === 0) yield this.record.progress(fraction, FOLLOWING);
    }
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
}

function format(value: number): string {
  return Number(value.toPrecision(6)).toString();
}
