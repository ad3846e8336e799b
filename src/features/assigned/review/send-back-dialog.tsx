import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { TextAreaField } from '@/components/fields/text-area-field';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ASSIGNED_LIMITS } from '@/contract/assigned-sweeps';
import { plural } from '@/lib/format';

import { REVIEW_KEYS, sendBack } from '../api/review-operations';

interface SendBackDialogProps {
  readonly assignedId: string;
  readonly people: readonly { readonly id: string; readonly name: string }[];
  readonly onClose: () => void;
  readonly onDone: (said: string) => void;
}

/** Sends the newest hand-ins of several people back with one note. */
export function SendBackDialog({ assignedId, people, onClose, onDone }: SendBackDialogProps) {
  const queries = useQueryClient();
  const [note, setNote] = useState('');
  const [wanting, setWanting] = useState(false);
  const send = useMutation({
    mutationFn: () => sendBack(assignedId, { people: people.map((one) => one.id), note }),
    onSuccess: (table) => {
      queries.setQueryData(REVIEW_KEYS.table(assignedId), table);
      void queries.invalidateQueries({ queryKey: ['assigned', 'hand-in'] });
      void queries.invalidateQueries({ queryKey: ['assigned', 'lab'], refetchType: 'none' });
      onDone(`Sent back to ${plural(people.length, 'person', 'people')}.`);
      onClose();
    },
  });
  const handleSend = () => {
    setWanting(!note.trim());
    if (note.trim()) send.mutate();
  };
  return (
    <Dialog
      open
      onOpenChange={onClose}
      title={`Send back to ${plural(people.length, 'person', 'people')}`}
      description={`They are told by mail, and can hand in again while the sweep is open: ${people.map((one) => one.name).join(', ')}.`}
    >
      <div className="grid gap-4">
        <TextAreaField
          label="What is asked of them"
          rows={4}
          maxLength={ASSIGNED_LIMITS.textLength}
          value={note}
          error={wanting && !note.trim() ? 'Say what is asked for.' : undefined}
          onChange={setNote}
        />
        {send.error ? (
          <p role="alert" className="text-caution">
            {send.error.message}
          </p>
        ) : null}
        <div className="flex justify-end gap-2">
          <Button onClick={onClose}>Cancel</Button>
          <Button look="primary" disabled={send.isPending} onClick={handleSend}>
            Send back
          </Button>
        </div>
      </div>
    </Dialog>
  );
}
