import type { Transaction } from 'sequelize';
import type { z } from 'zod';

import { COMMENT_LIMITS, mentionedIn, type writeCommentSchema } from '@/contract/comments';

import { recordAudit } from '../../audit/record-audit';
import type { Dependencies } from '../../dependencies';
import { Refusal, refuseInvalid, refuseNotAllowed } from '../../errors';
import { makeId } from '../../ids';
import { forgetComment, tellComment } from '../../mail/tell-comment';
import type { Person } from '../../middleware/current-user';
import { demand } from '../../policies/preset-policy';
import { findPreset, findVersion, type FoundPreset } from '../find-preset';
import { findComment, mayResolve } from './read';
import { commentersAmong, isHeldBack } from './readers';

/** The preset, if the person may comment on it as things stand. */
async function commentable(
  dependencies: Dependencies,
  transaction: Transaction,
  person: Person,
  presetId: string,
): Promise<FoundPreset> {
  const preset = await findPreset(dependencies, presetId, transaction);
  demand(person, 'comment', preset);
  if (await isHeldBack(dependencies, person, preset, transaction))
    throw refuseNotAllowed(
      'A sweep from this preset is set for you. Its comments open when your work has been reviewed.',
    );
  return preset;
}

/** Only those can be mentioned who may read the comment; whoever was mentioned before stays. */
async function demandMentions(
  dependencies: Dependencies,
  transaction: Transaction,
  preset: FoundPreset,
  text: string,
  before = '',
): Promise<void> {
  const ids = mentionedIn(text);
  if (ids.length > COMMENT_LIMITS.mentions)
    throw refuseInvalid({ text: `A comment mentions at most ${COMMENT_LIMITS.mentions} people.` });
  const kept = new Set(mentionedIn(before));
  const added = ids.filter((id) => !kept.has(id));
  const readers = await commentersAmong(dependencies, preset, added, transaction);
  if (readers.length < added.length)
    throw refuseInvalid({ text: 'Someone mentioned here cannot see this preset. Take the mention out.' });
}

/** Adds a comment; returns its thread. */
export function writeComment(
  dependencies: Dependencies,
  person: Person,
  presetId: string,
  { text, thread, version, pin }: z.output<typeof writeCommentSchema>,
): Promise<string> {
  const { Comment } = dependencies.database.models;
  return dependencies.database.change(async (transaction) => {
    const preset = await commentable(dependencies, transaction, person, presetId);
    if (version !== null) await findVersion(dependencies, presetId, version, transaction);
    if (thread !== null) {
      const first = await findComment(dependencies, presetId, thread, transaction);
      if (first.threadId !== null)
        throw refuseInvalid({ thread: 'A reply belongs to the first comment of a thread.' });
      if (
        (await Comment.count({ where: { threadId: thread }, transaction })) >= COMMENT_LIMITS.repliesInThread
      )
        throw new Refusal(409, 'conflict', 'This thread is full. Begin a new one.');
    }
    await demandMentions(dependencies, transaction, preset, text);
    const { id: authorId, name: authorName } = person;
    const comment = await Comment.create(
      {
        id: makeId(),
        presetId,
        threadId: thread,
        authorId,
        authorName,
        text,
        version,
        pin,
        createdAt: new Date(),
      },
      { transaction },
    );
    await tellComment(dependencies, transaction, preset, comment);
    return thread ?? comment.id;
  });
}

async function findOwn(
  dependencies: Dependencies,
  transaction: Transaction,
  person: Person,
  presetId: string,
  id: string,
) {
  const preset = await commentable(dependencies, transaction, person, presetId);
  const comment = await findComment(dependencies, presetId, id, transaction);
  if (comment.authorId !== person.id)
    throw refuseNotAllowed('Only whoever wrote a comment can change or delete it. Reply to it instead.');
  return { preset, comment };
}

/** Changes what one wrote; returns its thread. */
export function editComment(
  dependencies: Dependencies,
  person: Person,
  presetId: string,
  id: string,
  { text, revision }: { text: string; revision: number },
): Promise<string> {
  return dependencies.database.change(async (transaction) => {
    const { preset, comment } = await findOwn(dependencies, transaction, person, presetId, id);
    if (comment.deletedAt !== null || comment.revision !== revision)
      throw new Refusal(
        409,
        'conflict',
        'This comment was changed meanwhile, in another window perhaps, so nothing was saved. ' +
          'Look at it as it is now, then edit it again.',
      );
    await demandMentions(dependencies, transaction, preset, text, comment.text);
    await comment.update({ text, revision: revision + 1, editedAt: new Date() }, { transaction });
    await tellComment(dependencies, transaction, preset, comment);
    return comment.threadId ?? comment.id;
  });
}

/** Takes away a thread's last comments as far as they have been deleted; what is replied to stays as a gap. */
async function dropTail(
  { database }: Dependencies,
  transaction: Transaction,
  threadId: string,
): Promise<void> {
  const { Comment } = database.models;
  const first = await Comment.findByPk(threadId, { transaction });
  if (first === null) return;
  const replies = await Comment.findAll({ where: { threadId }, order: [['createdAt', 'DESC']], transaction });
  for (const comment of [...replies, first]) {
    if (comment.deletedAt === null) return;
    await comment.destroy({ transaction });
  }
}

export function deleteComment(
  dependencies: Dependencies,
  person: Person,
  presetId: string,
  id: string,
): Promise<void> {
  return dependencies.database.change(async (transaction) => {
    const { preset, comment } = await findOwn(dependencies, transaction, person, presetId, id);
    if (comment.deletedAt !== null) return;
    const thread = comment.threadId ?? comment.id;
    await comment.update(
      { text: '', deletedAt: new Date(), revision: comment.revision + 1 },
      { transaction },
    );
    await dropTail(dependencies, transaction, thread);
    await forgetComment(dependencies, transaction, id);
    await recordAudit(dependencies.database, transaction, {
      actor: person,
      action: 'comment deleted',
      labId: preset.labId,
      subject: preset.title,
      details: { preset: presetId, comment: id, thread },
    });
  });
}

/** Resolves a thread or opens it again; asked for what is so already, nothing happens. */
export function resolveThread(
  dependencies: Dependencies,
  person: Person,
  presetId: string,
  id: string,
  resolved: boolean,
): Promise<string> {
  return dependencies.database.change(async (transaction) => {
    const preset = await commentable(dependencies, transaction, person, presetId);
    const first = await findComment(dependencies, presetId, id, transaction);
    if (first.threadId !== null)
      throw refuseInvalid({ resolved: 'A thread is resolved at its first comment.' });
    if (!mayResolve(person, preset, first))
      throw refuseNotAllowed(
        'A thread is resolved by whoever began it or by those who may save this preset. Say in a reply that it is settled.',
      );
    if ((first.resolvedAt !== null) === resolved) return id;
    await first.update(
      { resolvedAt: resolved ? new Date() : null, resolvedByName: resolved ? person.name : null },
      { transaction },
    );
    await recordAudit(dependencies.database, transaction, {
      actor: person,
      action: resolved ? 'comment resolved' : 'comment reopened',
      labId: preset.labId,
      subject: preset.title,
      details: { preset: presetId, thread: id },
    });
    return id;
  });
}
