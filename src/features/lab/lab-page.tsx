import { useQuery } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { useNavigate } from 'react-router-dom';

import { ErrorState, LoadingState, PageState } from '@/components/states/page-state';
import { Button } from '@/components/ui/button';
import { roleMay, type Role } from '@/contract/rights';
import { useRefreshSession, useSession } from '@/lib/session';

import { createLab, fetchLab, LAB_KEYS } from './api/lab-operations';
import { DepartureDialog } from './components/departure-dialog';
import { InvitationList } from './components/invitation-list';
import { LabHeading } from './components/lab-heading';
import { MemberList } from './components/member-list';
import { NameDialog } from './components/name-dialog';
import { OwnInvitations } from './components/own-invitations';
import { RoleRights } from './components/role-rights';
import { useCurrentLab } from './use-current-lab';

interface LabPageProps {
  /** The assigned sweeps of a lab, as its members see them. */
  readonly sweeps: (labId: string, role: Role) => ReactNode;
}

function Lab({ id, onNew, sweeps }: LabPageProps & { readonly id: string; readonly onNew: () => void }) {
  const me = useSession().data?.user?.id ?? '';
  const refresh = useRefreshSession();
  const navigate = useNavigate();
  const [leaving, setLeaving] = useState(false);
  const lab = useQuery({ queryKey: LAB_KEYS.lab(id), queryFn: () => fetchLab(id) });
  if (lab.isPending) return <LoadingState label="Reading the lab…" />;
  if (lab.isError) return <ErrorState error={lab.error} />;
  const mayInvite = roleMay(lab.data.role, 'invite members');
  return (
    <>
      <LabHeading lab={lab.data} onNew={onNew} onLeave={() => setLeaving(true)} />
      {sweeps(id, lab.data.role)}
      <div className={mayInvite ? 'grid gap-8 lg:grid-cols-2' : 'grid max-w-3xl gap-8'}>
        <MemberList lab={lab.data} />
        {mayInvite ? <InvitationList labId={id} /> : null}
      </div>
      <RoleRights role={lab.data.role} />
      {leaving ? (
        <DepartureDialog
          lab={lab.data}
          userId={me}
          leaving
          onClose={() => setLeaving(false)}
          onDone={() => {
            setLeaving(false);
            void navigate('/lab', { replace: true });
            void refresh();
          }}
        />
      ) : null}
    </>
  );
}

/** One lab at a time, and the ways to others: switching, founding, joining. */
export default function LabPage({ sweeps }: LabPageProps) {
  const { current, choose } = useCurrentLab();
  const refresh = useRefreshSession();
  const [founding, setFounding] = useState(false);

  const handleFound = async (name: string) => {
    const made = await createLab(name);
    await refresh();
    choose(made.id);
  };

  return (
    <div className="mx-auto grid max-w-6xl gap-8 px-4 py-8">
      <OwnInvitations onJoined={choose} />
      {current ? (
        <Lab key={current.labId} id={current.labId} onNew={() => setFounding(true)} sweeps={sweeps} />
      ) : (
        <PageState
          title="You are in no lab"
          actions={
            <Button look="primary" onClick={() => setFounding(true)}>
              New lab
            </Button>
          }
        >
          Your presets are private to you, and you can share any of them by link. Found a lab to work with
          others, or ask a supervisor to invite you.
        </PageState>
      )}
      {founding ? (
        <NameDialog
          title="New lab"
          description="You supervise it, and invite others afterwards."
          initial=""
          submitLabel="Make the lab"
          onSubmit={handleFound}
          onClose={() => setFounding(false)}
        />
      ) : null}
    </div>
  );
}
