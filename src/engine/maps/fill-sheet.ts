import type { Progress } from '../continuation/contract';
import type { AttractorClass, MapResult } from './contract';
import { levelRows, type MapSheet } from './map-sheet';

/** Copies of a map that the progress of a whole run holds, besides one as each level is complete. */
const PARTIALS = 60;

/** Computes every cell by itself, coarse ones first, with the map so far as progress. */
export function* fillSheet(
  sheet: MapSheet,
  solve: (ix: number, iy: number) => Generator<void, number>,
  stage: string,
  kinds: () => readonly AttractorClass[],
): Generator<Progress<MapResult>, void> {
  const partial = (): MapResult => sheet.result('cancelled', 'Stopped before the end.', kinds());
  let nextPartial = 0;
  let stride = 0;
  for (const row of levelRows(sheet.nx, sheet.ny)) {
    if (row.stride !== stride) nextPartial = Math.min(nextPartial, sheet.computed);
    stride = row.stride;
    for (const ix of row.columns) {
      const cell = solve(ix, row.iy);
      let step = cell.next();
      while (!step.done) {
        yield { fraction: sheet.fraction, stage, partial: null };
        step = cell.next();
      }
      sheet.set(ix, row.iy, row.stride, step.value);
      const due = sheet.computed > nextPartial;
      if (due) nextPartial = sheet.computed + sheet.cells / PARTIALS;
      yield { fraction: sheet.fraction, stage, partial: due ? partial() : null };
    }
  }
}
