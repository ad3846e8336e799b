import type { EquilibriaResult } from '../equilibria/contract';
import { findEquilibria } from '../equilibria/search';
import type { CompiledSystem } from '../system/contract';
import type { SweepOptions } from './sweep-options';
import { NOT_DIFFERENTIABLE, NOT_ISOLATED } from './sweep-message';

export const SEED_DEFAULTS = {
  /** Values along the range at which equilibria are sought, so that separate branches are found too. */
  searches: 4,
  /** Newton runs of a search, and of a quick one, which is enough where known branches go on. */
  startsPerSearch: 400,
  startsPerQuickSearch: 100,
} as const;

/** An equilibrium to follow a branch from. */
export interface Seed {
  readonly state: Float64Array;
  readonly parameter: number;
}

/** Where equilibria are sought. */
export interface SeedValues {
  /** The current value, or an end of the range where that lies outside. */
  readonly first: number;
  /** The ends of the range; together with the first they tell how large the states become. */
  readonly ends: readonly number[];
  readonly between: readonly number[];
}

export function seedValues(current: number, { from, to }: SweepOptions): SeedValues {
  const last = SEED_DEFAULTS.searches - 1;
  const between = Array.from({ length: last - 1 }, (_, k) => from + ((to - from) * (k + 1)) / last);
  const inside = current > Math.min(from, to) && current < Math.max(from, to);
  return inside ? { first: current, ends: [from, to], between } : { first: from, ends: [to], between };
}

/** Searches for equilibria at one value after another; what is found serves as starts of the next. */
export class SeedSearch {
  readonly found: Seed[] = [];
  /** Sentences on states that cannot be followed. */
  readonly notes = new Set<string>();

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly options: SweepOptions,
  ) {}

  /** Equilibria at one value of the parameter. A generator that yields between slices of the search. */
  *at(value: number, extent: 'full' | 'quick'): Generator<void, readonly Seed[]> {
    const { options, system } = this;
    const parameters = Float64Array.from(this.p);
    parameters[options.parameterIndex] = value;
    const search = findEquilibria(system, parameters, {
      starts: [...options.starts, ...this.found.map((one) => one.state)],
      maximumStarts: extent === 'full' ? SEED_DEFAULTS.startsPerSearch : SEED_DEFAULTS.startsPerQuickSearch,
      ...(options.box ? { box: options.box } : {}),
    });
    let step = search.next();
    while (!step.done) {
      yield;
      step = search.next();
    }
    const seeds: Seed[] = [];
    takeOver(step.value, value, seeds, this.notes);
    this.found.push(...seeds);
    return seeds;
  }
}

function takeOver(result: EquilibriaResult, parameter: number, found: Seed[], notes: Set<string>): void {
  for (const one of result.equilibria) {
    if (!one.feasible) continue;
    if (one.type === 'not isolated') notes.add(NOT_ISOLATED);
    else if (one.type !== 'not differentiable') found.push({ state: one.state, parameter });
    else if (one.absent.length > 0) notes.add(NOT_DIFFERENTIABLE);
  }
}

/** A state never larger than this share of the largest has no scale of its own. */
const NEGLIGIBLE = 1e-6;

/** Scale of each state: the largest value seen, or that of the largest state where it has none itself. */
export function scaleOfStates(dimension: number, states: readonly Float64Array[]): Float64Array {
  const largest = new Float64Array(dimension);
  for (const state of states)
    for (let i = 0; i < dimension; i += 1) largest[i] = Math.max(largest[i], Math.abs(state[i]));
  const overall = Math.max(...largest) || 1;
  return largest.map((value) => (value > NEGLIGIBLE * overall ? value : overall));
}
