import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import type { LabBody } from '@/contract/labs';
import { roleMay, type Role } from '@/contract/rights';
import { plural } from '@/lib/format';
import { useRefreshSession, useSession } from '@/lib/session';

import { changeRole, LAB_KEYS } from '../api/lab-operations';
import { DepartureDialog } from './departure-dialog';
import { MemberRow } from './member-row';

interface Change {
  readonly userId: string;
  readonly name: string;
  readonly role: Role;
}

/** Everyone in the lab. A role takes effect when it is chosen; giving up one's own right to that asks first. */
export function MemberList({ lab }: { readonly lab: LabBody }) {
  const me = useSession().data?.user?.id ?? '';
  const queries = useQueryClient();
  const refresh = useRefreshSession();
  const [removing, setRemoving] = useState<string | null>(null);
  const [asking, setAsking] = useState<Change | null>(null);
  const [done, setDone] = useState('');
  const change = useMutation({
    mutationFn: ({ userId, role }: Change) => changeRole(lab.id, userId, role),
    onMutate: () => setDone(''),
    onSuccess: async (fresh, { userId, name, role }) => {
      queries.setQueryData(LAB_KEYS.lab(lab.id), fresh);
      setDone(`${name} is now a ${role}.`);
      if (userId === me) await refresh();
    },
    onError: () => queries.invalidateQueries({ queryKey: LAB_KEYS.lab(lab.id) }),
  });

  const handleRole = (wanted: Change) => {
    if (wanted.userId === me && !roleMay(wanted.role, 'change roles')) setAsking(wanted);
    else change.mutate(wanted);
  };

  return (
    <section aria-labelledby="members" className="grid content-start gap-2">
      <div className="flex flex-wrap items-baseline justify-between gap-x-4">
        <h2 id="members" className="text-xl">
          {plural(lab.members.length, 'member')}
        </h2>
        <p role="status" className="text-sm text-accent">
          {done}
        </p>
      </div>
      {change.error ? (
        <p role="alert" className="text-caution">
          {change.error.message}
        </p>
      ) : null}
      <ul className="divide-y rounded-lg border bg-raised">
        {lab.members.map((member) => (
          <MemberRow
            key={member.id}
            lab={lab}
            member={member}
            isMe={member.id === me}
            busy={change.isPending}
            onRole={(role) => handleRole({ userId: member.id, name: member.name, role })}
            onRemove={() => setRemoving(member.id)}
          />
        ))}
      </ul>
      {removing ? (
        <DepartureDialog
          lab={lab}
          userId={removing}
          leaving={false}
          onClose={() => setRemoving(null)}
          onDone={(name) => {
            setRemoving(null);
            setDone(`${name} was removed.`);
            void queries.invalidateQueries({ queryKey: LAB_KEYS.lab(lab.id) });
          }}
        />
      ) : null}
      {asking ? (
        <Dialog
          open
          onOpenChange={() => setAsking(null)}
          title="Give up supervising"
          description={`As a ${asking.role} you can no longer invite people, change roles or undo this yourself.`}
          width="narrow"
        >
          <div className="flex justify-end gap-2">
            <Button onClick={() => setAsking(null)}>Cancel</Button>
            <Button
              look="caution"
              onClick={() => {
                change.mutate(asking);
                setAsking(null);
              }}
            >
              Become a {asking.role}
            </Button>
          </div>
        </Dialog>
      ) : null}
    </section>
  );
}
