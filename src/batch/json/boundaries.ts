import type { BoundariesResult, BoundaryCurve } from '@/engine/boundaries/contract';

import { byName, flags, rows, seriesByName, type Json } from './shared';

/** @param everyPoint false leaves out the points of curves, and keeps their ends */
export function boundariesJson(result: BoundariesResult, everyPoint: boolean): Json {
  const symbols = result.stateSymbols;
  return {
    status: result.status,
    message: result.message,
    points: result.points,
    specialPoints: result.specialPoints.map((point) => ({ ...point, state: byName(symbols, point.state) })),
    curves: result.curves.map((curve) => curveJson(symbols, curve, everyPoint)),
  };
}

function curveJson(symbols: readonly string[], curve: BoundaryCurve, everyPoint: boolean): Json {
  const count = curve.first.length;
  const at = (k: number) => ({ first: curve.first[k], second: curve.second[k] });
  const ends = {
    kind: curve.kind,
    from: { ...curve.start, state: byName(symbols, curve.start.state) },
    start: { ...at(0), ...curve.startEnd },
    end: { ...at(count - 1), ...curve.endEnd },
    points: count,
  };
  if (!everyPoint) return ends;
  return {
    ...ends,
    first: Array.from(curve.first),
    second: Array.from(curve.second),
    states: seriesByName(symbols, curve.states, count),
    omega: Array.from(curve.omega),
    coefficient: Array.from(curve.coefficient),
    feasible: flags(curve.feasible),
    matters: flags(curve.matters),
    stableSide: rows(curve.stableSide, 2),
  };
}
