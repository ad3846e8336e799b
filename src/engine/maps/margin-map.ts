import type { Progress } from '../continuation/contract';
import type { CompiledSystem } from '../system/contract';
import type { MapResult } from './contract';
import { levelRows, MapSheet } from './map-sheet';
import { MARGIN_WORK_DEFAULTS, MarginWork, type MarginWorkRequest } from './margin-work';

export interface MarginMapRequest extends MarginWorkRequest {
  /** Milliseconds; the engine has no clock of its own. */
  readonly clock?: () => number;
}

/** Copies of the map that the progress of a whole run holds. */
const PARTIALS = 20;

export const MAP_NEEDS_REST =
  'The formulas contain the time t, so that nothing rests and no stability margin exists. Map the largest Lyapunov exponent instead.';

/**
 * Stability margin, minus the largest real part of the eigenvalues of the Jacobian, at the coexistence
 * equilibrium over a grid of two parameters; where several coexist, at the one with the largest margin,
 * so that it is above zero wherever some coexistence equilibrium attracts. NaN where none was found. Coarse
 * cells come first, each begun from its neighbours; where those do not arrive at the first cells, a search is made.
 *
 * @param p parameters in the order of the system, set on it and written to
 */
export function* marginMap(
  system: CompiledSystem,
  p: Float64Array,
  request: MarginMapRequest,
): Generator<Progress<MapResult>, MapResult> {
  const sheet = new MapSheet('margin', request.x, request.y, request.clock);
  if (!system.autonomous) return sheet.result('failed', MAP_NEEDS_REST);
  const work = new MarginWork(system, p, request, sheet);
  let sinceYield = 0;
  let nextPartial = 0;
  let stride = 0;
  for (const row of levelRows(sheet.nx, sheet.ny)) {
    const size = work.isFirst(row) ? 1 : MARGIN_WORK_DEFAULTS.cellsPerSlice;
    for (let from = 0; from < row.columns.length; from += size) {
      const columns = row.columns.slice(from, from + size);
      work.solve({ ...row, columns });
      sinceYield += work.isFirst(row) ? MARGIN_WORK_DEFAULTS.cellsPerSlice : columns.length;
      const levelBegins = row.stride !== stride && row.stride !== work.firstStride;
      stride = row.stride;
      if (sinceYield < MARGIN_WORK_DEFAULTS.cellsPerSlice && !levelBegins) continue;
      sinceYield = 0;
      const due = sheet.computed >= nextPartial || levelBegins;
      if (due) nextPartial = sheet.computed + sheet.cells / PARTIALS;
      const partial = due ? sheet.result('cancelled', 'Stopped before the end.') : null;
      yield { fraction: sheet.fraction, stage: 'Mapping the stability margin', partial };
    }
  }
  return sheet.result('complete', work.message());
}
