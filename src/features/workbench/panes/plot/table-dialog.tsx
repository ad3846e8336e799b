import { Dialog } from '@/components/ui/dialog';
import { formatNumber } from '@/graphics/numbers';
import type { PlotTable } from '@/graphics/plot-table';

import type { ExportSource } from './export-source';

/** Rows shown of one table; the whole of it is in the CSV. */
const ROWS = 200;

function OneTable({ table }: { readonly table: PlotTable }) {
  const every = Math.max(1, Math.ceil(table.rows.length / ROWS));
  const rows = table.rows.filter((_row, k) => k % every === 0 || k === table.rows.length - 1);
  return (
    <section className="grid gap-1">
      <h3 className="text-base">{table.name}</h3>
      {every > 1 ? (
        <p className="text-sm text-muted">
          Every {every === 2 ? 'second' : `${every}th`} of {table.rows.length} rows; the CSV export holds them
          all.
        </p>
      ) : null}
      <div
        className="max-h-80 overflow-auto rounded-md border"
        tabIndex={0}
        role="region"
        aria-label={`Table: ${table.name}`}
      >
        <table className="w-full border-collapse">
          <thead className="sticky top-0 bg-panel text-left">
            <tr>
              {table.columns.map((column) => (
                <th key={column} scope="col" className="px-2 py-1 font-medium">
                  {column}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row, k) => (
              <tr key={k} className="border-t">
                {row.map((cell, at) => (
                  <td key={at} className={typeof cell === 'number' ? 'figures px-2 py-0.5' : 'px-2 py-0.5'}>
                    {typeof cell === 'number' ? formatNumber(cell, 6) : cell}
                  </td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
    </section>
  );
}

interface TableDialogProps {
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
  readonly getSource: () => ExportSource | null;
}

/** The numbers of a plot, as they were when the table was opened. */
export function TableDialog({ open, onOpenChange, getSource }: TableDialogProps) {
  const source = open ? getSource() : null;
  const tables = source?.tables() ?? [];
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title={source ? `${source.title}: the numbers` : 'The numbers'}
      width="wide"
    >
      <div className="grid gap-5">
        {tables.length === 0 ? <p className="text-muted">This plot holds no numbers yet.</p> : null}
        {tables.map((table, k) => (
          <OneTable key={`${table.name}${k}`} table={table} />
        ))}
        {source?.notes.map((note) => (
          <p key={note} className="text-sm text-muted">
            {note}
          </p>
        ))}
      </div>
    </Dialog>
  );
}
