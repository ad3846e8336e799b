import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';

import { Button } from '@/components/ui/button';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import { formatDayAndTime } from '@/lib/format';

import { endOtherSessions, endSession, fetchSessions } from '../api/account-operations';

const KEY = ['account-sessions'];

export function SessionList() {
  const queries = useQueryClient();
  const sessions = useQuery({ queryKey: KEY, queryFn: fetchSessions });
  const refresh = () => queries.invalidateQueries({ queryKey: KEY });
  const endOne = useMutation({ mutationFn: endSession, onSuccess: refresh });
  const endOthers = useMutation({ mutationFn: endOtherSessions, onSuccess: refresh });

  if (sessions.isPending) return <LoadingState label="Reading your sessions…" />;
  if (sessions.isError) return <ErrorState error={sessions.error} />;
  const list = sessions.data.sessions;
  return (
    <section aria-labelledby="sessions" className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <div className="flex flex-wrap items-center justify-between gap-2">
        <h2 id="sessions" className="text-xl">
          Sessions
        </h2>
        <Button
          size="small"
          disabled={list.length < 2 || endOthers.isPending}
          onClick={() => endOthers.mutate()}
        >
          End all others
        </Button>
      </div>
      <ul className="divide-y rounded-lg border bg-raised">
        {list.map((session) => (
          <li key={session.id} className="flex items-center justify-between gap-3 px-4 py-2.5">
            <div className="min-w-0">
              <p className="truncate">{session.agent || 'Unknown browser'}</p>
              <p className="text-sm text-muted">
                since {formatDayAndTime(session.startedAt)}, last seen {formatDayAndTime(session.lastSeenAt)}
              </p>
            </div>
            {session.current ? (
              <span className="text-sm text-accent">this one</span>
            ) : (
              <Button
                size="small"
                look="caution"
                disabled={endOne.isPending}
                onClick={() => endOne.mutate(session.id)}
              >
                End
              </Button>
            )}
          </li>
        ))}
      </ul>
    </section>
  );
}
