import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { Markdown } from '@/components/markdown/markdown';
import { Button } from '@/components/ui/button';
import type { CommentBody } from '@/contract/comments';
import { formatDayAndTime } from '@/lib/format';

import { deleteComment, editComment } from './api/comment-operations';
import { Composer } from './composer';
import { textKey } from './kept-text';
import { boldName, withNames } from './mention-text';
import { useCommentChanges } from './use-comment-changes';

interface CommentViewProps {
  readonly presetId: string;
  readonly comment: CommentBody;
}

function Own({
  comment,
  busy,
  onEdit,
  onDelete,
}: {
  readonly comment: CommentBody;
  readonly busy: boolean;
  readonly onEdit: () => void;
  readonly onDelete: () => void;
}) {
  const [asked, setAsked] = useState(false);
  if (!comment.mine || comment.deleted) return null;
  return asked ? (
    <p className="flex flex-wrap items-center gap-2 text-sm">
      Delete this comment for good?
      <Button size="small" look="caution" disabled={busy} onClick={onDelete}>
        Delete it
      </Button>
      <Button size="small" look="quiet" onClick={() => setAsked(false)}>
        Keep it
      </Button>
    </p>
  ) : (
    <p className="flex gap-1">
      <Button size="small" look="quiet" onClick={onEdit}>
        Edit
      </Button>
      <Button size="small" look="quiet" onClick={() => setAsked(true)}>
        Delete
      </Button>
    </p>
  );
}

/** One comment: who, when, what; its writer may change or delete it. */
export function CommentView({ presetId, comment }: CommentViewProps) {
  const { run, busy, error } = useCommentChanges(presetId);
  const [editing, setEditing] = useState(false);
  const { id, author, text, mentions, createdAt, editedAt, deleted, revision } = comment;
  return (
    <li className="grid gap-1 py-2">
      <p className="text-sm">
        <strong className="font-semibold">{author.name}</strong>{' '}
        <span className="text-muted">
          {formatDayAndTime(createdAt)}
          {editedAt && !deleted ? ', edited' : ''}
        </span>
      </p>
      {deleted ? (
        <p className="text-muted">This comment was deleted.</p>
      ) : editing ? (
        <Composer
          focus
          presetId={presetId}
          label="Edit the comment"
          action="Save"
          keptAs={textKey(author.id, presetId, `edit.${id}.${revision}`)}
          initial={withNames(text, mentions)}
          mentioned={mentions}
          busy={busy}
          error={error}
          onCancel={() => setEditing(false)}
          onSend={(next, sent) =>
            run(
              () => editComment(presetId, id, { text: next, revision }),
              () => {
                sent();
                setEditing(false);
              },
            )
          }
        />
      ) : (
        <>
          <div className="min-w-0 break-words">
            <Markdown text={withNames(text, mentions, boldName)} />
          </div>
          <Own
            comment={comment}
            busy={busy}
            onEdit={() => setEditing(true)}
            onDelete={() => run(() => deleteComment(presetId, id))}
          />
          {error ? <FieldMessage>{error}</FieldMessage> : null}
        </>
      )}
    </li>
  );
}
