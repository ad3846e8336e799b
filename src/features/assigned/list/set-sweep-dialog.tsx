import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';

import { SelectField } from '@/components/fields/select-field';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';

import { changeAssigned, createAssigned, SET_KEYS } from '../api/set-operations';
import { ownTimeZone } from '../set/zoned-time';
import { useSettingLabs } from './use-setting-labs';

interface SetSweepDialogProps {
  readonly preset: { readonly id: string; readonly title: string; readonly version: number };
  readonly onClose: () => void;
}

/** Makes the draft of an assigned sweep from a preset, in one of one's labs. */
export function SetSweepDialog({ preset, onClose }: SetSweepDialogProps) {
  const labs = useSettingLabs();
  const [chosen, setChosen] = useState<string | null>(null);
  const labId = chosen ?? labs[0]?.labId ?? '';
  const navigate = useNavigate();
  const queries = useQueryClient();
  const make = useMutation({
    mutationFn: async () => {
      const made = await createAssigned(labId, { presetId: preset.id, version: preset.version });
      const timeZone = ownTimeZone();
      if (made.timeZone === timeZone) return made;
      return changeAssigned(made.id, { baseRevision: made.revision, timeZone });
    },
    onSuccess: async (made) => {
      queries.setQueryData(SET_KEYS.assigned(made.id), made);
      void queries.invalidateQueries({ queryKey: ['assigned', 'lab'] });
      onClose();
      await navigate(`/assigned/${made.id}/set`);
    },
  });
  return (
    <Dialog
      open
      onOpenChange={onClose}
      title="Set as an assigned sweep"
      description={`A draft is made from version ${preset.version} of “${preset.title}”. Nobody sees it before you open it.`}
      width="narrow"
    >
      <div className="grid gap-4">
        {labs.length > 1 ? (
          <SelectField
            label="For people of"
            value={labId}
            choices={labs.map((one) => ({ value: one.labId, label: one.labName }))}
            onChange={setChosen}
          />
        ) : (
          <p>
            For people of <span className="font-medium">{labs[0]?.labName}</span>.
          </p>
        )}
        {make.error ? (
          <p role="alert" className="text-caution">
            {make.error.message}
          </p>
        ) : null}
        <div className="flex justify-end gap-2">
          <Button onClick={onClose}>Cancel</Button>
          <Button look="primary" disabled={make.isPending || labId === ''} onClick={() => make.mutate()}>
            Make the draft
          </Button>
        </div>
      </div>
    </Dialog>
  );
}
