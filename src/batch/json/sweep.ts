import type { Branch, SpecialPoint, SweepResult } from '@/engine/continuation/contract';
import type { SplitSweepResult } from '@/engine/explore/contract';
import { specialPointShifts } from '@/engine/verdict/special-point-shifts';

import { attractsInWords, byName, flags, seriesByName, type Json } from './shared';

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
      lowest: seriesByName(band.quantities, band.lowest, band.parameters.length),
      highest: seriesByName(band.quantities, band.highest, band.parameters.length),
      settled: flags(band.settled),
    })),
  };
}

function pointJson(symbols: readonly string[], point: SpecialPoint): Json {
  return { ...point, state: byName(symbols, point.state) };
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
  return {
    ...ends,
    parameters: Array.from(branch.parameters),
    states: seriesByName(symbols, branch.states, count),
    leading: Array.from(branch.leading),
    attracts: attractsInWords(branch.attracts),
    feasible: flags(branch.feasible),
    types: Array.from(branch.typeIndex, (k) => branch.types[k]),
  };
}

/** How far each special point of the pooled twin moved when the population was split. */
export function shiftsJson({ split, twin }: Pick<SplitSweepResult, 'split' | 'twin'>): Json {
  if (twin === null) return [];
  return specialPointShifts(split, twin).map((shift) => ({
    kind: shift.kind,
    pooled: shift.pooled?.parameter ?? null,
    split: shift.split?.parameter ?? null,
    moved: shift.moved,
  }));
}
