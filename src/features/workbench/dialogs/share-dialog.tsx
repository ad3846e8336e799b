import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';

import { useBenchUi } from '../layout/bench-ui';
import { isDirty } from './saving-rules';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { changeVisibility } from './api/change-visibility';
import { fetchPreset } from './api/fetch-preset';
import { errorWords } from './error-words';
import { originOf } from './origin-of';
import { ShareLinks } from './share-links';
import { VisibilityFields, type Placement } from './visibility-fields';

function Visibility({ id, may }: { readonly id: string; readonly may: boolean }) {
  const store = useWorkbenchStore();
  const queries = useQueryClient();
  const key = ['share', id];
  const preset = useQuery({ queryKey: key, queryFn: () => fetchPreset(id) });
  const change = useMutation({
    mutationFn: (body: Placement & { readonly from: Placement }) => changeVisibility(id, body),
    // What was refused was decided on something else than is so now.
    onError: () => queries.invalidateQueries({ queryKey: key }),
    onSuccess: (body) => {
      queries.setQueryData(key, body);
      const { origin } = store.getState();
      // What may be done can change with the place; the version worked on stays.
      if (origin.kind === 'preset')
        store.getState().set({ origin: { ...originOf(body), version: origin.version } as typeof origin });
      void queries.invalidateQueries({ queryKey: ['presets'] });
    },
  });
  if (preset.isPending) return <p role="status">Reading who may see it…</p>;
  if (preset.isError) return <FieldMessage>{errorWords(preset.error)}</FieldMessage>;
  const { visibility, lab } = preset.data.preset;
  const from: Placement = { visibility: visibility === 'lab' ? 'lab' : 'private', labId: lab?.id ?? null };
  return (
    <div className="grid gap-2">
      <VisibilityFields
        value={from}
        disabled={!may || change.isPending}
        onChange={(placement) => change.mutate({ ...placement, from })}
      />
      {may ? null : <p className="text-sm text-muted">Only its owner can change who may see it.</p>}
      {change.isError ? <FieldMessage>{errorWords(change.error)}</FieldMessage> : null}
    </div>
  );
}

/** Who may see the preset, and links that open it without an account. */
export function ShareDialog() {
  const set = useBenchUi((state) => state.set);
  const origin = useWorkbench((state) => state.origin);
  const dirty = useWorkbench(isDirty);
  const [close] = useState(() => () => set({ dialog: null }));
  if (origin.kind !== 'preset') return null;
  return (
    <Dialog open onOpenChange={close} title="Share" width="normal">
      <div className="grid gap-5">
        {dirty ? (
          <p className="rounded-md border border-hairline bg-panel px-3 py-2 text-sm">
            Others see the last saved version, not the unsaved changes on the bench.
          </p>
        ) : null}
        <Visibility id={origin.id} may={origin.rights.includes('change visibility')} />
        <ShareLinks id={origin.id} may={origin.rights.includes('share by link')} />
        <div className="flex justify-end">
          <Button onClick={close}>Done</Button>
        </div>
      </div>
    </Dialog>
  );
}
