import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';

import { CheckField } from '@/components/fields/check-field';
import { TextField } from '@/components/fields/text-field';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import { Button } from '@/components/ui/button';
import type { AssignedBody } from '@/contract/assigned-sweeps';
import { roleMay } from '@/contract/rights';
import { plural } from '@/lib/format';

import { fetchMembers, SET_KEYS } from '../api/set-operations';
import { WorkStateChip } from '../components/work-state-chip';
import { SetSection } from './set-section';
import type { SetPart } from './set-view';

/** For whom the sweep is. Those who have begun stay. */
export function PeopleSection({
  view,
  body,
  onChange,
}: Pick<SetPart, 'view' | 'onChange'> & { readonly body: AssignedBody }) {
  const [search, setSearch] = useState('');
  const lab = useQuery({ queryKey: SET_KEYS.members(body.lab.id), queryFn: () => fetchMembers(body.lab.id) });
  const stands = new Map(body.people.map((one) => [one.id, one.state]));
  const bound = (id: string) => view.people.includes(id) && (stands.get(id) ?? 'untouched') !== 'untouched';
  const members = (lab.data?.members ?? []).filter(({ role }) => roleMay(role, 'do assigned sweeps'));
  const gone = body.people.filter(({ id }) => lab.data && !members.some((one) => one.id === id));
  const everyone = [
    ...members.map(({ id, name, role }) => ({ id, name, note: role as string })),
    ...gone.map(({ id, name, member }) => ({
      id,
      name,
      note: member ? 'does no assigned sweeps any more' : 'has left the lab',
    })),
  ];
  const shown = everyone.filter(({ name }) => name.toLowerCase().includes(search.trim().toLowerCase()));
  const put = (ids: readonly string[]) => onChange({ people: [...new Set(ids)] });
  return (
    <SetSection title="For whom" note={`${plural(view.people.length, 'person', 'people')} chosen.`}>
      {lab.isPending ? <LoadingState label="Reading the lab…" /> : null}
      {lab.isError ? <ErrorState error={lab.error} /> : null}
      {everyone.length > 0 ? (
        <>
          <div className="flex flex-wrap items-center gap-2">
            <TextField
              label="Search people"
              placeholder="Search by name"
              live
              className="w-56"
              value={search}
              onCommit={setSearch}
            />
            <Button onClick={() => put([...view.people, ...members.map((one) => one.id)])}>All</Button>
            <Button onClick={() => put(view.people.filter(bound))}>None</Button>
          </div>
          <ul
            aria-label="People"
            tabIndex={0}
            className="grid max-h-72 gap-1 overflow-y-auto rounded-lg border bg-raised p-3 sm:grid-cols-2"
          >
            {shown.map(({ id, name, note }) => (
              <li key={id} className="flex items-start justify-between gap-2">
                <CheckField
                  label={name}
                  help={bound(id) ? `${note}, has begun and stays` : note}
                  checked={view.people.includes(id)}
                  disabled={bound(id)}
                  onChange={(chosen) =>
                    put(chosen ? [...view.people, id] : view.people.filter((one) => one !== id))
                  }
                />
                {stands.has(id) && body.state !== 'draft' ? (
                  <WorkStateChip state={stands.get(id) ?? 'untouched'} />
                ) : null}
              </li>
            ))}
            {shown.length === 0 ? <li className="text-muted">Nobody by that name.</li> : null}
          </ul>
        </>
      ) : null}
      {lab.data && everyone.length === 0 ? (
        <p className="rounded-lg border border-dashed p-4 text-muted">
          Nobody in {body.lab.name} does assigned sweeps yet. Invite students first.
        </p>
      ) : null}
    </SetSection>
  );
}
