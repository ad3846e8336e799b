import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useState } from 'react';

import { ErrorState } from '@/components/states/page-state';
import { Button } from '@/components/ui/button';
import { formatDayAndTime } from '@/lib/format';

import { fetchAccountEvents } from '../api/account-operations';

/** Sign-ins and changes of the account, so that its owner notices what they did not do. */
export function AccountEvents() {
  const [page, setPage] = useState(1);
  const events = useQuery({
    queryKey: ['account-events', page],
    queryFn: () => fetchAccountEvents(page),
    placeholderData: keepPreviousData,
  });
  if (events.isError) return <ErrorState error={events.error} />;
  const { items = [], total = 0, pageSize = 1 } = events.data ?? {};
  const last = Math.max(1, Math.ceil(total / pageSize));
  return (
    <section aria-labelledby="account-events" className="grid gap-3">
      <h2 id="account-events" className="text-xl">
        Events of your account
      </h2>
      {items.length === 0 ? (
        <p className="text-muted">{events.isPending ? 'Reading…' : 'Nothing yet.'}</p>
      ) : (
        <ol className="max-h-80 divide-y overflow-y-auto rounded-lg border bg-raised" tabIndex={0}>
          {items.map((entry) => (
            <li key={entry.id} className="flex flex-wrap justify-between gap-x-4 px-4 py-2">
              <span className="break-words">
                {entry.actor.name} {entry.sentence}
                {entry.subject && entry.subject !== entry.actor.name ? `: ${entry.subject}` : ''}
              </span>
              <time dateTime={entry.at} className="text-sm text-muted">
                {formatDayAndTime(entry.at)}
              </time>
            </li>
          ))}
        </ol>
      )}
      {last > 1 ? (
        <div className="flex items-center gap-3">
          <Button size="small" disabled={page <= 1} onClick={() => setPage(page - 1)}>
            Newer
          </Button>
          <span className="text-sm text-muted">
            page {page} of {last}
          </span>
          <Button size="small" disabled={page >= last} onClick={() => setPage(page + 1)}>
            Older
          </Button>
        </div>
      ) : null}
    </section>
  );
}
