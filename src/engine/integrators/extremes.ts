import type { CompiledSystem } from '../system/contract';
import { rootInStep } from './root-in-step';
import type { Stepper } from './stepper';

/** An extreme need not be known better than this share of a step: there the solution is flat. */
const EXTREME_TOLERANCE = 1e-6;

/**
 * Tracks the lowest and highest value of every state and then of every population's total along the
 * steps of a stepper. Extremes within a step are found where the slope changes sign.
 */
export class ExtremesTracker {
  /** n states, then the totals of the populations in order. Owned by the tracker. */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  private readonly groups: readonly (readonly number[])[];
  private readonly startSlope: Float64Array;
  private readonly u: Float64Array;
  private readonly f: Float64Array;

  constructor(private readonly system: CompiledSystem) {
    const n = system.dimension;
    this.groups = [
      ...Array.from({ length: n }, (_, i) => [i]),
      ...system.populations.map((population) => population.states),
    ];
    this.lowest = new Float64Array(this.groups.length);
    this.highest = new Float64Array(this.groups.length);
    this.startSlope = new Float64Array(n);
    this.u = new Float64Array(n);
    this.f = new Float64Array(n);
  }

  /** Forgets everything and starts from the stepper's present state. */
  reset(stepper: Stepper): void {
    this.lowest.fill(Infinity);
    this.highest.fill(-Infinity);
    this.include(stepper.state);
    this.startSlope.set(stepper.slope);
  }

  /** To be called after each accepted step. */
  note(stepper: Stepper): void {
    const { groups, startSlope } = this;
    for (let q = 0; q < groups.length; q += 1) {
      const before = sumOf(groups[q], startSlope);
      const after = sumOf(groups[q], stepper.slope);
      if (before * after < 0) this.includeTurn(stepper, q, before, after);
    }
    this.include(stepper.state);
    startSlope.set(stepper.slope);
  }

  private includeTurn(stepper: Stepper, q: number, before: number, after: number): void {
    const { system, groups, u, f } = this;
    const t0 = stepper.previousTime;
    const h = stepper.time - t0;
    const slopeAt = (theta: number): number => {
      stepper.interpolate(t0 + theta * h, u);
      system.rhs(t0 + theta * h, u, f);
      return sumOf(groups[q], f);
    };
    const theta = rootInStep(slopeAt, before, after, EXTREME_TOLERANCE);
    stepper.interpolate(t0 + theta * h, u);
    this.includeOne(q, sumOf(groups[q], u));
  }

  private include(state: Float64Array): void {
    for (let q = 0; q < this.groups.length; q += 1) this.includeOne(q, sumOf(this.groups[q], state));
  }

  private includeOne(q: number, value: number): void {
    if (value < this.lowest[q]) this.lowest[q] = value;
    if (value > this.highest[q]) this.highest[q] = value;
  }
}

function sumOf(group: readonly number[], values: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < group.length; k += 1) sum += values[group[k]];
  return sum;
}
