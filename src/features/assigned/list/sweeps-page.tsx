import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';

import { SelectField } from '@/components/fields/select-field';
import { ErrorState, LoadingState, PageState } from '@/components/states/page-state';
import { Button, buttonClasses } from '@/components/ui/button';
import { ASSIGNED_STATES } from '@/contract/assigned-sweeps';
import { roleMay } from '@/contract/rights';
import { plural } from '@/lib/format';
import { useSession } from '@/lib/session';

import { ASSIGNED_KEYS, fetchOfLab } from '../api/assigned-operations';
import { SweepRow } from '../components/sweep-row';

const STATES = [
  { value: 'all', label: 'in every state' },
  ...ASSIGNED_STATES.map((state) => ({ value: state, label: state })),
];

/** The assigned sweeps of one lab: all of them for those who set them, one's own for others. */
export default function SweepsPage() {
  const memberships = useSession().data?.user?.memberships ?? [];
  const [search, setSearch] = useSearchParams();
  const lab = memberships.find(({ labId }) => labId === search.get('in')) ?? memberships[0];
  const state = ASSIGNED_STATES.find((one) => one === search.get('state'));
  const page = Math.max(1, Math.trunc(Number(search.get('page') ?? 1)) || 1);
  const labId = lab?.labId ?? '';
  const sweeps = useQuery({
    queryKey: ASSIGNED_KEYS.ofLab(labId, state, page),
    queryFn: () => fetchOfLab(labId, state, page),
    enabled: labId !== '',
    placeholderData: keepPreviousData,
  });
  const go = (change: Record<string, string>) =>
    setSearch({ in: labId, ...(state ? { state } : {}), ...change });
  if (!lab)
    return (
      <PageState title="You are in no lab">
        Sweeps are set within a lab. Found one, or ask a supervisor to invite you.
      </PageState>
    );
  const sets = roleMay(lab.role, 'set sweeps');
  const last = sweeps.data ? Math.max(1, Math.ceil(sweeps.data.total / sweeps.data.pageSize)) : 1;
  return (
    <div className="mx-auto grid max-w-4xl gap-5 px-4 py-8">
      <div className="flex flex-wrap items-end justify-between gap-3">
        <div>
          <p className="text-sm text-muted">
            <Link to={`/lab?in=${labId}`} className="text-accent underline underline-offset-2">
              {lab.labName}
            </Link>
          </p>
          <h1 className="text-3xl">Assigned sweeps</h1>
          <p role="status" className="text-muted">
            {sweeps.data ? plural(sweeps.data.total, 'sweep') : ' '}
          </p>
        </div>
        <div className="flex flex-wrap items-end gap-2">
          {memberships.length > 1 ? (
            <SelectField
              label="Lab"
              className="w-48"
              value={labId}
              choices={memberships.map((one) => ({ value: one.labId, label: one.labName }))}
              onChange={(id) => setSearch({ in: id })}
            />
          ) : null}
          <SelectField
            label="Shown"
            className="w-40"
            value={state ?? 'all'}
            choices={STATES.filter(({ value }) => sets || value !== 'draft')}
            onChange={(value) => setSearch({ in: labId, ...(value === 'all' ? {} : { state: value }) })}
          />
          {sets ? (
            <Link to="/presets" className={buttonClasses('primary')}>
              Set a sweep from a preset
            </Link>
          ) : null}
        </div>
      </div>
      {sweeps.isPending ? <LoadingState label="Reading the sweeps…" /> : null}
      {sweeps.isError ? <ErrorState error={sweeps.error} /> : null}
      {sweeps.data?.items.length === 0 ? (
        <p className="rounded-lg border border-dashed p-4 text-muted">
          {sets
            ? 'None here. Choose a preset in the library, and “Set as an assigned sweep” in its menu.'
            : 'No sweep is set for you here.'}
        </p>
      ) : null}
      {sweeps.data && sweeps.data.items.length > 0 ? (
        <ul className="divide-y rounded-lg border bg-raised">
          {sweeps.data.items.map((sweep) => (
            <SweepRow key={sweep.id} sweep={sweep} withLab={false} />
          ))}
        </ul>
      ) : null}
      {last > 1 ? (
        <nav aria-label="Pages" className="flex items-center justify-center gap-3">
          <Button disabled={page <= 1} onClick={() => go({ page: String(page - 1) })}>
            Newer
          </Button>
          <span className="figures text-sm">
            {page} / {last}
          </span>
          <Button disabled={page >= last} onClick={() => go({ page: String(page + 1) })}>
            Older
          </Button>
        </nav>
      ) : null}
    </div>
  );
}
