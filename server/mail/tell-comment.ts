import type { Transaction } from 'sequelize';

import { mentionedIn } from '@/contract/comments';

import { commentersAmong, isHeldBack } from '../commands/comments/readers';
import type { Dependencies } from '../dependencies';
import type { Comment } from '../models/comment';
import type { MailContent } from '../models/mail-message';
import type { FoundPreset } from '../commands/find-preset';
import { queueMail, withdrawMail } from './queue-mail';

const EXCERPT = 600;

interface CommentWords {
  readonly by: string;
  readonly title: string;
  readonly text: string;
  readonly mentioned: boolean;
  readonly url: string;
}

function commentMessage(name: string, { by, title, text, mentioned, url }: CommentWords): MailContent {
  const did = mentioned ? 'mentions you in a comment on' : 'replied in a thread of yours on';
  return {
    subject: `${by} ${did} ${title}`,
    name,
    passages: [
      { text: `${by} ${did} “${title}”:` },
      { text: text.length > EXCERPT ? `${text.slice(0, EXCERPT)}…` : text },
      { label: 'Open the comment', url },
    ],
  };
}

const keyPrefix = (commentId: string) => `comment ${commentId} `;

/** The text with names where people are mentioned. */
async function inWords({ database }: Dependencies, transaction: Transaction, text: string): Promise<string> {
  const users = await database.models.User.findAll({
    where: { id: mentionedIn(text) },
    attributes: ['id', 'name'],
    transaction,
  });
  return users.reduce((words, { id, name }) => words.replaceAll(`@{${id}}`, `@${name}`), text);
}

/** Mails a comment to those it mentions and to those who wrote in its thread, once each, if they may read it now. */
export async function tellComment(
  dependencies: Dependencies,
  transaction: Transaction,
  preset: FoundPreset,
  comment: Comment,
): Promise<void> {
  const { database, settings } = dependencies;
  const mentioned = new Set(mentionedIn(comment.text));
  const { threadId } = comment;
  const writers =
    threadId === null
      ? []
      : [
          ...(await database.models.Comment.findAll({
            where: { threadId },
            attributes: ['authorId'],
            transaction,
          })),
          ...(await database.models.Comment.findAll({
            where: { id: threadId },
            attributes: ['authorId'],
            transaction,
          })),
        ].map(({ authorId }) => authorId);
  const ids = new Set([...mentioned, ...writers]);
  ids.delete(comment.authorId);
  const readers = await commentersAmong(dependencies, preset, [...ids], transaction);
  if (readers.length === 0) return;
  const text = await inWords(dependencies, transaction, comment.text);
  const thread = threadId ?? comment.id;
  const url = `${settings.publicUrl}/presets/${encodeURIComponent(preset.id)}?comment=${encodeURIComponent(thread)}`;
  for (const reader of readers) {
    if (await isHeldBack(dependencies, reader, preset, transaction)) continue;
    await queueMail(dependencies, transaction, {
      to: reader.email,
      kind: 'comments',
      content: commentMessage(reader.name, {
        by: comment.authorName,
        title: preset.title,
        text,
        mentioned: mentioned.has(reader.id),
        url,
      }),
      key: `${keyPrefix(comment.id)}${reader.id}`,
      senderId: comment.authorId,
    });
  }
}

/** Takes mail of a comment back that has not gone out yet. */
export const forgetComment = (dependencies: Dependencies, transaction: Transaction, commentId: string) =>
  withdrawMail(dependencies, transaction, keyPrefix(commentId));
