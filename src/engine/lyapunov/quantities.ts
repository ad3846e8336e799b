import type { CompiledSystem } from '../system/contract';

/** A class, or the total of a population, by the states that make it. */
export interface Quantity {
  readonly symbol: string;
  readonly states: readonly number[];
}

/** Every class, then the total of every population of more than one class. */
export function quantitiesOf(system: CompiledSystem): Quantity[] {
  const classes = system.stateSymbols.map((symbol, i) => ({ symbol, states: [i] }));
  const totals = system.populations.filter(({ states }) => states.length > 1);
  return [...classes, ...totals.map(({ symbol, states }) => ({ symbol, states }))];
}

/** The quantity of a symbol, a population's total first; the first population's where none is given, null where there is no such. */
export function quantityNamed(system: CompiledSystem, symbol?: string): Quantity | null {
  if (symbol === undefined) return system.populations[0] ?? quantitiesOf(system)[0];
  const known = [...system.populations, ...quantitiesOf(system)];
  return known.find((one) => one.symbol === symbol) ?? null;
}

export function sumOf(states: readonly number[], values: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < states.length; k += 1) sum += values[states[k]];
  return sum;
}
