import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { Button } from '@/components/ui/button';
import { formatDayAndTime } from '@/lib/format';

import { useWorkbench } from '../state/store';
import { fetchVersion } from './api/fetch-version';
import { DifferenceTable } from './difference-table';
import { errorWords } from './error-words';
import type { Head, Save } from './use-save';

interface ConflictPanelProps {
  readonly head: Head;
  readonly note: string;
  readonly save: Save;
  readonly onClose: () => void;
}

/** Two people saved from the same version: nothing is lost, and both can be kept. */
export function ConflictPanel({ head, note, save, onClose }: ConflictPanelProps) {
  const origin = useWorkbench((state) => state.origin);
  const document = useWorkbench((state) => state.document);
  const [comparing, setComparing] = useState(false);
  const id = origin.kind === 'preset' ? origin.id : '';
  const theirs = useQuery({
    queryKey: ['version', id, head.number],
    queryFn: () => fetchVersion(id, head.number),
    enabled: comparing && id !== '',
  });
  if (origin.kind !== 'preset') return null;
  return (
    <div className="grid gap-4">
      <p>
        {head.author} saved version {head.number} on {formatDayAndTime(head.savedAt)}
        {head.note ? <> with the note “{head.note}”</> : null}, while you worked on version {origin.version}.
        Yours is kept on the bench and nothing has been overwritten.
      </p>
      {comparing ? (
        theirs.isPending ? (
          <p role="status">Reading version {head.number}…</p>
        ) : theirs.isError ? (
          <FieldMessage>{errorWords(theirs.error)}</FieldMessage>
        ) : (
          <DifferenceTable
            before={theirs.data.document}
            after={document}
            beforeName={`Version ${head.number}, by ${head.author}`}
            afterName="Yours, on the bench"
          />
        )
      ) : null}
      {save.error ? <FieldMessage>{save.error}</FieldMessage> : null}
      <div className="flex flex-wrap justify-end gap-2">
        <Button onClick={onClose}>Back to the bench</Button>
        {comparing ? null : <Button onClick={() => setComparing(true)}>See the differences</Button>}
        <Button disabled={save.busy} onClick={() => save.version(note, head.number)}>
          Save mine as version {head.number + 1}
        </Button>
        <Button
          look="primary"
          disabled={save.busy}
          onClick={() =>
            save.create(
              note,
              { visibility: 'private', labId: null },
              `${document.title}, my copy`.slice(0, 160),
            )
          }
        >
          Keep both: save mine as a copy
        </Button>
      </div>
    </div>
  );
}
