import { useInfiniteQuery } from '@tanstack/react-query';

import { FieldMessage } from '@/components/fields/field-message';
import { Button } from '@/components/ui/button';
import { formatDayAndTime } from '@/lib/format';

import { listActivity } from './api/list-activity';
import { errorWords } from './error-words';

/** Who did what to a preset, newest first. */
export function ActivityList({ id }: { readonly id: string }) {
  const activity = useInfiniteQuery({
    queryKey: ['activity', id],
    queryFn: ({ pageParam }) => listActivity(id, pageParam),
    initialPageParam: 1,
    getNextPageParam: (last) => (last.page * last.pageSize < last.total ? last.page + 1 : undefined),
    staleTime: 0,
  });
  const items = activity.data?.pages.flatMap((page) => page.items) ?? [];
  return (
    <section aria-labelledby="activity" className="mt-4 grid gap-2">
      <h3 id="activity" className="text-lg">
        Activity
      </h3>
      {activity.isPending ? <p role="status">Reading what was done…</p> : null}
      {activity.isError ? <FieldMessage>{errorWords(activity.error)}</FieldMessage> : null}
      <ul
        aria-label="Activity"
        tabIndex={0}
        className="max-h-[30vh] divide-y overflow-y-auto rounded-md border"
      >
        {items.map(({ key, at, actor, sentence, version, note }) => (
          <li key={key} className="flex flex-wrap justify-between gap-x-3 px-3 py-1.5">
            <span>
              {actor} {sentence}
              {version === null ? '' : `, version ${version}`}
              {note ? <span className="text-muted">: {note}</span> : null}
            </span>
            <span className="text-sm text-muted">{formatDayAndTime(at)}</span>
          </li>
        ))}
      </ul>
      {activity.hasNextPage ? (
        <Button
          size="small"
          disabled={activity.isFetchingNextPage}
          onClick={() => void activity.fetchNextPage()}
        >
          Earlier activity
        </Button>
      ) : null}
    </section>
  );
}
