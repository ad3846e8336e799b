import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { TextAreaField } from '@/components/fields/text-area-field';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { LIMITS } from '@/engine/schema/limits';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench } from '../state/store';
import { ConflictPanel } from './conflict-panel';
import { DocumentFields } from './document-fields';
import { useSave } from './use-save';
import { VisibilityFields, usePlacement } from './visibility-fields';

/** A new version of the preset with a note, or the preset's first version. */
export function SaveDialog() {
  const set = useBenchUi((state) => state.set);
  const origin = useWorkbench((state) => state.origin);
  const [note, setNote] = useState('');
  const [placement, setPlacement] = usePlacement();
  const close = () => set({ dialog: null });
  const save = useSave(close);
  const isNew = origin.kind !== 'preset';

  return (
    <Dialog
      open
      onOpenChange={close}
      width={save.conflict ? 'wide' : 'normal'}
      title={
        save.conflict
          ? 'Someone saved before you'
          : isNew
            ? 'Save as a preset'
            : `Save version ${origin.version + 1}`
      }
      description={
        save.conflict
          ? undefined
          : isNew
            ? 'Every save is a version of its own that is never changed afterwards.'
            : 'Every save is a version of its own; earlier ones stay and can be restored.'
      }
    >
      {save.conflict ? (
        <ConflictPanel head={save.conflict} note={note} save={save} onClose={close} />
      ) : (
        <form
          className="grid gap-3"
          onSubmit={(event) => {
            event.preventDefault();
            if (isNew) save.create(note, placement);
            else save.version(note);
          }}
        >
          {isNew ? <DocumentFields /> : null}
          <TextAreaField
            label="Note"
            rows={2}
            value={note}
            maxLength={LIMITS.noteLength}
            placeholder={isNew ? 'First version' : 'What changed, and why'}
            onChange={setNote}
          />
          {isNew ? <VisibilityFields value={placement} onChange={setPlacement} /> : null}
          {save.error ? <FieldMessage>{save.error}</FieldMessage> : null}
          <div className="flex justify-end gap-2">
            <Button onClick={close}>Cancel</Button>
            <Button type="submit" look="primary" disabled={save.busy}>
              {save.busy ? 'Saving…' : 'Save'}
            </Button>
          </div>
        </form>
      )}
    </Dialog>
  );
}
