import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';

import { FieldMessage } from '@/components/fields/field-message';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { FORMER_MEMBER, type DeletionBody } from '@/contract/account-deletion';
import { ApiError } from '@/lib/api-client';
import { plural } from '@/lib/format';
import { useRefreshSession } from '@/lib/session';

import { deleteAccount, fetchDeletion } from '../api/account-operations';

function consequences(body: DeletionBody): string[] {
  const alone = body.labs.filter((lab) => lab.alone).map(({ name }) => name);
  const others = body.labs.filter((lab) => !lab.alone).map(({ name }) => name);
  return [
    `${plural(body.privatePresets, 'preset')} that only you see ${body.privatePresets === 1 ? 'is' : 'are'} deleted, for good after 30 days; nobody can bring them back by signing in.`,
    `${plural(body.labPresets, 'preset')} of yours that labs see, ${plural(body.comments, 'comment')} and ${plural(body.handIns, 'hand-in')} stay with the labs.`,
    `${plural(body.links, 'share link')} stop${body.links === 1 ? 's' : ''} working.`,
    ...(others.length > 0 ? [`You leave ${others.join(', ')}; supervisors are told.`] : []),
    ...(alone.length > 0
      ? [`In ${alone.join(', ')} you are the only member: nobody reaches what is in there any more.`]
      : []),
    'Every session ends, and nobody signs in by your address until a new account is made with it.',
    'What the history of a lab says of you stays, with your name as it was.',
  ];
}

function DeletionDialog({ onClose }: { readonly onClose: () => void }) {
  const deletion = useQuery({ queryKey: ['account-deletion'], queryFn: fetchDeletion, staleTime: 0 });
  const navigate = useNavigate();
  const refresh = useRefreshSession();
  const [password, setPassword] = useState('');
  const [anonymous, setAnonymous] = useState(false);
  const [busy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);

  const handleDelete = async () => {
    setBusy(true);
    setProblem(null);
    try {
      await deleteAccount({ password, anonymous });
      await navigate('/sign-in', { replace: true });
      await refresh();
    } catch (error) {
      setBusy(false);
      if (!(error instanceof ApiError)) throw error;
      setProblem(error.fields.password ?? error.message);
    }
  };

  return (
    <Dialog open onOpenChange={onClose} title="Delete your account?">
      {deletion.isPending ? <LoadingState label="Looking at what it would bring…" /> : null}
      {deletion.isError ? <ErrorState error={deletion.error} /> : null}
      {deletion.data ? (
        <form
          className="grid gap-4"
          onSubmit={(event) => {
            event.preventDefault();
            void handleDelete();
          }}
        >
          <ul className="grid list-disc gap-1 pl-5">
            {consequences(deletion.data).map((line) => (
              <li key={line}>{line}</li>
            ))}
          </ul>
          {deletion.data.obstacles.length > 0 ? (
            <div role="alert" className="rounded-lg border border-caution p-3 text-caution">
              {deletion.data.obstacles.map((line) => (
                <p key={line}>{line}</p>
              ))}
            </div>
          ) : (
            <>
              <label className="flex items-start gap-2">
                <input
                  type="checkbox"
                  className="mt-1"
                  checked={anonymous}
                  onChange={(event) => setAnonymous(event.target.checked)}
                />
                <span>
                  Call me “{FORMER_MEMBER}” where my name stands now.
                  <span className="block text-sm text-muted">
                    What was handed in never changes, so the name on it stays.
                  </span>
                </span>
              </label>
              <label className="grid gap-1 text-sm font-medium">
                Your password
                <input
                  type="password"
                  autoComplete="current-password"
                  className="min-h-9 rounded border bg-raised px-2 font-normal"
                  value={password}
                  onChange={(event) => setPassword(event.target.value)}
                />
              </label>
              {problem ? <FieldMessage>{problem}</FieldMessage> : null}
            </>
          )}
          <div className="flex justify-end gap-2">
            <Button onClick={onClose}>Keep the account</Button>
            {deletion.data.obstacles.length > 0 ? null : (
              <Button type="submit" look="caution" disabled={busy || password === ''}>
                {busy ? 'Deleting…' : 'Delete the account'}
              </Button>
            )}
          </div>
        </form>
      ) : null}
    </Dialog>
  );
}

/** The way out, with what it brings said before it. */
export function AccountDeletion() {
  const [open, setOpen] = useState(false);
  return (
    <section aria-labelledby="deletion" className="grid justify-items-start gap-3">
      <h2 id="deletion" className="text-xl">
        Delete the account
      </h2>
      <p className="text-muted">You see first what goes and what stays.</p>
      <Button look="caution" onClick={() => setOpen(true)}>
        Delete the account…
      </Button>
      {open ? <DeletionDialog onClose={() => setOpen(false)} /> : null}
    </section>
  );
}
