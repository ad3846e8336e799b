import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { ErrorState, LoadingState } from '@/components/states/page-state';
import { Button } from '@/components/ui/button';
import type { InvitationList as InvitationListBody } from '@/contract/labs';
import { formatDay } from '@/lib/format';

import { fetchInvitations, LAB_KEYS, resendInvitation, withdrawInvitation } from '../api/lab-operations';
import { InviteDialog } from './invite-dialog';

type Invitation = InvitationListBody['invitations'][number];

const MAIL_WORDS: Readonly<Record<Invitation['mail'], string>> = {
  waiting: 'the mail is on its way',
  sent: 'mailed',
  'given up': 'the mail could not be delivered: check the address',
  withheld: 'not mailed: this address takes no invitations by mail',
  'too late': 'not mailed in time: send it again',
  unknown: 'mailed some time ago',
};
const IN_TROUBLE: readonly Invitation['mail'][] = ['given up', 'withheld', 'too late'];

function stateWords({ state, expiresAt }: Invitation): string {
  if (state === 'declined') return 'declined';
  return `${state === 'open' ? 'open until' : 'ran out on'} ${formatDay(expiresAt)}`;
}

/** Whom the lab has asked and who has not joined. */
export function InvitationList({ labId }: { readonly labId: string }) {
  const queries = useQueryClient();
  const [inviting, setInviting] = useState(false);
  const [done, setDone] = useState('');
  const key = LAB_KEYS.invitations(labId);
  const list = useQuery({
    queryKey: key,
    queryFn: () => fetchInvitations(labId),
    // Mail on its way settles soon; until then it is looked at again.
    refetchInterval: ({ state }) =>
      state.data?.invitations.some(({ mail }) => mail === 'waiting') ? 3_000 : false,
  });
  const resend = useMutation({
    mutationFn: ({ id }: Invitation) => resendInvitation(labId, id),
    onSuccess: (fresh, { email }) => {
      queries.setQueryData(key, fresh);
      setDone(`Sent to ${email} again.`);
    },
  });
  const withdraw = useMutation({
    mutationFn: ({ id }: Invitation) => withdrawInvitation(labId, id),
    onSuccess: async (_nothing, { email }) => {
      await queries.invalidateQueries({ queryKey: key });
      setDone(`The invitation of ${email} was withdrawn.`);
    },
  });
  const problem = resend.error ?? withdraw.error;
  const busy = resend.isPending || withdraw.isPending;
  const invitations = list.data?.invitations ?? [];

  return (
    <section aria-labelledby="invitations" className="grid content-start gap-2">
      <div className="flex flex-wrap items-center justify-between gap-2">
        <h2 id="invitations" className="text-xl">
          Invitations
        </h2>
        <Button look="primary" onClick={() => setInviting(true)}>
          Invite people
        </Button>
      </div>
      <p role="status" className="text-sm text-accent">
        {done}
      </p>
      {problem ? (
        <p role="alert" className="text-caution">
          {problem.message}
        </p>
      ) : null}
      {list.isPending ? <LoadingState label="Reading the invitations…" /> : null}
      {list.isError ? <ErrorState error={list.error} /> : null}
      {list.data && invitations.length === 0 ? (
        <p className="rounded-lg border border-dashed p-4 text-muted">
          Nobody is waiting to join. Invite people by their e-mail addresses.
        </p>
      ) : null}
      {invitations.length > 0 ? (
        <ul className="divide-y rounded-lg border bg-raised">
          {invitations.map((invitation) => (
            <li
              key={invitation.id}
              className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1.5 px-4 py-2.5"
            >
              <div className="min-w-0">
                <p className="break-all">{invitation.email}</p>
                <p className="text-sm text-muted">
                  {invitation.role}, {stateWords(invitation)}
                  <span className={IN_TROUBLE.includes(invitation.mail) ? 'text-caution' : ''}>
                    , {MAIL_WORDS[invitation.mail]}
                  </span>
                </p>
              </div>
              {invitation.state === 'declined' ? null : (
                <div className="flex gap-1.5">
                  <Button
                    size="small"
                    disabled={busy}
                    aria-label={`Send to ${invitation.email} again`}
                    onClick={() => resend.mutate(invitation)}
                  >
                    Send again
                  </Button>
                  <Button
                    size="small"
                    disabled={busy}
                    aria-label={`Withdraw the invitation of ${invitation.email}`}
                    onClick={() => withdraw.mutate(invitation)}
                  >
                    Withdraw
                  </Button>
                </div>
              )}
            </li>
          ))}
        </ul>
      ) : null}
      {inviting ? (
        <InviteDialog
          labId={labId}
          onClose={() => setInviting(false)}
          onInvited={(words) => {
            setInviting(false);
            setDone(words);
          }}
        />
      ) : null}
    </section>
  );
}
