import type { SweepResult } from '@/engine/continuation/contract';
import { sweep, type SweepOptions } from '@/engine/continuation/sweep';
import { systemFromEquations, type EquationsInput } from '@/engine/system/from-equations';

type Range = { parameter: string; from: number; to: number } & Partial<
  Omit<SweepOptions, 'parameterIndex' | 'from' | 'to'>
>;

/** Sweeps a textbook system to the end. */
export function runSweep(input: EquationsInput, { parameter, from, to, ...options }: Range): SweepResult {
  const compiled = systemFromEquations(input);
  if (!compiled.ok) throw new Error(compiled.message);
  const { system, starts } = compiled;
  const run = sweep(system, system.defaults, {
    bands: false,
    starts: [starts],
    ...options,
    parameterIndex: system.parameterKeys.indexOf(parameter),
    from,
    to,
  });
  let step = run.next();
  while (!step.done) step = run.next();
  return step.value;
}

export function pointsOf(result: SweepResult, kind: string) {
  return result.specialPoints.filter((point) => point.kind === kind);
}
