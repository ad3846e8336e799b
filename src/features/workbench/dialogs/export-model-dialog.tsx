import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { PresetDocument } from '@/engine/schema/preset';
import type { StudyInput } from '@/engine/schema/study';
import { CAUTION } from '@/engine/system/contract';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench, type SweepSelection } from '../state/store';
import { fileNameOf, saveFile } from './save-file';

/** The model with the three tasks of the bench, ready for batch. */
export function studyOf(document: PresetDocument, sweep: SweepSelection | null): StudyInput {
  return {
    preset: document,
    tasks: [
      { task: 'trajectory', id: 'trajectory', horizon: document.horizon },
      { task: 'equilibria', id: 'equilibria' },
      ...(sweep ? [{ task: 'sweep' as const, id: 'sweep', ...sweep }] : []),
    ],
  };
}

/** The document of a harvested model carries the caution in its notes, so that it travels along. */
function withCaution(document: PresetDocument, harvested: boolean): PresetDocument {
  if (!harvested || document.notes.includes(CAUTION)) return document;
  return { ...document, notes: document.notes ? `${document.notes}\n\n${CAUTION}` : CAUTION };
}

/** Takes the model away as a file: to be imported again, or to be run by batch. */
export function ExportModelDialog() {
  const set = useBenchUi((state) => state.set);
  const document = useWorkbench((state) => state.document);
  const sweep = useWorkbench((state) => state.sweepSelection);
  const harvested = useWorkbench((state) => state.report?.harvested ?? false);
  const close = () => set({ dialog: null });
  const keep = (ending: string, content: unknown) => {
    saveFile(`${fileNameOf(document.title)}${ending}`, `${JSON.stringify(content, null, 2)}\n`);
    set({ dialog: null, notice: 'Exported.' });
  };
  const exported = withCaution(document, harvested);
  return (
    <Dialog
      open
      onOpenChange={close}
      title="Export the model"
      description="Plots are exported from their own menus, as SVG, PNG or CSV."
    >
      <ul className="grid gap-4">
        <li className="flex items-center justify-between gap-4">
          <span>
            <span className="block font-medium">Preset document</span>
            <span className="text-sm text-muted">
              The whole model, to be imported again or kept beside a paper.
            </span>
          </span>
          <Button look="primary" onClick={() => keep('.moiety.json', exported)}>
            Save document
          </Button>
        </li>
        <li className="flex items-center justify-between gap-4">
          <span>
            <span className="block font-medium">Study for batch</span>
            <span className="text-sm text-muted">
              The model with its trajectory, its equilibria{sweep ? ' and the sweep on the strip' : ''}, to be
              rerun from the command line.
            </span>
          </span>
          <Button onClick={() => keep('.study.json', studyOf(exported, sweep))}>Save study</Button>
        </li>
      </ul>
      {harvested ? (
        <p className="mt-4 border-l-2 border-caution pl-3 text-sm text-caution">{CAUTION}</p>
      ) : null}
    </Dialog>
  );
}
