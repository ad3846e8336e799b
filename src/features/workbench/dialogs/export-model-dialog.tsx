import { useState } from 'react';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { PresetDocument } from '@/engine/schema/preset';
import { CAUTION } from '@/engine/system/contract';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench } from '../state/store';
import { fileNameOf, saveFile } from './save-file';
import { studyOf, studyTasks } from './study-tasks';

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
  const twoParameters = useWorkbench((state) => state.twoParameters);
  const longRun = useWorkbench((state) => state.longRun);
  const offered = studyTasks(document, sweep, { twoParameters, longRun });
  const [left, setLeft] = useState<readonly string[]>([]);
  const chosen = offered.filter((one) => !left.includes(one.task.task));
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
        <li className="flex items-start justify-between gap-4">
          <span>
            <span className="block font-medium">Study for batch</span>
            <span className="text-sm text-muted">
              The model with what the command line is to compute of it. Numbers and starts are those on the
              bench.
            </span>
            <fieldset className="mt-2 grid gap-1">
              <legend className="sr-only">What to compute</legend>
              {offered.map(({ label, task }) => (
                <label key={task.task} className="flex items-baseline gap-2 text-sm">
                  <input
                    type="checkbox"
                    className="accent-(--accent)"
                    checked={!left.includes(task.task)}
                    onChange={(event) =>
                      setLeft(
                        event.target.checked ? left.filter((one) => one !== task.task) : [...left, task.task],
                      )
                    }
                  />
                  {label}
                </label>
              ))}
            </fieldset>
          </span>
          <Button
            disabled={chosen.length === 0}
            onClick={() =>
              keep(
                '.study.json',
                studyOf(
                  exported,
                  chosen.map((one) => one.task),
                ),
              )
            }
          >
            Save study
          </Button>
        </li>
      </ul>
      {harvested ? (
        <p className="mt-4 border-l-2 border-caution pl-3 text-sm text-caution">{CAUTION}</p>
      ) : null}
    </Dialog>
  );
}
