import type { SweepResult } from '../continuation/contract';
import { SPREAD_KEY } from '../schema/symbols';
import type { CompiledModel } from '../system/compile-model';
import { coexistenceOf } from '../verdict/compare-equilibria';
import type { Verdict } from '../verdict/contract';
import { pairByContinuation, type EquilibriumPair } from '../verdict/pair-by-continuation';
import { judge, type VerdictInput } from '../verdict/verdict';
import type { EquilibriaPair } from './contract';

/**
 * Pairs each coexistence equilibrium of the split model with the pooled one that it comes from, by
 * following it along the spread dial. Null where there is nothing to pair. Sets p on the system.
 */
export function pairEquilibria(
  model: CompiledModel,
  p: Float64Array,
  found: EquilibriaPair,
): readonly EquilibriumPair[] | null {
  const spreadIndex = model.parameterIndex(SPREAD_KEY);
  if (!found.twin || spreadIndex < 0 || p[spreadIndex] === 0) return null;
  return pairByContinuation({
    system: model.system,
    p,
    spreadIndex,
    split: coexistenceOf(found.split.equilibria),
    pooled: coexistenceOf(found.twin.equilibria),
    twinStates: model.twin.states,
  });
}

/** Sweeps of one parameter, as far as they have come. */
export interface JudgedSweeps {
  readonly parameter: string;
  readonly split: SweepResult;
  readonly twin: SweepResult | null;
}

/**
 * The verdict at parameters p, from the equilibria known there and the sweeps made so far.
 *
 * @param pairs from `pairEquilibria` at the same parameters
 * @param underOtherMeans from `answersUnderOtherMeans`, where that was worked out
 */
export function judgeModel(
  model: CompiledModel,
  p: Float64Array,
  found: EquilibriaPair | null,
  pairs: readonly EquilibriumPair[] | null,
  sweeps: JudgedSweeps | null = null,
  underOtherMeans: VerdictInput['underOtherMeans'] = [],
): Verdict {
  const { document, report } = model;
  const spreadIndex = model.parameterIndex(SPREAD_KEY);
  const swept = report.parameters.find((one) => one.key === sweeps?.parameter);
  const input: VerdictInput = {
    twin: report.twin,
    spread: spreadIndex < 0 ? document.spread : p[spreadIndex],
    autonomous: model.system.autonomous,
    harvested: report.harvested,
    timeUnit: document.timeUnit,
    split: found?.split ?? null,
    pooled: found?.twin ?? null,
    underOtherMeans,
    ...(pairs ? { pairs } : {}),
    ...(sweeps ? { splitSweep: sweeps.split, pooledSweep: sweeps.twin } : {}),
    ...(swept ? { parameterLabel: swept.label, parameterUnit: swept.unit } : {}),
  };
  return judge(input);
}
