import { useQuery } from '@tanstack/react-query';

import { ErrorState, LoadingState, PageState } from '@/components/states/page-state';
import { labSchema } from '@/contract/labs';
import { LAB_RIGHTS, roleMay, type LabRight } from '@/contract/rights';
import { api } from '@/lib/api-client';
import { useSession } from '@/lib/session';

function Lab({ id }: { readonly id: string }) {
  const lab = useQuery({
    queryKey: ['lab', id],
    queryFn: () => api.get(`/labs/${encodeURIComponent(id)}`, labSchema),
  });
  if (lab.isPending) return <LoadingState label="Reading the lab…" />;
  if (lab.isError) return <ErrorState error={lab.error} />;
  const rights = (Object.keys(LAB_RIGHTS) as LabRight[]).map((right) => ({
    right,
    may: roleMay(lab.data.role, right),
  }));
  return (
    <section className="grid gap-6" aria-label={lab.data.name}>
      <div>
        <h2 className="text-2xl">{lab.data.name}</h2>
        <p className="text-muted">You are a {lab.data.role} here.</p>
      </div>
      <div className="grid gap-8 md:grid-cols-2">
        <div className="grid content-start gap-2">
          <h3 className="text-lg">Members</h3>
          <ul className="divide-y rounded-lg border bg-raised">
            {lab.data.members.map((member) => (
              <li key={member.id} className="flex justify-between gap-3 px-4 py-2.5">
                <span>{member.name}</span>
                <span className="text-muted">{member.role}</span>
              </li>
            ))}
          </ul>
        </div>
        <div className="grid content-start gap-2">
          <h3 className="text-lg">What your role may do</h3>
          <ul className="divide-y rounded-lg border bg-raised">
            {rights.map(({ right, may }) => (
              <li key={right} className="flex justify-between gap-3 px-4 py-2.5">
                <span className={may ? '' : 'text-muted'}>{right}</span>
                <span className={may ? 'text-accent' : 'text-muted'}>{may ? 'yes' : 'no'}</span>
              </li>
            ))}
          </ul>
        </div>
      </div>
    </section>
  );
}

export default function LabPage() {
  const memberships = useSession().data?.user?.memberships ?? [];
  if (memberships.length === 0) {
    return (
      <PageState title="You are in no lab">
        Your presets are private to you, and you can share any of them by link.
      </PageState>
    );
  }
  return (
    <div className="mx-auto grid max-w-4xl gap-10 px-4 py-8">
      <h1 className="sr-only">Lab</h1>
      {memberships.map((membership) => (
        <Lab key={membership.labId} id={membership.labId} />
      ))}
    </div>
  );
}
