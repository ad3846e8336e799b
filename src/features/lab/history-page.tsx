import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { Link, useSearchParams } from 'react-router-dom';

import { SelectField } from '@/components/fields/select-field';
import { ErrorState, LoadingState, PageState } from '@/components/states/page-state';
import { Button, buttonClasses } from '@/components/ui/button';
import { AUDIT_ACTIONS, AUDIT_SENTENCES } from '@/contract/audit';
import { roleMay } from '@/contract/rights';
import { plural } from '@/lib/format';

import { fetchHistory, fetchLab, historyFile, LAB_KEYS } from './api/lab-operations';
import { HistoryList } from './components/history-list';
import { useCurrentLab } from './use-current-lab';

const FILTERS = ['person', 'action', 'from', 'to'] as const;
type Filter = (typeof FILTERS)[number];

function DayField({
  label,
  value,
  onChange,
}: {
  readonly label: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
}) {
  return (
    <label className="grid gap-1 text-sm font-medium">
      {label}
      <input
        type="date"
        className="min-h-9 rounded border bg-raised px-2 font-normal"
        value={value}
        onChange={(event) => onChange(event.target.value)}
      />
    </label>
  );
}

function History({ labId, labName }: { readonly labId: string; readonly labName: string }) {
  const [search, setSearch] = useSearchParams();
  const chosen = Object.fromEntries(
    FILTERS.flatMap((key) => (search.get(key) ? [[key, search.get(key) ?? '']] : [])),
  ) as Partial<Record<Filter, string>>;
  const page = Math.max(1, Math.trunc(Number(search.get('page') ?? 1)) || 1);
  const filters = new URLSearchParams(chosen).toString();
  const query = new URLSearchParams({ ...chosen, page: String(page) }).toString();
  const lab = useQuery({ queryKey: LAB_KEYS.lab(labId), queryFn: () => fetchLab(labId) });
  const history = useQuery({
    queryKey: LAB_KEYS.history(labId, query),
    queryFn: () => fetchHistory(labId, query),
    placeholderData: keepPreviousData,
  });
  const go = (change: Record<string, string>) => {
    const next = { in: labId, ...chosen, ...change };
    setSearch(Object.fromEntries(Object.entries(next).filter(([, value]) => value !== '')));
  };
  const last = history.data ? Math.max(1, Math.ceil(history.data.total / history.data.pageSize)) : 1;
  return (
    <div className="mx-auto grid max-w-4xl gap-5 px-4 py-8">
      <div>
        <p className="text-sm">
          <Link
            to={`/lab?in=${encodeURIComponent(labId)}`}
            className="text-accent underline underline-offset-2"
          >
            {labName}
          </Link>
        </p>
        <h1 className="text-3xl">History</h1>
        <p role="status" className="text-muted">
          {history.data ? plural(history.data.total, 'entry', 'entries') : ' '}
        </p>
      </div>
      <div className="flex flex-wrap items-end gap-3">
        <SelectField
          label="Person"
          className="w-48"
          value={chosen.person ?? ''}
          choices={[
            { value: '', label: 'everyone' },
            ...(lab.data?.members ?? []).map(({ id, name }) => ({ value: id, label: name })),
          ]}
          onChange={(person) => go({ person })}
        />
        <SelectField
          label="What was done"
          className="w-64"
          value={chosen.action ?? ''}
          choices={[
            { value: '', label: 'anything' },
            ...AUDIT_ACTIONS.map((action) => ({ value: action, label: AUDIT_SENTENCES[action] })),
          ]}
          onChange={(action) => go({ action })}
        />
        <DayField label="From" value={chosen.from ?? ''} onChange={(from) => go({ from })} />
        <DayField label="To" value={chosen.to ?? ''} onChange={(to) => go({ to })} />
        <a href={historyFile(labId, filters)} className={buttonClasses('plain')}>
          Download as CSV
        </a>
      </div>
      {history.isPending ? <LoadingState label="Reading the history…" /> : null}
      {history.isError ? <ErrorState error={history.error} /> : null}
      {history.data?.items.length === 0 ? (
        <p className="rounded-lg border border-dashed p-4 text-muted">Nothing of that kind was done.</p>
      ) : null}
      {history.data && history.data.items.length > 0 ? <HistoryList items={history.data.items} /> : null}
      {last > 1 ? (
        <nav aria-label="Pages" className="flex items-center justify-center gap-3">
          <Button disabled={page <= 1} onClick={() => go({ page: String(page - 1) })}>
            Newer
          </Button>
          <span className="text-muted">
            page {page} of {last}
          </span>
          <Button disabled={page >= last} onClick={() => go({ page: String(page + 1) })}>
            Older
          </Button>
        </nav>
      ) : null}
    </div>
  );
}

/** What was done in a lab, for those who may read it. */
export default function HistoryPage() {
  const { current } = useCurrentLab();
  if (!current || !roleMay(current.role, 'view lab history'))
    return (
      <PageState title="No history to show">
        The history of a lab is for its supervisors. Ask one of them.
      </PageState>
    );
  return <History key={current.labId} labId={current.labId} labName={current.labName} />;
}
