import { rootInStep } from '../integrators/root-in-step';
import type { ScaledWalk, StepObserver } from '../lyapunov/scaled-walk';

/** Where returns are taken: one state rising through a level (in the walk's scale), or every period of the forcing. */
export type ReturnRule =
  | { readonly kind: 'section'; readonly state: number; readonly level: number }
  | { readonly kind: 'strobe'; readonly period: number };

export const RETURN_DEFAULTS = {
  longestPattern: 16,
  /** Distances between returns, as shares of the range, that count as near and as rounding. */
  near: 1e-3,
  rounding: 1e-6,
  /** Distances that show an approach rather than errors of integration. */
  approach: 1e-4,
  /** Distance that a pattern may still have to go, judged from how fast it closes. */
  left: 1e-3,
  /** Near returns in a row asked for, besides a whole pattern. */
  fewest: 4,
  looksPerStep: 2,
} as const;

export interface Closure {
  /** Returns in one period. */
  readonly lag: number;
  readonly period: number;
}

/** The returns of a walk to a section, and whether they have settled to a pattern. */
export class Returns implements StepObserver {
  readonly times: number[] = [];
  private readonly states: Float64Array[] = [];
  private readonly v: Float64Array;
  private last = Number.NaN;

  /** @param range range of each state in the walk's scale; 0 leaves a state out of account */
  constructor(
    walk: ScaledWalk,
    private readonly rule: ReturnRule,
    private readonly range: Float64Array,
  ) {
    this.v = new Float64Array(walk.system.dimension);
  }

  note(walk: ScaledWalk): void {
    const { stepper } = walk;
    const t0 = stepper.previousTime;
    const t1 = stepper.time;
    const { rule } = this;
    if (rule.kind === 'strobe') {
      for (let k = Math.floor(t0 / rule.period) + 1; k * rule.period <= t1; k += 1)
        this.keep(walk, k * rule.period);
      return;
    }
    const above = (t: number): number => {
      stepper.interpolate(t, this.v);
      return this.v[rule.state] - rule.level;
    };
    if (Number.isNaN(this.last)) this.last = above(t0);
    const h = (t1 - t0) / RETURN_DEFAULTS.looksPerStep;
    for (let look = 0; look < RETURN_DEFAULTS.looksPerStep; look += 1) {
      const before = this.last;
      const from = t0 + look * h;
      const value = above(look + 1 === RETURN_DEFAULTS.looksPerStep ? t1 : from + h);
      if (before < 0 && value >= 0)
        this.keep(walk, from + rootInStep((share) => above(from + share * h), before, value) * h);
      this.last = value;
    }
  }

  /**
   * The shortest pattern in which the latest returns repeat, null while there is none. Returns must be near
   * those one pattern before for several in a row, and on their way to less than a thousandth of the range, as
   * judged from the rate at which they close: a slow spiral is no cycle, nor is a chance return of chaos.
   */
  closure(): Closure | null {
    const count = this.states.length;
    for (let lag = 1; lag <= RETURN_DEFAULTS.longestPattern; lag += 1) {
      const row = Math.max(RETURN_DEFAULTS.fewest, lag + 1);
      if (count < row + lag) return null;
      const distances = Array.from({ length: row }, (_, back) => this.distance(count - 1 - back, lag));
      if (Math.max(...distances) > RETURN_DEFAULTS.near) continue;
      const rate = (distances[0] / distances[row - 1]) ** (lag / (row - 1));
      const closing = rate < 1 && distances[0] / (1 - rate) < RETURN_DEFAULTS.left;
      if (!closing && Math.max(...distances) > RETURN_DEFAULTS.rounding) continue;
      return { lag, period: this.times[count - 1] - this.times[count - 1 - lag] };
    }
    return null;
  }

  get setting(): { readonly rule: ReturnRule; readonly range: Float64Array } {
    return { rule: this.rule, range: this.range };
  }

  /** Whether returns repeated so closely from the first one on that no approach was seen. */
  repeatedThroughout(lag: number): boolean {
    for (let k = lag; k < this.states.length; k += 1)
      if (this.distance(k, lag) > RETURN_DEFAULTS.approach) return false;
    return true;
  }

  /** Distance of the latest return from the nearest of the ones before, as a share of the range; Infinity without any. */
  nearest(): number {
    const last = this.states.length - 1;
    let least = Infinity;
    for (let lag = 1; lag <= Math.min(last, RETURN_DEFAULTS.longestPattern); lag += 1)
      least = Math.min(least, this.distance(last, lag));
    return least;
  }

  /** Distance of the latest return from the nearest of the last `lag` returns of another; null without any. */
  gapTo(other: Returns, lag: number): number | null {
    const own = this.states.at(-1);
    if (!own) return null;
    return Math.min(...other.states.slice(-lag).map((state) => this.apart(own, state)));
  }

  private keep(walk: ScaledWalk, t: number): void {
    const state = new Float64Array(this.v.length);
    walk.stepper.interpolate(t, state);
    this.times.push(t);
    this.states.push(state);
  }

  private distance(k: number, lag: number): number {
    return this.apart(this.states[k], this.states[k - lag]);
  }

  /** Largest difference of two states, in the walk's scale, as a share of the range. */
  apart(a: Float64Array, b: Float64Array): number {
    let largest = 0;
    this.range.forEach((range, i) => {
      if (range > 0) largest = Math.max(largest, Math.abs(a[i] - b[i]) / range);
    });
    return largest;
  }
}
