import { absenceOf } from '../equilibria/faces';
import type { CompiledSystem } from '../system/contract';
import { Curve } from './curve';
import type { AbsentGroup } from './test-functions';

/** A state below this share of its scale is taken as absent where its absence lasts. */
const ABSENT_SHARE = 1e-10;
/** States below minus this share of their scale are not feasible. */
const FEASIBLE_SHARE = 1e-9;

/** What all parts of one sweep share: the system, the range, and the scales that make units irrelevant. */
export class SweepScope {
  readonly lower: number;
  readonly upper: number;
  readonly parameterScale: number;
  private readonly states: readonly number[];
  private readonly invariance = new Map<string, boolean>();

  constructor(
    readonly system: CompiledSystem,
    readonly p: Float64Array,
    readonly parameterIndex: number,
    range: { readonly from: number; readonly to: number },
    readonly stateScale: Float64Array,
    /** What the parameter is called in sentences. */
    readonly label: string,
  ) {
    this.lower = Math.min(range.from, range.to);
    this.upper = Math.max(range.from, range.to);
    this.parameterScale = this.upper - this.lower || 1;
    this.states = system.stateSymbols.map((_, i) => i);
  }

  curveOn(active: readonly number[]): Curve {
    return new Curve(this.system, this.p, this.parameterIndex, active, this.stateScale, this.parameterScale);
  }

  /** States that are present: all but those at zero whose absence lasts. */
  activeOf(state: Float64Array): readonly number[] {
    const zero = this.states.filter(
      (i) => this.system.nonnegative[i] && Math.abs(state[i]) <= ABSENT_SHARE * this.stateScale[i],
    );
    const absent = this.absenceLasts(zero) ? zero : zero.filter((i) => this.absenceLasts([i]));
    return this.without(absent);
  }

  /** Whether these states stay at zero whatever the others are. */
  absenceLasts(states: readonly number[]): boolean {
    const key = states.join(' ');
    let lasts = this.invariance.get(key);
    if (lasts === undefined) {
      this.system.setParameters(this.p);
      lasts = states.length === 0 || absenceOf(this.system, states, this.stateScale) === 'lasts';
      this.invariance.set(key, lasts);
    }
    return lasts;
  }

  /** Present states together with absent ones that they feed, so that the rest stays absent. */
  withFed(present: readonly number[]): readonly number[] {
    let active = [...present];
    for (let rest = this.without(active); !this.absenceLasts(rest); rest = this.without(active)) {
      const fed = rest.filter((i) => !this.absenceLasts([i]));
      active = fed.length > 0 ? [...active, ...fed] : [...this.states];
    }
    return active.sort((a, b) => a - b);
  }

  /** Absent states by population. */
  groupsAbsent(active: readonly number[]): AbsentGroup[] {
    return this.system.populations
      .map(({ symbol, states }) => ({
        population: symbol,
        states: states.filter((i) => !active.includes(i)),
      }))
      .filter((group) => group.states.length > 0);
  }

  /** Whether all of a population is absent, not some of its classes. */
  isWhole(group: AbsentGroup): boolean {
    return this.system.populations.some(
      (one) => one.symbol === group.population && one.states.length === group.states.length,
    );
  }

  isFeasible(u: Float64Array): boolean {
    return this.system.nonnegative.every(
      (needed, i) => !needed || u[i] >= -FEASIBLE_SHARE * this.stateScale[i],
    );
  }

  without(states: readonly number[]): number[] {
    return this.states.filter((i) => !states.includes(i));
  }
}
