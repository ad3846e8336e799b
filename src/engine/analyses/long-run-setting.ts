import { quantityNamed, type Quantity } from '../lyapunov/quantities';
import type { CompiledModel } from '../system/compile-model';
import type { Side } from './split-and-twin';

/**
 * Lengths of long runs in multiples of the document's horizon, which its author chose so that the course of the
 * model is seen; and the smallest density where the document does not say how many individuals a unit holds.
 */
export const LONG_RUN_SETTING = {
  transient: 5,
  observed: 5,
  /** Averaging of Lyapunov exponents. */
  averaged: 40,
  /** The longest run of a section in which crossings are waited for. */
  section: 200,
  /** Smallest density as a share of the largest start value. */
  smallestShare: 1e-9,
} as const;

/** Times of a long run: the task's own, else from the horizon. */
export function longRunTimes(
  model: CompiledModel,
  task: { readonly transient?: number | undefined; readonly observed?: number | undefined },
): { readonly transient: number; readonly observed: number } {
  const { horizon } = model.document;
  return {
    transient: task.transient ?? LONG_RUN_SETTING.transient * horizon,
    observed: task.observed ?? LONG_RUN_SETTING.observed * horizon,
  };
}

/** Density of one individual; without a known number of individuals, a tiny share of the largest start value. */
export function smallestDensity(model: CompiledModel, side: Side): number {
  const { individualsPerUnit } = model.document;
  if (individualsPerUnit !== null) return 1 / individualsPerUnit;
  const largest = Math.max(0, ...side.starts.map(Math.abs));
  return LONG_RUN_SETTING.smallestShare * (largest > 0 ? largest : 1);
}

/** Density below which each population counts as extinct. */
export function extinctBelow(model: CompiledModel, side: Side, given?: number): Float64Array {
  return new Float64Array(side.system.populations.length).fill(given ?? smallestDensity(model, side));
}

/**
 * The quantity of a symbol on one side: a class, or a population's total; the first population where none is named. On
 * a twin without the class, the total of the population that it belongs to.
 */
export function quantityOn(model: CompiledModel, side: Side, symbol?: string): Quantity {
  const { system } = side;
  const own = quantityNamed(system, symbol);
  if (own) return own;
  const i = model.system.stateSymbols.indexOf(symbol ?? '');
  const population = model.system.populations.find(({ states }) => states.includes(i));
  const total = quantityNamed(system, population?.symbol);
  if (!total) throw new Error(`There is no class or population called ${symbol ?? ''}.`);
  return total;
}
