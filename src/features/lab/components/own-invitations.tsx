import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';

import { Button } from '@/components/ui/button';
import { formatDay } from '@/lib/format';
import { useRefreshSession } from '@/lib/session';

import {
  acceptOwnInvitation,
  declineOwnInvitation,
  fetchOwnInvitations,
  LAB_KEYS,
} from '../api/lab-operations';

/** Invitations to one's own address that wait for an answer; nothing where there are none. */
export function OwnInvitations({ onJoined }: { readonly onJoined: (labId: string) => void }) {
  const queries = useQueryClient();
  const refresh = useRefreshSession();
  const own = useQuery({ queryKey: LAB_KEYS.own, queryFn: fetchOwnInvitations });
  const accept = useMutation({
    mutationFn: acceptOwnInvitation,
    onSuccess: async ({ labId }) => {
      await refresh();
      onJoined(labId);
    },
  });
  const decline = useMutation({
    mutationFn: declineOwnInvitation,
    onSettled: () => queries.invalidateQueries({ queryKey: LAB_KEYS.own }),
  });
  const problem = accept.error ?? decline.error;
  const invitations = own.data?.invitations ?? [];
  if (invitations.length === 0) return null;
  return (
    <section
      aria-labelledby="own-invitations"
      className="grid gap-2 rounded-lg border border-accent bg-raised p-4"
    >
      <h2 id="own-invitations" className="text-xl">
        You are invited
      </h2>
      {problem ? (
        <p role="alert" className="text-caution">
          {problem.message}
        </p>
      ) : null}
      <ul className="divide-y">
        {invitations.map(({ id, labName, role, invitedBy, expiresAt }) => (
          <li key={id} className="flex flex-wrap items-center justify-between gap-2 py-2">
            <p>
              {invitedBy} asks you to join <strong>{labName}</strong> as a {role}, until{' '}
              {formatDay(expiresAt)}.
            </p>
            <div className="flex gap-1.5">
              <Button
                size="small"
                aria-label={`Decline ${labName}`}
                disabled={decline.isPending}
                onClick={() => decline.mutate(id)}
              >
                Decline
              </Button>
              <Button
                size="small"
                look="primary"
                aria-label={`Join ${labName}`}
                disabled={accept.isPending}
                onClick={() => accept.mutate(id)}
              >
                Join
              </Button>
            </div>
          </li>
        ))}
      </ul>
    </section>
  );
}
