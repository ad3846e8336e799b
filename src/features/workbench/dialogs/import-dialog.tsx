import { useRef, useState } from 'react';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { LIMITS } from '@/engine/schema/limits';
import { readPreset } from '@/engine/schema/migrate';
import type { PresetDocument } from '@/engine/schema/preset';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench } from '../state/store';

type Reading = { readonly document: PresetDocument } | { readonly problems: readonly string[] };

/** A file as a document, or what is wrong with it in words. */
export async function readPresetFile(file: Blob): Promise<Reading> {
  if (file.size > LIMITS.documentBytes)
    return {
      problems: [
        `The file is larger than ${LIMITS.documentBytes / 1024} kB, the most a preset document may have.`,
      ],
    };
  let json: unknown;
  try {
    json = JSON.parse(await file.text());
  } catch {
    return { problems: ['The file is not JSON. Choose a document that was exported as .moiety.json.'] };
  }
  const read = readPreset(json);
  return read.ok ? { document: read.document } : { problems: read.problems.map((one) => one.message) };
}

/** Puts a document from a file on the bench; undo brings back what was there. */
export function ImportDialog() {
  const set = useBenchUi((state) => state.set);
  const edit = useWorkbench((state) => state.edit);
  const input = useRef<HTMLInputElement>(null);
  const [problems, setProblems] = useState<readonly string[]>([]);
  const close = () => set({ dialog: null });

  const handleFile = async (file: File) => {
    const reading = await readPresetFile(file);
    if ('problems' in reading) return setProblems(reading.problems);
    edit(`Import ${file.name}`.slice(0, 120), () => reading.document);
    set({ dialog: null, notice: 'Imported. Undo brings back the model before.' });
  };

  return (
    <Dialog
      open
      onOpenChange={close}
      title="Import a preset document"
      description="A file that was exported as .moiety.json takes the place of the model on the bench. Undo brings the present one back."
      width="narrow"
    >
      <input
        ref={input}
        type="file"
        accept=".json,application/json"
        aria-label="Preset document"
        className="w-full text-sm file:mr-3 file:rounded-md file:border file:border-hairline file:bg-raised file:px-3 file:py-1.5 file:text-ink"
        onChange={(event) => {
          const file = event.target.files?.[0];
          event.target.value = '';
          if (file) void handleFile(file);
        }}
      />
      {problems.length > 0 ? (
        <div role="alert" className="mt-3 text-caution">
          <p>Nothing was changed. What stands in the way:</p>
          <ul className="list-disc space-y-1 pl-5 text-sm">
            {problems.slice(0, 20).map((problem) => (
              <li key={problem}>{problem}</li>
            ))}
          </ul>
        </div>
      ) : null}
      <div className="mt-4 flex justify-end">
        <Button onClick={close}>Cancel</Button>
      </div>
    </Dialog>
  );
}
