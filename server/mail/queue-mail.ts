import { Op, type Transaction } from 'sequelize';

import { MAIL_KIND_NAMES, mailRule, type MailKind } from '@/contract/mail';

import type { Dependencies } from '../dependencies';
import { makeId } from '../ids';
import type { MailContent } from '../models/mail-message';
import { nextStrike } from './digest-time';
import { readMailSettings } from './mail-settings';

export interface NewMail {
  readonly to: string;
  readonly kind: MailKind;
  readonly content: MailContent;
  /** Names the event that it tells of. A second message of the same name is not made. */
  readonly key: string;
  readonly senderId?: string;
  readonly expiresAt?: Date;
  /** Earliest time of sending. */
  readonly notBefore?: Date;
}

/** So many within the stretch go out at once; what follows waits for its end and goes as one. */
const MANY = 3;
const STRETCH = 10 * 60_000;

export const BUNDLED_KINDS = MAIL_KIND_NAMES.filter((kind) => mailRule(kind).bundles);

/**
 * Puts a message into the queue, in the transaction of the change that it tells of: both happen, or neither.
 * Sending begins when that transaction has been committed.
 */
export async function queueMail(
  { database, mailer }: Pick<Dependencies, 'database' | 'mailer'>,
  transaction: Transaction,
  { to, kind, content, key, senderId, expiresAt, notBefore }: NewMail,
): Promise<void> {
  const { MailMessage } = database.models;
  if (await MailMessage.findOne({ where: { idempotencyKey: key }, attributes: ['id'], transaction })) return;
  const now = new Date();
  const earliest = notBefore && notBefore > now ? notBefore : now;
  let dueAt = earliest;
  if (mailRule(kind).bundles) {
    const { timings, digestHour, timeZone } = await readMailSettings(database, to, transaction);
    const lately = await MailMessage.count({
      where: {
        address: to,
        kind: BUNDLED_KINDS,
        createdAt: { [Op.gt]: new Date(now.getTime() - STRETCH) },
        // Reminders that wait for their day are no news of now.
        dueAt: { [Op.lte]: new Date(now.getTime() + STRETCH) },
      },
      transaction,
    });
    if (timings[kind] === 'daily') dueAt = nextStrike(earliest, digestHour, timeZone);
    else if (lately >= MANY && earliest === now) dueAt = new Date(now.getTime() + STRETCH);
  }
  await MailMessage.create(
    {
      id: makeId(),
      idempotencyKey: key,
      kind,
      address: to,
      senderId: senderId ?? null,
      content,
      state: 'waiting',
      dueAt,
      expiresAt: expiresAt ?? null,
      createdAt: now,
    },
    { transaction },
  );
  transaction.afterCommit(() => mailer.wake());
}

/** Takes back what waits and is not being sent, by the beginning of its name. */
export async function withdrawMail(
  { database }: Pick<Dependencies, 'database'>,
  transaction: Transaction,
  keyPrefix: string,
): Promise<void> {
  await database.models.MailMessage.update(
    { state: 'withheld', content: null, settledAt: new Date() },
    {
      where: {
        idempotencyKey: { [Op.gte]: keyPrefix, [Op.lt]: `${keyPrefix}\uffff` },
        state: 'waiting',
        claim: null,
      },
      transaction,
    },
  );
}
