import type { EquilibriaResult } from '../equilibria/contract';
import { findEquilibria } from '../equilibria/search';
import type { CompiledSystem } from '../system/contract';
import type { SweepOptions } from './sweep-options';
import { NOT_DIFFERENTIABLE, NOT_ISOLATED } from './sweep-message';

export const SEED_DEFAULTS = {
  /** Values along the range at which equilibria are sought, so that separate branches are found too. */
  searches: 4,
  /** Newton runs of each such search. */
  startsPerSearch: 400,
} as const;

/** An equilibrium to follow a branch from. */
export interface Seed {
  readonly state: Float64Array;
  readonly parameter: number;
}

export interface Seeds {
  readonly found: readonly Seed[];
  /** Sentences on states that cannot be followed. */
  readonly notes: readonly string[];
}

/** Equilibria at values along the range, both ends and the current value among them. Yields the share done. */
export function* findSeeds(
  system: CompiledSystem,
  p: Float64Array,
  options: SweepOptions,
): Generator<number, Seeds> {
  const values = seedValues(p[options.parameterIndex], options);
  const found: Seed[] = [];
  const notes = new Set<string>();
  for (const [k, value] of values.entries()) {
    const parameters = Float64Array.from(p);
    parameters[options.parameterIndex] = value;
    const search = findEquilibria(system, parameters, {
      starts: [...options.starts, ...found.map((one) => one.state)],
      maximumStarts: SEED_DEFAULTS.startsPerSearch,
      ...(options.box ? { box: options.box } : {}),
    });
    let step = search.next();
    while (!step.done) {
      yield k / values.length;
      step = search.next();
    }
    takeOver(step.value, value, found, notes);
  }
  return { found, notes: [...notes] };
}

function seedValues(current: number, { from, to }: SweepOptions): number[] {
  const last = SEED_DEFAULTS.searches - 1;
  const values = Array.from({ length: SEED_DEFAULTS.searches }, (_, k) => from + ((to - from) * k) / last);
  const inside = current > Math.min(from, to) && current < Math.max(from, to);
  return inside ? [current, ...values] : values;
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
