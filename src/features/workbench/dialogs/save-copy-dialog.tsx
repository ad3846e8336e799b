import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench } from '../state/store';
import { useSave } from './use-save';
import { usePlacement, VisibilityFields } from './visibility-fields';

/** The document on the bench as a preset of one's own, unsaved changes included. */
export function SaveCopyDialog() {
  const set = useBenchUi((state) => state.set);
  const document = useWorkbench((state) => state.document);
  const isNew = useWorkbench((state) => state.origin.kind === 'new');
  const [title, setTitle] = useState(isNew ? document.title : `${document.title}, copy`.slice(0, 160));
  const [placement, setPlacement] = usePlacement();
  const close = () => set({ dialog: null });
  const save = useSave(close);
  const empty = title.trim() === '';
  return (
    <Dialog
      open
      onOpenChange={close}
      title="Save as a copy"
      description="A preset of your own, with the model as it is on the bench now. The original stays as it is."
    >
      <form
        className="grid gap-3"
        onSubmit={(event) => {
          event.preventDefault();
          if (!empty)
            save.create(
              isNew ? '' : `Copied from “${document.title}”`.slice(0, 500),
              placement,
              title.trim(),
            );
        }}
      >
        <TextField
          visibleLabel
          live
          label="Title"
          value={title}
          maxLength={160}
          error={empty ? 'A title is needed.' : undefined}
          onCommit={setTitle}
        />
        <VisibilityFields value={placement} onChange={setPlacement} />
        {save.error ? <FieldMessage>{save.error}</FieldMessage> : null}
        <div className="flex justify-end gap-2">
          <Button onClick={close}>Cancel</Button>
          <Button type="submit" look="primary" disabled={save.busy || empty}>
            {save.busy ? 'Saving…' : 'Save copy'}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
