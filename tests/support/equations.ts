import type { EquilibriaResult, Equilibrium } from '@/engine/equilibria/contract';
import { findEquilibria, type SearchOptions } from '@/engine/equilibria/search';
import type { CompiledSystem } from '@/engine/system/contract';
import { systemFromEquations } from '@/engine/system/from-equations';

/** A compiled textbook system, or a failed test with the reason. */
export function textbook(
  equations: readonly string[],
  parameters: Readonly<Record<string, number>> = {},
  nonnegative = true,
): CompiledSystem {
  const result = systemFromEquations({ equations, parameters, nonnegative });
  if (!result.ok) throw new Error(result.message);
  return result.system;
}

/** Runs a generator to its end. */
export function finish<T>(work: Generator<unknown, T>): T {
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
  }
}

export function equilibriaOf(system: CompiledSystem, options: SearchOptions = {}): EquilibriaResult {
  return finish(findEquilibria(system, system.defaults, options));
}

/** The equilibrium nearest to a state. */
export function nearest(result: EquilibriaResult, state: readonly number[]): Equilibrium {
  const distance = (e: Equilibrium): number =>
    Math.max(...state.map((x, i) => Math.abs((e.state[i] ?? Number.NaN) - x)));
  const [first] = [...result.equilibria].sort((a, b) => distance(a) - distance(b));
  if (first === undefined) throw new Error(`no equilibrium found: ${result.message}`);
  return first;
}
