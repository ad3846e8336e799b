import { useMutation, useQuery } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';

import { ErrorState, LoadingState, PageState } from '@/components/states/page-state';
import { buttonClasses, Button } from '@/components/ui/button';
import { formatDay } from '@/lib/format';
import { useSession } from '@/lib/session';

import { declineInvitation, fetchInvitation } from './api/invitation-operations';
import { AcceptAsMe, AcceptAsVisitor, ConfirmAddress } from './components/answer-invitation';
import { NarrowPage } from './components/narrow-page';

/** Where the link of an invitation leads, with an account or without. */
export default function JoinPage() {
  const token = useSearchParams()[0].get('token') ?? '';
  const session = useSession();
  const me = session.data?.user ?? null;
  const invitation = useQuery({
    // Whose it is depends on who asks.
    queryKey: ['invitation', token, me?.id ?? null],
    queryFn: () => fetchInvitation(token),
    enabled: session.isSuccess,
    staleTime: Infinity,
  });
  const decline = useMutation({ mutationFn: () => declineInvitation(token) });

  if (decline.isSuccess)
    return (
      <PageState title="You declined" role="status">
        The lab is told. Should you change your mind, ask whoever invited you for a new invitation.
      </PageState>
    );
  if (session.isError) return <ErrorState error={session.error} />;
  if (session.isPending || invitation.isPending) return <LoadingState label="Reading the invitation…" />;
  if (invitation.isError)
    return (
      <ErrorState
        error={invitation.error}
        actions={
          <Link to="/lab" className={buttonClasses()}>
            To your labs
          </Link>
        }
      />
    );
  const { labName, role, invitedBy, expiresAt, mine } = invitation.data;
  const answer = { token, invitation: invitation.data };
  return (
    <NarrowPage
      title={`Join ${labName}`}
      intro={`${invitedBy} asks you to join this lab as a ${role}. The invitation stands until ${formatDay(expiresAt)}.`}
    >
      {me === null ? (
        <AcceptAsVisitor {...answer} />
      ) : mine ? (
        <AcceptAsMe {...answer} />
      ) : (
        <ConfirmAddress {...answer} myAddress={me.email} />
      )}
      <div className="grid justify-items-start gap-2 border-t pt-4">
        <p className="text-sm text-muted">
          Members see your name, and supervisors your address. Your private presets stay private.
        </p>
        <Button look="quiet" size="small" disabled={decline.isPending} onClick={() => decline.mutate()}>
          Decline the invitation
        </Button>
        {decline.error ? (
          <p role="alert" className="text-caution">
            {decline.error.message}
          </p>
        ) : null}
      </div>
    </NarrowPage>
  );
}
