import type { CycleBranch, CyclesResult } from '@/engine/cycles/contract';
import { cycles, type CyclesOptions } from '@/engine/cycles/cycles';
import type { CompiledSystem } from '@/engine/system/contract';

import { finish } from '../../support/equations';

/** Cycles of a textbook system along one parameter, by name. */
export function cyclesOf(
  system: CompiledSystem,
  parameter: string,
  [from, to]: readonly [number, number],
  options: Partial<CyclesOptions> = {},
): CyclesResult {
  return finish(
    cycles(system, system.defaults, {
      parameterIndex: system.parameterKeys.indexOf(parameter),
      from,
      to,
      beginFrom: 'Hopf points',
      starts: [new Float64Array(system.dimension).fill(0.1)],
      ...options,
    }),
  );
}

/** The only branch, or a failed test with what was said. */
export function onlyBranch(result: CyclesResult): CycleBranch {
  const [branch] = result.branches;
  if (result.branches.length !== 1 || branch === undefined)
    throw new Error(`${result.branches.length} branches. ${result.message}`);
  return branch;
}

/** Multiplier j of cycle k: the trivial one is the first. */
export function multiplier(branch: CycleBranch, k: number, j: number): { re: number; im: number } {
  const at = (k * branch.dimension + j) * 2;
  return { re: branch.multipliers[at] ?? NaN, im: branch.multipliers[at + 1] ?? NaN };
}
