import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';

import { buttonClasses } from '@/components/ui/button';
import type { ReviewedHandIn } from '@/contract/assigned-sweeps';
import { formatShort } from '@/graphics/numbers';
import { formatDayAndTime } from '@/lib/format';

import { fetchTable, REVIEW_KEYS } from '../api/review-operations';

/** The hand-ins of those before and after this person in the table. */
function Neighbours({ handIn }: { readonly handIn: ReviewedHandIn }) {
  const { id } = handIn.assigned;
  const table = useQuery({ queryKey: REVIEW_KEYS.table(id), queryFn: () => fetchTable(id) });
  const rows = (table.data?.rows ?? []).filter((row) => row.handIn);
  const at = rows.findIndex((row) => row.person.id === handIn.person.id);
  const [before, after] = at < 0 ? [undefined, undefined] : [rows[at - 1], rows[at + 1]];
  return (
    <nav aria-label="People" className="flex flex-wrap gap-2">
      {before?.handIn ? (
        <Link to={`/hand-ins/${before.handIn.id}`} className={buttonClasses('plain', 'small')}>
          Previous: {before.person.name}
        </Link>
      ) : null}
      {after?.handIn ? (
        <Link to={`/hand-ins/${after.handIn.id}`} className={buttonClasses('plain', 'small')}>
          Next: {after.person.name}
        </Link>
      ) : null}
    </nav>
  );
}

function History({ handIn }: { readonly handIn: ReviewedHandIn }) {
  if (handIn.all.length < 2) return null;
  return (
    <nav aria-label="Hand-ins of this person">
      <ul className="flex flex-wrap gap-x-4 gap-y-1 text-sm">
        {handIn.all.map((one) => (
          <li key={one.id}>
            <Link
              to={`/hand-ins/${one.id}`}
              aria-current={one.id === handIn.id ? 'page' : undefined}
              className={one.id === handIn.id ? 'font-semibold' : 'text-accent underline underline-offset-2'}
            >
              Hand-in {one.number}, {formatDayAndTime(one.handedInAt)}
            </Link>{' '}
            <span className="text-muted">{one.outcome ?? 'not reviewed'}</span>
          </li>
        ))}
      </ul>
    </nav>
  );
}

/** Whose hand-in this is, when it came, and what was changed in it against what was set. */
export function HandInHeader({ handIn }: { readonly handIn: ReviewedHandIn }) {
  const { person, assigned, number, handedInAt, late, code, range, changes, note, all } = handIn;
  const newest = all[0];
  return (
    <header className="grid gap-3">
      <div className="flex flex-wrap items-center justify-between gap-3">
        <Link
          to={`/assigned/${assigned.id}/review`}
          className="text-sm text-accent underline underline-offset-2"
        >
          {assigned.title}: everyone
        </Link>
        <Neighbours handIn={handIn} />
      </div>
      <div>
        <h1 className="text-3xl break-words">
          {person.name}, hand-in {number}
        </h1>
        <p className="text-muted">
          {formatDayAndTime(handedInAt)}
          {late ? ', late' : ''}, receipt <code className="figures">{code}</code>
        </p>
      </div>
      {newest && newest.id !== handIn.id ? (
        <p className="text-caution">
          A newer hand-in is there:{' '}
          <Link to={`/hand-ins/${newest.id}`} className="underline underline-offset-2">
            hand-in {newest.number}
          </Link>
          .
        </p>
      ) : null}
      <History handIn={handIn} />
      <p>
        Swept <span className="figures">{range.parameter}</span> from {formatShort(range.from)} to{' '}
        {formatShort(range.to)}.
      </p>
      {changes.length > 0 ? (
        <div>
          <p>Changed against what was set:</p>
          <ul className="list-disc pl-5">
            {changes.map((one) => (
              <li key={one}>{one}</li>
            ))}
          </ul>
        </div>
      ) : (
        <p className="text-muted">Nothing was changed against what was set.</p>
      )}
      {note ? (
        <blockquote className="border-l-2 pl-3 whitespace-pre-wrap">
          <span className="block text-sm text-muted">Their note</span>
          {note}
        </blockquote>
      ) : null}
    </header>
  );
}
