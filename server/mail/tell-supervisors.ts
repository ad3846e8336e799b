import type { Transaction } from 'sequelize';

import { rolesThatMay } from '@/contract/rights';

import type { Dependencies } from '../dependencies';
import { peopleMessage } from './lab-messages';
import { queueMail } from './queue-mail';

/** Mails news of people to everyone who may change roles in a lab, except the one it is about. */
export async function tellSupervisors(
  dependencies: Dependencies,
  transaction: Transaction,
  lab: { id: string; name: string },
  news: { key: string; words: string; exceptId?: string },
): Promise<void> {
  const { database, settings } = dependencies;
  const supervisors = await database.models.Membership.findAll({
    where: { labId: lab.id, role: [...rolesThatMay('change roles')] },
    include: [{ association: 'user' }],
    transaction,
  });
  for (const { userId, user } of supervisors) {
    if (user === undefined || userId === news.exceptId) continue;
    await queueMail(dependencies, transaction, {
      to: user.email,
      kind: 'people',
      content: peopleMessage(user.name, lab, news.words, settings.publicUrl),
      key: `${news.key} ${userId}`,
    });
  }
}
