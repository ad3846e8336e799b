import { boxScale, makeBox } from '../equilibria/box';
import type { Equilibrium } from '../equilibria/contract';
import { FaceSearch } from '../equilibria/face-search';
import { faceProblem, type Face } from '../equilibria/face-system';
import { makeFace } from '../equilibria/faces';
import { newton } from '../equilibria/newton';
import type { CompiledSystem } from '../system/contract';

export const COEXISTENCE_DEFAULTS = {
  seed: 1,
  /** Newton runs of one search. */
  starts: 16,
  /** A population below this share of the typical size counts as absent. */
  absentShare: 1e-9,
  /** Newton steps from a neighbour. */
  maximumIterations: 40,
} as const;

/** Equilibria with every population present, sought or followed at the parameters set on a system. */
export class Coexistence {
  readonly scale: Float64Array;
  /** Lowest value of each state that counts as feasible; -Infinity for those of any sign. */
  private readonly floor: Float64Array;
  /** States of each population that can be absent. */
  private readonly groups: readonly (readonly number[])[];
  private readonly face: Face;
  private readonly box: ReturnType<typeof makeBox>;

  /** @param starts states to start from. @param box entered ranges; guessed from the starts where null */
  constructor(
    private readonly system: CompiledSystem,
    private readonly starts: readonly Float64Array[],
    box: readonly ({ readonly from: number; readonly to: number } | null)[] = [],
  ) {
    this.box = makeBox(system, starts, box);
    this.scale = boxScale(this.box);
    this.floor = this.scale.map((size, i) =>
      system.nonnegative[i] ? -COEXISTENCE_DEFAULTS.absentShare * size : -Infinity,
    );
    this.groups = system.populations
      .map(({ states }) => states)
      .filter((states) => states.every((i) => system.nonnegative[i]));
    this.face = makeFace(system, [], false, this.scale);
  }

  /** Whether every population is present and no state negative, in n values of `states` from an index on. */
  has(states: Float64Array, at: number): boolean {
    const { floor } = this;
    for (let i = 0; i < floor.length; i += 1) if (!(states[at + i] >= floor[i])) return false;
    return !this.lacks(states, at);
  }

  /** Whether a population is absent, so that the equilibrium lies on another branch, where it stays absent. */
  lacks(states: Float64Array, at: number): boolean {
    return this.groups.some((group) => group.every((i) => Math.abs(states[at + i]) <= -this.floor[i]));
  }

  /** States of all that a short search finds; no proof that there are no more. */
  search(): Float64Array[] {
    const found: Equilibrium[] = [];
    const { seed, starts } = COEXISTENCE_DEFAULTS;
    const work = new FaceSearch(this.system, this.face, [this.face], this.box, this.scale, found, {
      seed,
      starts,
      given: this.starts,
      describe: {},
    });
    while (work.advance());
    return found.map(({ state }) => state).filter((state) => this.has(state, 0));
  }

  /** Goes from a neighbour's equilibrium by damped Newton steps; null where they do not arrive. */
  follow(from: Float64Array): Float64Array | null {
    const outcome = newton(faceProblem(this.system, this.face, true), from, {
      scale: this.scale,
      maximumIterations: COEXISTENCE_DEFAULTS.maximumIterations,
    });
    return outcome.status === 'converged' ? outcome.state : null;
  }
}
