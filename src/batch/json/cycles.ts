import type { CycleBranch, CycleSpecialPoint, CyclesResult } from '@/engine/cycles/contract';

import { attractsInWords, byName, flags, rows, seriesByName, type Json, type JsonRecord } from './shared';

/** What of a branch of cycles is printed besides its special points and ends. */
export interface CyclesDetail {
  /** Every point: period, lowest, highest and mean, multipliers. */
  readonly branches: boolean;
  /** The cycles themselves, sample by sample. */
  readonly orbits: boolean;
}

export function cyclesJson(result: CyclesResult, detail: CyclesDetail): Json {
  return {
    status: result.status,
    message: result.message,
    forcingPeriod: result.forcingPeriod,
    points: result.points,
    specialPoints: result.specialPoints.map((point) =>
      pointJson(point, result.branches[point.branch]?.quantities ?? []),
    ),
    branches: result.branches.map((branch) => branchJson(result.stateSymbols, branch, detail)),
  };
}

function pointJson(point: CycleSpecialPoint, quantities: readonly string[]): Json {
  return {
    ...point,
    lowest: byName(quantities, point.lowest),
    highest: byName(quantities, point.highest),
  };
}

function branchJson(symbols: readonly string[], branch: CycleBranch, detail: CyclesDetail): Json {
  const count = branch.parameters.length;
  const ends = {
    origin: branch.origin,
    start: { ...cycleJson(branch, 0), ...branch.startEnd },
    end: { ...cycleJson(branch, count - 1), ...branch.endEnd },
    points: count,
  };
  if (!detail.branches) return ends;
  const n = branch.dimension;
  const everyPoint = {
    ...ends,
    parameters: Array.from(branch.parameters),
    periods: Array.from(branch.periods),
    lowest: seriesByName(branch.quantities, branch.lowest, count),
    highest: seriesByName(branch.quantities, branch.highest, count),
    mean: seriesByName(branch.quantities, branch.mean, count),
    multipliers: rows(branch.multipliers, 2 * n).map((row) => rows(row, 2).map(([re, im]) => ({ re, im }))),
    trivialError: Array.from(branch.trivialError),
    attracts: attractsInWords(branch.attracts),
    feasible: flags(branch.feasible),
  };
  if (!detail.orbits) return everyPoint;
  const samples = branch.orbitSamples;
  return {
    ...everyPoint,
    orbits: Array.from({ length: count }, (_, k) => ({
      phases: Array.from(branch.orbitPhases.subarray(k * samples, (k + 1) * samples)),
      states: seriesByName(symbols, branch.orbits.subarray(k * samples * n, (k + 1) * samples * n), samples),
    })),
  };
}

/** One cycle of a branch in short. */
function cycleJson(branch: CycleBranch, k: number): JsonRecord {
  const m = branch.quantities.length;
  const at = (values: Float64Array): Json => byName(branch.quantities, values.subarray(k * m, (k + 1) * m));
  return {
    parameter: branch.parameters[k],
    period: branch.periods[k],
    lowest: at(branch.lowest),
    highest: at(branch.highest),
  };
}
