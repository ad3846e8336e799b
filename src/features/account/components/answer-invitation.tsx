import { useMutation } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useLocation, useNavigate } from 'react-router-dom';

import { Button, buttonClasses } from '@/components/ui/button';
import { PASSWORD_LIMITS } from '@/contract/account';
import { signUpByInvitationSchema, type InvitationBody } from '@/contract/labs';
import { useRefreshSession } from '@/lib/session';

import { acceptInvitation, askToConfirmAddress, signUpByInvitation } from '../api/invitation-operations';
import { AccountForm } from './account-form';

interface AnswerProps {
  readonly token: string;
  readonly invitation: InvitationBody;
}

/** Joins as the person signed in, whose address it is. */
export function AcceptAsMe({ token, invitation }: AnswerProps) {
  const refresh = useRefreshSession();
  const navigate = useNavigate();
  const accept = useMutation({
    mutationFn: () => acceptInvitation(token),
    onSuccess: async ({ labId }) => {
      // First away from here, where the spent link would be read once more.
      await navigate(`/lab?in=${encodeURIComponent(labId)}`, { replace: true });
      await refresh();
    },
  });
  return (
    <>
      <Button look="primary" disabled={accept.isPending} onClick={() => accept.mutate()}>
        Join {invitation.labName}
      </Button>
      {accept.error ? (
        <p role="alert" className="text-caution">
          {accept.error.message}
        </p>
      ) : null}
    </>
  );
}

/** For someone signed in under another address: it is shown to be theirs by a message to it. */
export function ConfirmAddress({
  token,
  invitation,
  myAddress,
}: AnswerProps & { readonly myAddress: string }) {
  const ask = useMutation({ mutationFn: () => askToConfirmAddress(token) });
  if (ask.isSuccess)
    return (
      <p role="status">
        A message is on its way to {invitation.email}. Open its link in this browser, where you are signed in.
      </p>
    );
  return (
    <>
      <p>
        It was sent to {invitation.email}, and you are signed in as {myAddress}. If both are yours, confirm it
        by a message to {invitation.email}. Otherwise sign out first.
      </p>
      <Button look="primary" disabled={ask.isPending} onClick={() => ask.mutate()}>
        Mail me a link to confirm
      </Button>
      {ask.error ? (
        <p role="alert" className="text-caution">
          {ask.error.message}
        </p>
      ) : null}
    </>
  );
}

/** For visitors: an account made here and now, or the one they have. */
export function AcceptAsVisitor({ token, invitation }: AnswerProps) {
  const refresh = useRefreshSession();
  const navigate = useNavigate();
  const location = useLocation();
  const [making, setMaking] = useState(false);
  const here = `${location.pathname}${location.search}`;
  if (!making)
    return (
      <div className="flex flex-wrap gap-2">
        <Link to="/sign-in" state={{ from: here }} className={buttonClasses('primary')}>
          Sign in and accept
        </Link>
        <Button onClick={() => setMaking(true)}>Make an account</Button>
      </div>
    );
  return (
    <AccountForm
      label="Make an account"
      schema={signUpByInvitationSchema}
      initial={{ name: '', password: '' }}
      submitLabel={`Make the account and join`}
      onSubmit={async (values) => {
        await signUpByInvitation(token, values);
        await navigate('/lab', { replace: true });
        await refresh();
      }}
      fields={[
        {
          name: 'name',
          label: 'Name',
          autoComplete: 'name',
          help: `The account is for ${invitation.email}.`,
        },
        {
          name: 'password',
          label: 'Password',
          type: 'password',
          autoComplete: 'new-password',
          help: `At least ${PASSWORD_LIMITS.shortest} characters.`,
        },
      ]}
    />
  );
}
