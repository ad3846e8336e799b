import type { PictureRow } from '@/engine/analyses/contract';
import type { PlotTable } from '@/graphics/plot-table';

/** The summary of a full picture as a table, split first and then pooled. */
export function pictureTable(rows: readonly PictureRow[], parameter: string): PlotTable {
  return {
    name: 'Full picture',
    columns: ['model', 'what', parameter, `${parameter} from`, `${parameter} to`, 'note'],
    rows: rows.map(({ of, what, parameter: at, extent, note }) => [
      of === 'split' ? 'split' : 'pooled',
      what,
      at ?? '',
      extent?.[0] ?? '',
      extent?.[1] ?? '',
      note,
    ]),
  };
}
