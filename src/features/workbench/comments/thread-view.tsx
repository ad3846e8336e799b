import { MapPin } from 'lucide-react';
import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { Button } from '@/components/ui/button';
import type { ThreadBody } from '@/contract/comments';
import { formatNumber } from '@/graphics/numbers';
import { formatDay } from '@/lib/format';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbenchStore } from '../state/store';
import { resolveThread, writeComment } from './api/comment-operations';
import { CommentView } from './comment-view';
import { Composer } from './composer';
import { textKey } from './kept-text';
import { showPin } from './points';
import { useCommentChanges } from './use-comment-changes';

function Place({ thread: { pin, version } }: { readonly thread: ThreadBody }) {
  const store = useWorkbenchStore();
  if (pin === null && version === null) return null;
  return (
    <p className="flex flex-wrap items-center gap-x-2 gap-y-1 text-sm text-muted">
      {pin ? (
        <>
          <MapPin size={13} aria-hidden />
          <span>
            {pin.model === 'twin' ? 'pooled ' : ''}
            {pin.kind} at {pin.parameter} = <span className="figures">{formatNumber(pin.value, 4)}</span>
          </span>
        </>
      ) : null}
      <span>on version {version}</span>
      {pin ? (
        <Button
          size="small"
          aria-label={`Show the ${pin.kind} at ${pin.parameter} = ${formatNumber(pin.value, 4)}`}
          onClick={() => useBenchUi.getState().set({ notice: showPin(store, pin) })}
        >
          Show
        </Button>
      ) : null}
    </p>
  );
}

/** A thread: where it stands, its comments, a reply, and whether it is settled. */
export function ThreadView({
  presetId,
  userId,
  thread,
  mayComment,
}: {
  readonly presetId: string;
  readonly userId: string;
  readonly thread: ThreadBody;
  readonly mayComment: boolean;
}) {
  const { run, busy, error } = useCommentChanges(presetId);
  const [replying, setReplying] = useState(false);
  const { id, resolved, mayResolve, comments } = thread;
  const first = comments[0]?.author.name ?? '';
  return (
    <li className="rounded-md border px-3 py-2" aria-label={`Thread begun by ${first}`}>
      <Place thread={thread} />
      <ul className="divide-y">
        {comments.map((comment) => (
          <CommentView key={comment.id} presetId={presetId} comment={comment} />
        ))}
      </ul>
      {resolved ? (
        <p className="text-sm text-muted">
          Resolved by {resolved.by}, {formatDay(resolved.at)}.
        </p>
      ) : null}
      {replying ? (
        <Composer
          focus
          presetId={presetId}
          label={`Reply to ${first}`}
          action="Reply"
          keptAs={textKey(userId, presetId, id)}
          busy={busy}
          error={error}
          onCancel={() => setReplying(false)}
          onSend={(text, sent) =>
            run(
              () => writeComment(presetId, { text, thread: id }),
              () => {
                sent();
                setReplying(false);
              },
            )
          }
        />
      ) : (
        <p className="flex gap-1">
          {mayComment ? (
            <Button size="small" onClick={() => setReplying(true)}>
              Reply
            </Button>
          ) : null}
          {mayResolve ? (
            <Button
              size="small"
              look="quiet"
              disabled={busy}
              onClick={() => run(() => resolveThread(presetId, id, resolved === null))}
            >
              {resolved ? 'Reopen' : 'Resolve'}
            </Button>
          ) : null}
        </p>
      )}
      {error && !replying ? <FieldMessage>{error}</FieldMessage> : null}
    </li>
  );
}
