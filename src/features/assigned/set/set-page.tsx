import { useQuery, useQueryClient } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';

import { TextField } from '@/components/fields/text-field';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import { ASSIGNED_LIMITS, changeAssignedSchema, type AssignedBody } from '@/contract/assigned-sweeps';

import { changeAssigned, fetchAssigned, SET_KEYS } from '../api/set-operations';
import { AssignedStateChip } from '../components/assigned-state-chip';
import { SavingWords } from '../keeping/saving-words';
import { useKeeper } from '../keeping/use-keeper';
import { BriefSection } from './brief-section';
import { DueSection } from './due-section';
import { FindingsSection } from './findings-section';
import { FreedomSection } from './freedom-section';
import { PeopleSection } from './people-section';
import { ReferenceSection } from './reference-section';
import { SetActions } from './set-actions';
import { viewOf, type SetEdits } from './set-view';
import { SweepSection } from './sweep-section';

/** Said before the server would say it. */
function refusalOf(body: AssignedBody, edits: SetEdits): string | null {
  const parsed = changeAssignedSchema.safeParse({ ...edits, baseRevision: body.revision });
  return parsed.success ? null : (parsed.error.issues[0]?.message ?? 'Something in it cannot be saved.');
}

function Obstacles({ body }: { readonly body: AssignedBody }) {
  if (body.state === 'open' || body.obstacles.length === 0) return null;
  return (
    <div className="rounded-lg border bg-raised p-3">
      <p className="font-medium">Before it can be opened:</p>
      <ul className="list-disc pl-5">
        {body.obstacles.map((one) => (
          <li key={one}>{one}</li>
        ))}
      </ul>
    </div>
  );
}

function SetForm({ initial }: { readonly initial: AssignedBody }) {
  const queries = useQueryClient();
  const { id } = initial;
  const { keeper, body, edits, saving } = useKeeper<AssignedBody, SetEdits>({
    initial,
    revisionOf: ({ revision }) => revision,
    send: (base, changed) => changeAssigned(id, { ...changed, baseRevision: base.revision }),
    fetch: () => fetchAssigned(id),
    check: refusalOf,
    onBody: (fresh) => queries.setQueryData(SET_KEYS.assigned(id), fresh),
  });
  const view = viewOf(body, edits);
  const part = { view, fixed: body.state !== 'draft', onChange: keeper.change };
  const latest = () => viewOf(keeper.get().body, keeper.get().edits);
  return (
    <div className="mx-auto grid max-w-5xl gap-6 px-4 py-8">
      <header className="grid gap-3">
        <p className="text-sm text-muted">
          <Link to={`/lab/sweeps?in=${body.lab.id}`} className="text-accent underline underline-offset-2">
            Assigned sweeps of {body.lab.name}
          </Link>
          {', from '}
          <Link to={`/presets/${body.preset.id}`} className="text-accent underline underline-offset-2">
            {body.preset.title}, version {body.preset.version}
          </Link>
        </p>
        <h1 className="sr-only">Set a sweep: {view.title}</h1>
        <div className="flex flex-wrap items-center gap-3">
          <TextField
            label="Title"
            className="min-w-64 flex-1"
            inputClassName="h-11! font-heading text-2xl"
            maxLength={ASSIGNED_LIMITS.titleLength}
            value={view.title}
            onCommit={(title) => {
              if (!title.trim()) return 'A title is needed.';
              keeper.change({ title: title.trim() });
              return null;
            }}
          />
          <AssignedStateChip state={body.state} />
        </div>
        <SavingWords keeper={keeper} saving={saving} />
        <SetActions keeper={keeper} body={body} />
        <Obstacles body={body} />
      </header>
      <BriefSection {...part} />
      <SweepSection {...part} />
      <FreedomSection {...part} />
      <FindingsSection {...part} />
      <ReferenceSection {...part} latest={latest} />
      <DueSection {...part} />
      <PeopleSection {...part} body={body} />
    </div>
  );
}

/** The editor of one assigned sweep. */
export default function SetPage() {
  const { id = '' } = useParams();
  const assigned = useQuery({
    queryKey: SET_KEYS.assigned(id),
    queryFn: () => fetchAssigned(id),
    refetchOnMount: 'always',
    refetchOnWindowFocus: false,
  });
  if (assigned.isError) return <ErrorState error={assigned.error} />;
  if (!assigned.data || (assigned.isFetching && !assigned.isFetchedAfterMount))
    return <LoadingState label="Opening the assigned sweep…" />;
  return <SetForm key={id} initial={assigned.data} />;
}
