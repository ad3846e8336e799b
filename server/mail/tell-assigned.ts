import { Op, type Transaction } from 'sequelize';

import { rolesThatMay } from '@/contract/rights';

import type { Dependencies } from '../dependencies';
import { makeId } from '../ids';
import type { AssignedSweep } from '../models/assigned-sweep';
import type { HandIn } from '../models/hand-in';
import type { Outcome } from '../models/review';
import {
  dueSoonMessage,
  handedInMessage,
  receiptMessage,
  reviewedMessage,
  setForYouMessage,
} from './assigned-messages';
import { queueMail, withdrawMail } from './queue-mail';

const A_DAY = 24 * 60 * 60_000;

const about = ({ id, title, lab, dueAt, timeZone }: AssignedSweep) => ({
  id,
  title,
  labName: lab?.name ?? '',
  dueAt,
  timeZone,
});

const reminderPrefix = (assignedId: string, userId: string) => `due soon ${assignedId} ${userId} `;

/** Those of these people who are members of the lab now, with their addresses. */
async function membersAmong(
  { database }: Dependencies,
  transaction: Transaction,
  labId: string,
  userIds: readonly string[],
) {
  const memberships = await database.models.Membership.findAll({
    where: { labId, userId: { [Op.in]: [...userIds] } },
    include: [{ association: 'user' }],
    transaction,
  });
  return memberships.flatMap(({ user }) => (user ? [user] : []));
}

/** A reminder a day before it is due, in place of any before; none where that day has begun. */
export async function remind(
  dependencies: Dependencies,
  transaction: Transaction,
  assigned: AssignedSweep,
  userIds: readonly string[],
): Promise<void> {
  const { dueAt } = assigned;
  for (const user of await membersAmong(dependencies, transaction, assigned.labId, userIds)) {
    const prefix = reminderPrefix(assigned.id, user.id);
    await withdrawMail(dependencies, transaction, prefix);
    if (dueAt === null || dueAt.getTime() - A_DAY <= Date.now()) continue;
    await queueMail(dependencies, transaction, {
      to: user.email,
      kind: 'assigned',
      content: dueSoonMessage(user.name, about(assigned), dependencies.settings.publicUrl),
      key: `${prefix}${makeId()}`,
      notBefore: new Date(dueAt.getTime() - A_DAY),
      expiresAt: dueAt,
    });
  }
}

export const forgetReminder = (
  dependencies: Dependencies,
  transaction: Transaction,
  assignedId: string,
  userId: string,
) => withdrawMail(dependencies, transaction, reminderPrefix(assignedId, userId));

export const forgetReminders = (dependencies: Dependencies, transaction: Transaction, assignedId: string) =>
  withdrawMail(dependencies, transaction, `due soon ${assignedId} `);

/** For someone who leaves a lab: nothing there waits for them any more. */
export async function forgetRemindersIn(
  dependencies: Dependencies,
  transaction: Transaction,
  labId: string,
  userId: string,
): Promise<void> {
  const places = await dependencies.database.models.AssignedPerson.findAll({
    where: { userId },
    include: [{ association: 'assigned', attributes: ['id'], where: { labId }, required: true }],
    transaction,
  });
  for (const { assignedId } of places) await forgetReminder(dependencies, transaction, assignedId, userId);
}

/** Tells people that a sweep is for them, once each. */
export async function tellSet(
  dependencies: Dependencies,
  transaction: Transaction,
  assigned: AssignedSweep,
  by: string,
  userIds: readonly string[],
): Promise<void> {
  for (const user of await membersAmong(dependencies, transaction, assigned.labId, userIds)) {
    await queueMail(dependencies, transaction, {
      to: user.email,
      kind: 'assigned',
      content: setForYouMessage(user.name, by, about(assigned), dependencies.settings.publicUrl),
      key: `sweep set ${assigned.id} ${user.id} ${assigned.openedAt?.getTime() ?? 0}`,
    });
  }
}

/** A receipt to whoever handed in, and news to those who review. */
export async function tellHandedIn(
  dependencies: Dependencies,
  transaction: Transaction,
  assigned: AssignedSweep,
  handIn: HandIn,
  email: string,
): Promise<void> {
  const { database, settings } = dependencies;
  const { id, number, code, late, name } = handIn;
  await queueMail(dependencies, transaction, {
    to: email,
    kind: 'receipts',
    content: receiptMessage(
      name,
      about(assigned),
      { number, code, late, at: handIn.handedInAt },
      settings.publicUrl,
    ),
    key: `receipt ${id}`,
  });
  const reviewers = await database.models.Membership.findAll({
    where: { labId: assigned.labId, role: [...rolesThatMay('review hand-ins')] },
    include: [{ association: 'user' }],
    transaction,
  });
  for (const { user } of reviewers) {
    if (!user) continue;
    await queueMail(dependencies, transaction, {
      to: user.email,
      kind: 'hand-ins',
      content: handedInMessage(
        user.name,
        about(assigned),
        { who: name, number, late, handInId: id },
        settings.publicUrl,
      ),
      key: `handed in ${id} ${user.id}`,
    });
  }
}

/** Tells someone what became of what they handed in. */
export async function tellReviewed(
  dependencies: Dependencies,
  transaction: Transaction,
  assigned: AssignedSweep,
  handIn: HandIn,
  review: { outcome: Outcome; note: string; revision: number; by: string },
): Promise<void> {
  for (const user of await membersAmong(dependencies, transaction, assigned.labId, [handIn.userId])) {
    await queueMail(dependencies, transaction, {
      to: user.email,
      kind: 'assigned',
      content: reviewedMessage(user.name, about(assigned), review, dependencies.settings.publicUrl),
      key: `reviewed ${handIn.id} ${review.revision}`,
    });
  }
}
