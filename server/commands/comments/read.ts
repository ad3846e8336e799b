import { Op, type Transaction, type WhereOptions } from 'sequelize';

import {
  COMMENT_LIMITS,
  mentionedIn,
  type CommentPage,
  type CommentPerson,
  type CommentQuery,
  type ThreadBody,
} from '@/contract/comments';

import type { Dependencies } from '../../dependencies';
import { refuseNotFound } from '../../errors';
import type { Person } from '../../middleware/current-user';
import type { Comment } from '../../models/comment';
import type { FoundPreset } from '../find-preset';
import { may } from '../../policies/preset-policy';
import { presentThread } from '../../presenters/present-comment';
import { isHeldBack } from './readers';

const PAGE = COMMENT_LIMITS.pageSize;

/** People of the comments, as they are called now. */
async function namesIn(
  { database }: Dependencies,
  comments: readonly Comment[],
): Promise<Map<string, CommentPerson>> {
  const ids = new Set(comments.flatMap(({ authorId, text }) => [authorId, ...mentionedIn(text)]));
  const users = await database.models.User.findAll({
    where: { id: { [Op.in]: [...ids] } },
    attributes: ['id', 'name'],
  });
  return new Map(users.map(({ id, name }) => [id, { id, name }]));
}

export function mayResolve(person: Person, preset: FoundPreset, first: Comment): boolean {
  return may(person, 'comment', preset) && (first.authorId === person.id || may(person, 'save', preset));
}

async function presentThreads(
  dependencies: Dependencies,
  person: Person,
  preset: FoundPreset,
  firsts: readonly Comment[],
): Promise<ThreadBody[]> {
  const replies = await dependencies.database.models.Comment.findAll({
    where: { threadId: { [Op.in]: firsts.map(({ id }) => id) } },
    order: [['createdAt', 'ASC']],
  });
  const names = await namesIn(dependencies, [...firsts, ...replies]);
  return firsts.map((first) =>
    presentThread(
      person,
      [first, ...replies.filter(({ threadId }) => threadId === first.id)],
      names,
      mayResolve(person, preset, first),
    ),
  );
}

/** A page of threads, newest first; nothing of them while they could tell the answer to a sweep. */
export async function listComments(
  dependencies: Dependencies,
  person: Person,
  preset: FoundPreset,
  { state, thread, page }: CommentQuery,
): Promise<CommentPage> {
  const { Comment } = dependencies.database.models;
  if (await isHeldBack(dependencies, person, preset))
    return { items: [], total: 0, page, pageSize: PAGE, open: 0, resolved: 0, held: true };
  const where = (resolved: boolean | null): WhereOptions => ({
    presetId: preset.id,
    threadId: null,
    ...(resolved === null ? {} : { resolvedAt: resolved ? { [Op.ne]: null } : null }),
  });
  const wanted = where(state === 'all' ? null : state === 'resolved');
  const [found, open, resolved] = await Promise.all([
    Comment.findAndCountAll({
      where: thread === undefined ? wanted : { ...where(null), id: thread },
      order: [['createdAt', 'DESC']],
      limit: PAGE,
      offset: (page - 1) * PAGE,
    }),
    Comment.count({ where: where(false) }),
    Comment.count({ where: where(true) }),
  ]);
  const items = await presentThreads(dependencies, person, preset, found.rows);
  return { items, total: found.count, page, pageSize: PAGE, open, resolved, held: false };
}

export async function findComment(
  { database }: Dependencies,
  presetId: string,
  id: string,
  transaction?: Transaction,
): Promise<Comment> {
  const comment = await database.models.Comment.findOne({
    where: { id, presetId },
    ...(transaction ? { transaction } : {}),
  });
  if (comment === null) throw refuseNotFound('This comment is gone: it was deleted meanwhile.');
  return comment;
}

export async function readThread(
  dependencies: Dependencies,
  person: Person,
  preset: FoundPreset,
  threadId: string,
): Promise<ThreadBody> {
  const first = await findComment(dependencies, preset.id, threadId);
  const [thread] = await presentThreads(dependencies, person, preset, [first]);
  if (thread === undefined) throw refuseNotFound();
  return thread;
}
