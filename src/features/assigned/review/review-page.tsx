import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams, useSearchParams } from 'react-router-dom';

import { SelectField } from '@/components/fields/select-field';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import { Button, buttonClasses } from '@/components/ui/button';
import { WORK_STATES } from '@/contract/assigned-sweeps';

import { fetchTable, REVIEW_KEYS, tableFile } from '../api/review-operations';
import { fetchAssigned, SET_KEYS } from '../api/set-operations';
import { AssignedStateChip } from '../components/assigned-state-chip';
import { DueWords } from '../components/due-words';
import { PeopleRows } from './people-rows';
import { SendBackDialog } from './send-back-dialog';

/** Work comes in while one looks: milliseconds between two readings of the table. */
const REFRESH = 30_000;

/** Everyone's newest hand-in of one sweep beside what is expected. */
export default function ReviewPage() {
  const { id = '' } = useParams();
  const [search, setSearch] = useSearchParams();
  const shownState = WORK_STATES.find((one) => one === search.get('state'));
  const assigned = useQuery({ queryKey: SET_KEYS.assigned(id), queryFn: () => fetchAssigned(id) });
  const table = useQuery({
    queryKey: REVIEW_KEYS.table(id),
    queryFn: () => fetchTable(id),
    refetchInterval: REFRESH,
  });
  const [chosen, setChosen] = useState<ReadonlySet<string>>(new Set());
  const [sending, setSending] = useState(false);
  const [said, setSaid] = useState('');
  if (table.isError) return <ErrorState error={table.error} />;
  if (assigned.isError) return <ErrorState error={assigned.error} />;
  if (table.isPending || assigned.isPending) return <LoadingState label="Reading the hand-ins…" />;
  const { data } = assigned;
  const counts = new Map(
    WORK_STATES.map((state) => [state, table.data.rows.filter((row) => row.state === state).length]),
  );
  const rows = table.data.rows.filter((row) => !shownState || row.state === shownState);
  const people = rows.filter((row) => chosen.has(row.person.id)).map((row) => row.person);
  const handleChoose = (ids: readonly string[], choose: boolean) =>
    setChosen((before) => {
      const after = new Set(before);
      for (const one of ids)
        if (choose) after.add(one);
        else after.delete(one);
      return after;
    });
  return (
    <div className="mx-auto grid max-w-[90rem] gap-5 px-4 py-8">
      <header className="grid gap-2">
        <p className="text-sm text-muted">
          <Link to={`/lab/sweeps?in=${data.lab.id}`} className="text-accent underline underline-offset-2">
            Assigned sweeps of {data.lab.name}
          </Link>
        </p>
        <div className="flex flex-wrap items-end justify-between gap-3">
          <div>
            <h1 className="text-3xl break-words">{data.title}</h1>
            <p className="flex flex-wrap items-center gap-3">
              <AssignedStateChip state={data.state} />
              <DueWords dueAt={data.dueAt} timeZone={data.timeZone} open={data.state === 'open'} />
            </p>
          </div>
          <div className="flex flex-wrap gap-2">
            <Link to={`/assigned/${id}/set`} className={buttonClasses()}>
              Edit the sweep
            </Link>
            <a href={tableFile(id)} download className={buttonClasses()}>
              Download as CSV
            </a>
          </div>
        </div>
      </header>
      <div className="flex flex-wrap items-end justify-between gap-3">
        <SelectField
          label="Shown"
          className="w-56"
          value={shownState ?? 'all'}
          choices={[
            { value: 'all', label: `everyone (${table.data.rows.length})` },
            ...WORK_STATES.map((state) => ({ value: state, label: `${state} (${counts.get(state) ?? 0})` })),
          ]}
          onChange={(value) => setSearch(value === 'all' ? {} : { state: value }, { replace: true })}
        />
        <div className="flex flex-wrap items-center gap-3">
          <p role="status" className="text-sm text-accent">
            {said}
          </p>
          <Button disabled={people.length === 0} onClick={() => setSending(true)}>
            {people.length > 0 ? `Send ${people.length} back…` : 'Send back…'}
          </Button>
        </div>
      </div>
      {rows.length > 0 ? (
        <PeopleRows
          assigned={data}
          wanted={table.data.wanted}
          rows={rows}
          chosen={chosen}
          onChoose={handleChoose}
        />
      ) : (
        <p className="rounded-lg border border-dashed p-4 text-muted">
          {table.data.rows.length === 0 ? 'The sweep is for nobody yet.' : 'Nobody is in this state.'}
        </p>
      )}
      {sending ? (
        <SendBackDialog
          assignedId={id}
          people={people}
          onClose={() => setSending(false)}
          onDone={(words) => {
            setSaid(words);
            setChosen(new Set());
          }}
        />
      ) : null}
    </div>
  );
}
