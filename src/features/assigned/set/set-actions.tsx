import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';

import { Button, buttonClasses } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { AssignedBody } from '@/contract/assigned-sweeps';

import { closeAssigned, deleteAssigned, openAssigned, setAgain } from '../api/set-operations';
import type { RevisionKeeper } from '../keeping/revision-keeper';
import type { SetEdits } from './set-view';

type Step = 'open' | 'close' | 'again' | 'delete';

/** What is done with the sweep as a whole; what is not saved yet is saved first. */
export function SetActions({
  keeper,
  body,
}: {
  readonly keeper: RevisionKeeper<AssignedBody, SetEdits>;
  readonly body: AssignedBody;
}) {
  const queries = useQueryClient();
  const navigate = useNavigate();
  const [deleting, setDeleting] = useState(false);
  const { id, state, obstacles } = body;
  const step = useMutation({
    mutationFn: async (wanted: Step) => {
      if (wanted === 'delete') {
        await deleteAssigned(id);
        keeper.drop();
        await navigate(`/lab/sweeps?in=${body.lab.id}`, { replace: true });
      } else {
        if (!(await keeper.flush()))
          throw new Error('First settle what is not saved, said beside the title.');
        const { revision } = keeper.get().body;
        if (wanted === 'again') {
          const made = await setAgain(id, revision);
          await navigate(`/assigned/${made.id}/set`);
        } else keeper.adopt(await (wanted === 'open' ? openAssigned : closeAssigned)(id, revision));
      }
      await queries.invalidateQueries({ queryKey: ['assigned'], refetchType: 'none' });
    },
  });
  const busy = step.isPending;
  return (
    <div className="grid gap-2">
      <div className="flex flex-wrap gap-2">
        {state === 'open' ? (
          <Button disabled={busy} onClick={() => step.mutate('close')}>
            Close
          </Button>
        ) : (
          <Button look="primary" disabled={busy || obstacles.length > 0} onClick={() => step.mutate('open')}>
            {state === 'draft' ? 'Open' : 'Open again'}
          </Button>
        )}
        {state === 'draft' ? null : (
          <Link to={`/assigned/${id}/review`} className={buttonClasses()}>
            Review
          </Link>
        )}
        <Button disabled={busy} onClick={() => step.mutate('again')}>
          Set again for others
        </Button>
        {state === 'draft' ? (
          <Button look="caution" disabled={busy} onClick={() => setDeleting(true)}>
            Delete the draft
          </Button>
        ) : null}
      </div>
      {step.error ? (
        <p role="alert" className="text-caution">
          {step.error.message}
        </p>
      ) : null}
      <Dialog
        open={deleting}
        onOpenChange={setDeleting}
        title="Delete the draft"
        description={`“${body.title}” was never opened, so nobody has seen it or worked on it.`}
        width="narrow"
      >
        <div className="flex justify-end gap-2">
          <Button onClick={() => setDeleting(false)}>Cancel</Button>
          <Button
            look="caution"
            disabled={busy}
            onClick={() => {
              setDeleting(false);
              step.mutate('delete');
            }}
          >
            Delete
          </Button>
        </div>
      </Dialog>
    </div>
  );
}
