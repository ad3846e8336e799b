import type { AuditEntryBody } from '@/contract/audit';
import { formatDayAndTime } from '@/lib/format';

/** Ids say nothing to a reader; what is left of the details stands beside the sentence. */
const SPOKEN = [
  'number',
  'version',
  'outcome',
  'of',
  'late',
  'receipt',
  'from',
  'to',
  'role',
  'label',
  'changed',
  'people',
];

function details({ details: all }: AuditEntryBody): string {
  return SPOKEN.flatMap((key) =>
    all[key] === undefined || all[key] === '' ? [] : [`${key} ${all[key]}`],
  ).join(', ');
}

/** Who did what, newest first. */
export function HistoryList({ items }: { readonly items: readonly AuditEntryBody[] }) {
  return (
    <ol className="divide-y rounded-lg border bg-raised">
      {items.map((entry) => (
        <li key={entry.id} className="grid gap-x-4 px-4 py-2 sm:grid-cols-[11rem_minmax(0,1fr)]">
          <time dateTime={entry.at} className="text-sm text-muted">
            {formatDayAndTime(entry.at)}
          </time>
          <p className="break-words">
            <span className="font-medium">{entry.actor.name}</span> {entry.sentence}
            {entry.subject ? <>: {entry.subject}</> : null}
            {details(entry) ? <span className="text-sm text-muted"> ({details(entry)})</span> : null}
          </p>
        </li>
      ))}
    </ol>
  );
}
