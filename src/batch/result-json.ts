import type { Branch, SpecialPoint, SweepResult } from '@/engine/continuation/contract';
import type { EquilibriaResult } from '@/engine/equilibria/contract';
import type { Trajectory } from '@/engine/integrators/contract';
import type { CompiledSystem } from '@/engine/system/contract';
import type { SpecialPointShift } from '@/engine/verdict/special-point-shifts';

/** What JSON can hold; numbers are written in full precision, those that are not finite as null. */
export type Json =
  string | number | boolean | null | readonly Json[] | { readonly [key: string]: Json | undefined } | object;

/** States by symbol, one number each. */
function stateJson(symbols: readonly string[], state: ArrayLike<number>): Record<string, number> {
  return Object.fromEntries(symbols.map((symbol, i) => [symbol, state[i]]));
}

/** Series by symbol from interleaved states. */
function seriesJson(
  symbols: readonly string[],
  states: ArrayLike<number>,
  count: number,
  skip: number,
): Record<string, number[]> {
  const n = symbols.length;
  return Object.fromEntries(
    symbols.map((symbol, i) => [
      symbol,
      Array.from({ length: Math.max(0, count - skip) }, (_, k) => states[(k + skip) * n + i]),
    ]),
  );
}

/** @param skipFirst leaves out the start time where it was not asked for */
export function trajectoryJson(system: CompiledSystem, trajectory: Trajectory, skipFirst: boolean): Json {
  const skip = skipFirst ? 1 : 0;
  return {
    status: trajectory.status,
    message: trajectory.message,
    times: Array.from(trajectory.times).slice(skip),
    states: seriesJson(system.stateSymbols, trajectory.states, trajectory.times.length, skip),
    steps: trajectory.steps,
    evaluations: trajectory.evaluations,
  };
}

export function equilibriaJson(system: CompiledSystem, result: EquilibriaResult): Json {
  return {
    status: result.status,
    message: result.message,
    box: Object.fromEntries(
      system.stateSymbols.map((symbol, i) => [symbol, [result.box[i].from, result.box[i].to]]),
    ),
    startsTried: result.startsTried,
    equilibria: result.equilibria.map((one) => ({
      ...one,
      state: stateJson(system.stateSymbols, one.state),
    })),
  };
}

/** @param everyPoint false leaves out the points of branches, and keeps their ends */
export function sweepJson(sweep: SweepResult, everyPoint: boolean): Json {
  return {
    status: sweep.status,
    message: sweep.message,
    points: sweep.points,
    specialPoints: sweep.specialPoints.map((point) => pointJson(sweep.stateSymbols, point)),
    branches: sweep.branches.map((branch) => branchJson(sweep.stateSymbols, branch, everyPoint)),
    bands: sweep.bands.map((band) => ({
      parameters: Array.from(band.parameters),
      lowest: seriesJson(band.quantities, band.lowest, band.parameters.length, 0),
      highest: seriesJson(band.quantities, band.highest, band.parameters.length, 0),
      settled: Array.from(band.settled, (flag) => flag === 1),
    })),
  };
}

function pointJson(symbols: readonly string[], point: SpecialPoint): Json {
  return { ...point, state: stateJson(symbols, point.state) };
}

function branchJson(symbols: readonly string[], branch: Branch, everyPoint: boolean): Json {
  const count = branch.parameters.length;
  const ends = {
    absent: branch.absent,
    start: { parameter: branch.parameters[0], ...branch.startEnd },
    end: { parameter: branch.parameters[count - 1], ...branch.endEnd },
    points: count,
  };
  if (!everyPoint) return ends;
  const words = ['no', 'yes', 'undecided'];
  return {
    ...ends,
    parameters: Array.from(branch.parameters),
    states: seriesJson(symbols, branch.states, count, 0),
    leading: Array.from(branch.leading),
    attracts: Array.from(branch.attracts, (code) => words[code]),
    feasible: Array.from(branch.feasible, (flag) => flag === 1),
    types: Array.from(branch.typeIndex, (k) => branch.types[k]),
  };
}

export function shiftJson(shift: SpecialPointShift): Json {
  return {
    kind: shift.kind,
    pooled: shift.pooled?.parameter ?? null,
    split: shift.split?.parameter ?? null,
    moved: shift.moved,
  };
}
