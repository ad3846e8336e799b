import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { PictureRow } from '@/engine/analyses/contract';
import { CAUTION } from '@/engine/system/contract';
import { formatShort } from '@/graphics/numbers';
import { tablesToCsv } from '@/graphics/plot-table';
import { parameterName } from '@/graphics/quantities';

import { useBenchUi } from '../layout/bench-ui';
import { useShownModel } from '../panes/use-shown-model';
import { useWorkbench } from '../state/store';
import { pictureTable } from './picture-table';
import { fileNameOf, saveFile } from './save-file';

const where = ({ parameter, extent }: PictureRow) =>
  extent
    ? `${formatShort(extent[0], 4)} to ${formatShort(extent[1], 4)}`
    : parameter === null
      ? ''
      : formatShort(parameter, 5);

function SummaryTable({
  rows,
  parameter,
}: {
  readonly rows: readonly PictureRow[];
  readonly parameter: string;
}) {
  const twins = rows.some((row) => row.of === 'twin');
  return (
    <div
      className="max-h-[60dvh] overflow-auto rounded-md border"
      tabIndex={0}
      role="region"
      aria-label="Everything that was found"
    >
      <table className="w-full border-collapse text-sm">
        <thead className="sticky top-0 bg-panel text-left">
          <tr>
            {twins ? (
              <th scope="col" className="px-2 py-1 font-medium">
                model
              </th>
            ) : null}
            <th scope="col" className="px-2 py-1 font-medium">
              what
            </th>
            <th scope="col" className="px-2 py-1 font-medium">
              {parameter}
            </th>
            <th scope="col" className="px-2 py-1 font-medium">
              note
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row, k) => (
            <tr key={k} className="border-t align-baseline">
              {twins ? (
                <td className={row.of === 'twin' ? 'px-2 py-1 text-muted' : 'px-2 py-1'}>
                  {row.of === 'twin' ? 'pooled' : 'split'}
                </td>
              ) : null}
              <th scope="row" className="px-2 py-1 text-left font-normal">
                {row.what}
              </th>
              <td className="figures px-2 py-1 whitespace-nowrap">{where(row)}</td>
              <td className="px-2 py-1 text-muted">{row.note}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

/** All equilibria, branches, special points and cycles of the last picture, to be read or taken away. */
export function PictureDialog() {
  const set = useBenchUi((state) => state.set);
  const model = useShownModel();
  const picture = useWorkbench((state) => state.picture);
  const running = useWorkbench((state) => state.job !== null);
  const harvested = useWorkbench((state) => state.shownReport?.harvested ?? false);
  const close = () => set({ dialog: null });
  const key = picture?.sweep.split.parameterKey ?? '';
  const keep = () => {
    if (!picture) return;
    const notes = [picture.message, ...(harvested ? [CAUTION] : [])];
    const csv = tablesToCsv(`${model.title}: full picture`, [pictureTable(picture.summary, key)], notes);
    saveFile(`${fileNameOf(model.title)}-full-picture.csv`, csv, 'text/csv');
    set({ dialog: null, notice: 'Exported.' });
  };
  return (
    <Dialog
      open
      onOpenChange={close}
      title={`Full picture over ${parameterName(model, key).name}`}
      {...(picture ? { description: running ? 'Under way: more will come.' : picture.message } : {})}
      width="wide"
    >
      {picture ? (
        <div className="grid gap-3">
          <SummaryTable rows={picture.summary} parameter={key} />
          <div className="flex justify-end">
            <Button look="primary" onClick={keep}>
              Save as CSV
            </Button>
          </div>
        </div>
      ) : (
        <p className="text-muted">No picture has been drawn yet. Run the sweep from the strip below.</p>
      )}
    </Dialog>
  );
}
