import { rootInStep } from '../integrators/root-in-step';
import { sumOf, type Quantity } from './quantities';
import type { ScaledWalk, StepObserver } from './scaled-walk';

/** A turning point need not be known better than this share of a step: there the solution is flat. */
const TURN_TOLERANCE = 1e-6;

/**
 * Lowest and highest values of quantities along a walk, and every local maximum of one of them. Turning
 * points within a step are found where the slope of the quantity changes sign.
 */
export class TurningPoints implements StepObserver {
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  /** Local maxima of the observed quantity, in order of time. */
  readonly maxima: number[] = [];
  private readonly slopes: Float64Array;
  private readonly u: Float64Array;
  private readonly f: Float64Array;

  /** @param observed index of the quantity whose maxima are listed; -1 for none */
  constructor(
    walk: ScaledWalk,
    private readonly quantities: readonly Quantity[],
    private readonly observed = -1,
  ) {
    const n = walk.system.dimension;
    this.lowest = new Float64Array(quantities.length);
    this.highest = new Float64Array(quantities.length);
    this.slopes = new Float64Array(quantities.length);
    this.u = new Float64Array(n);
    this.f = new Float64Array(n);
    this.reset(walk);
  }

  /** Forgets everything and begins at the walk's present state. */
  reset(walk: ScaledWalk): void {
    this.lowest.fill(Infinity);
    this.highest.fill(-Infinity);
    this.maxima.length = 0;
    this.include(walk.state);
    walk.system.rhs(walk.time, walk.state, this.f);
    this.quantities.forEach(({ states }, q) => {
      this.slopes[q] = sumOf(states, this.f);
    });
  }

  note(walk: ScaledWalk): void {
    const { quantities, slopes, f } = this;
    this.include(walk.state);
    walk.system.rhs(walk.time, walk.state, f);
    for (let q = 0; q < quantities.length; q += 1) {
      const before = slopes[q];
      const after = sumOf(quantities[q].states, f);
      slopes[q] = after;
      if (before * after < 0) this.includeTurn(walk, q, before, after);
      // `f` was used for the search; the next quantity needs the end of the step again.
      if (before * after < 0) walk.system.rhs(walk.time, walk.state, f);
    }
  }

  private includeTurn(walk: ScaledWalk, q: number, before: number, after: number): void {
    const { u, f } = this;
    const { states } = this.quantities[q];
    const t0 = walk.stepper.previousTime;
    const h = walk.stepper.time - t0;
    const slopeAt = (theta: number): number => {
      walk.at(t0 + theta * h, u);
      walk.system.rhs(t0 + theta * h, u, f);
      return sumOf(states, f);
    };
    walk.at(t0 + rootInStep(slopeAt, before, after, TURN_TOLERANCE) * h, u);
    const value = sumOf(states, u);
    this.includeOne(q, value);
    if (q === this.observed && before > 0) this.maxima.push(value);
  }

  private include(state: Float64Array): void {
    for (let q = 0; q < this.quantities.length; q += 1)
      this.includeOne(q, sumOf(this.quantities[q].states, state));
  }

  private includeOne(q: number, value: number): void {
    if (value < this.lowest[q]) this.lowest[q] = value;
    if (value > this.highest[q]) this.highest[q] = value;
  }
}
