import { useInfiniteQuery } from '@tanstack/react-query';

import { FieldMessage } from '@/components/fields/field-message';
import { SelectField } from '@/components/fields/select-field';
import { Button } from '@/components/ui/button';

import { errorWords } from '../dialogs/error-words';
import { listComments } from './api/comment-operations';
import { useCommentsUi } from './comments-ui';
import { NewComment } from './new-comment';
import { ThreadView } from './thread-view';

const EVERY = 30_000;

/** The threads of a preset; read again every half minute while it is open. */
export default function CommentsPanel({
  presetId,
  userId,
  version,
  mayComment,
}: {
  readonly presetId: string;
  readonly userId: string;
  readonly version: number;
  readonly mayComment: boolean;
}) {
  const { filter, thread, set } = useCommentsUi();
  const list = useInfiniteQuery({
    queryKey: ['comments', presetId, 'list', filter, thread],
    queryFn: ({ pageParam }) =>
      listComments(presetId, { state: filter, page: pageParam, ...(thread ? { thread } : {}) }),
    initialPageParam: 1,
    getNextPageParam: (last) => (last.page * last.pageSize < last.total ? last.page + 1 : undefined),
    staleTime: 0,
    refetchInterval: EVERY,
    refetchOnWindowFocus: true,
  });
  const pages = list.data?.pages ?? [];
  const [first] = pages;
  if (first?.held)
    return (
      <p className="text-muted">
        A sweep from this preset is set for you. Its comments open when your work has been reviewed.
      </p>
    );
  // A thread that came while pages were read may stand on two of them.
  const threads = [...new Map(pages.flatMap(({ items }) => items).map((one) => [one.id, one])).values()];
  return (
    <div className="grid gap-3">
      {thread ? (
        <Button size="small" onClick={() => set({ thread: null })}>
          Show all comments
        </Button>
      ) : (
        <SelectField
          label="Show"
          value={filter}
          choices={[
            { value: 'open', label: `Open (${first?.open ?? 0})` },
            { value: 'resolved', label: `Resolved (${first?.resolved ?? 0})` },
            { value: 'all', label: 'All' },
          ]}
          onChange={(state) => set({ filter: state })}
        />
      )}
      {list.isPending ? <p role="status">Reading the comments…</p> : null}
      {list.isError ? <FieldMessage>{errorWords(list.error)}</FieldMessage> : null}
      {list.isSuccess && threads.length === 0 ? (
        <p className="text-muted">{thread ? 'This thread was deleted.' : 'No comments here.'}</p>
      ) : null}
      <ul aria-label="Threads" className="grid gap-2">
        {threads.map((one) => (
          <ThreadView key={one.id} presetId={presetId} userId={userId} thread={one} mayComment={mayComment} />
        ))}
      </ul>
      {list.hasNextPage ? (
        <Button size="small" disabled={list.isFetchingNextPage} onClick={() => void list.fetchNextPage()}>
          Earlier threads
        </Button>
      ) : null}
      {mayComment ? <NewComment presetId={presetId} userId={userId} version={version} /> : null}
    </div>
  );
}
