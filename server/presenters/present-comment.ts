import { mentionedIn, type CommentBody, type CommentPerson, type ThreadBody } from '@/contract/comments';

import type { Person } from '../middleware/current-user';
import type { Comment } from '../models/comment';

type Names = ReadonlyMap<string, CommentPerson>;

function presentComment(person: Person, comment: Comment, names: Names): CommentBody {
  const { id, revision, authorId, authorName, text, createdAt, editedAt, deletedAt } = comment;
  return {
    id,
    revision,
    author: names.get(authorId) ?? { id: authorId, name: authorName },
    text,
    mentions: mentionedIn(text).flatMap((one) => names.get(one) ?? []),
    createdAt: createdAt.toISOString(),
    editedAt: editedAt?.toISOString() ?? null,
    deleted: deletedAt !== null,
    mine: authorId === person.id,
  };
}

/** A thread of its first comment and the replies to it. */
export function presentThread(
  person: Person,
  [first, ...replies]: readonly [Comment, ...Comment[]],
  names: Names,
  mayResolve: boolean,
): ThreadBody {
  const { id, version, pin, resolvedAt, resolvedByName } = first;
  return {
    id,
    version,
    pin,
    resolved: resolvedAt === null ? null : { at: resolvedAt.toISOString(), by: resolvedByName ?? '' },
    mayResolve,
    comments: [first, ...replies].map((comment) => presentComment(person, comment, names)),
  };
}
