import { Op, type Transaction } from 'sequelize';

import { FORMER_MEMBER, type DeletionBody } from '@/contract/account-deletion';

import { recordAudit } from '../audit/record-audit';
import type { Dependencies } from '../dependencies';
import { Refusal, refuseInvalid, refuseNotAllowed } from '../errors';
import { makeId, makeToken } from '../ids';
import { accountDeletedMessage } from '../mail/messages';
import { queueMail } from '../mail/queue-mail';
import { tellSupervisors } from '../mail/tell-supervisors';
import type { Person } from '../middleware/current-user';
import { obstacleToGivingUp } from '../policies/lab-policy';

const within = (transaction?: Transaction) => (transaction ? { transaction } : {});

/** The labs of a person: whether they are alone there, and what stands in the way of their going. */
async function labsOf({ database }: Dependencies, person: Person, transaction?: Transaction) {
  const { Membership } = database.models;
  return Promise.all(
    person.memberships.map(async ({ labId, labName, role }) => {
      const members = await Membership.count({ where: { labId }, ...within(transaction) });
      const alone = members === 1;
      const obstacle = alone
        ? null
        : await obstacleToGivingUp(database, { labId, role, name: person.name }, transaction);
      return { labId, name: labName, alone, obstacle };
    }),
  );
}

/** What deleting the account brings, in numbers and in words. */
export async function describeDeletion(dependencies: Dependencies, person: Person): Promise<DeletionBody> {
  const { Preset, ShareLink, HandIn, Comment } = dependencies.database.models;
  const labs = await labsOf(dependencies, person);
  const own = { ownerId: person.id, deletedAt: null };
  return {
    privatePresets: await Preset.count({ where: { ...own, visibility: 'private' } }),
    labPresets: await Preset.count({ where: { ...own, visibility: 'lab' } }),
    links: await ShareLink.count({ where: { createdById: person.id, revokedAt: null } }),
    handIns: await HandIn.count({ where: { userId: person.id } }),
    comments: await Comment.count({ where: { authorId: person.id, deletedAt: null } }),
    labs: labs.map(({ name, alone }) => ({ name, alone })),
    obstacles: [
      ...(person.demo ? ['Invented people of the demo stay: others sign in as them.'] : []),
      ...labs.flatMap(({ name, obstacle }) => (obstacle === null ? [] : [`${name}: ${obstacle}`])),
    ],
  };
}

/**
 * Deletes an account. Its row stays as an empty place, so that versions, hand-ins and the history of labs keep
 * their author: without address and password nobody signs in by it again, and the address is free.
 */
export async function deleteAccount(
  dependencies: Dependencies,
  person: Person,
  { password, anonymous }: { password: string; anonymous: boolean },
): Promise<void> {
  const { database, passwords } = dependencies;
  if (person.demo) throw refuseNotAllowed('Invented people of the demo stay: others sign in as them.');
  const { models } = database;
  const user = await models.User.findByPk(person.id);
  if (user === null || !(await passwords.verify(user.passwordHash, password)))
    throw refuseInvalid({ password: 'This is not your password.' });
  const passwordHash = await passwords.hash(makeToken());
  await database.change(async (transaction) => {
    const labs = await labsOf(dependencies, person, transaction);
    const obstacles = labs.flatMap(({ obstacle }) => (obstacle === null ? [] : [obstacle]));
    if (obstacles.length > 0) throw new Refusal(409, 'conflict', obstacles.join(' '));
    const now = new Date();
    const { id, name, email } = person;
    await models.Preset.update(
      { deletedAt: now },
      { where: { ownerId: id, visibility: 'private', deletedAt: null }, transaction },
    );
    await models.ShareLink.update(
      { revokedAt: now },
      { where: { createdById: id, revokedAt: null }, transaction },
    );
    for (const lab of labs) {
      await models.Membership.destroy({ where: { userId: id, labId: lab.labId }, transaction });
      await recordAudit(database, transaction, {
        actor: person,
        action: 'account deleted',
        labId: lab.labId,
        subject: name,
        details: { member: id },
      });
      await tellSupervisors(
        dependencies,
        transaction,
        { id: lab.labId, name: lab.name },
        {
          key: `account deleted ${id} ${lab.labId}`,
          words: `${name} deleted their account and left ${lab.name}`,
        },
      );
    }
    await recordAudit(database, transaction, {
      actor: person,
      action: 'account deleted',
      labId: null,
      subject: '',
      details: { anonymous: anonymous ? 'yes' : 'no' },
    });
    await models.SessionRecord.destroy({ where: { userId: id }, transaction });
    await models.PasswordReset.destroy({ where: { userId: id }, transaction });
    await models.MailSettings.destroy({ where: { address: email }, transaction });
    await models.MailMessage.update(
      { state: 'withheld', content: null, settledAt: now },
      { where: { address: email, state: 'waiting', claim: null }, transaction },
    );
    await queueMail(dependencies, transaction, {
      to: email,
      kind: 'account',
      content: accountDeletedMessage(name),
      key: `account deleted ${id} ${makeId()}`,
    });
    const left = anonymous ? FORMER_MEMBER : name;
    await models.User.update(
      {
        name: left,
        email: `deleted-${id.toLowerCase()}-${makeId().toLowerCase()}@account.invalid`,
        passwordHash,
      },
      { where: { id }, transaction },
    );
    if (!anonymous) return;
    await models.Comment.update({ authorName: left }, { where: { authorId: id }, transaction });
    await models.AssignedPerson.update({ name: left }, { where: { userId: id }, transaction });
    await models.AssignedSweep.update({ setByName: left }, { where: { setById: id }, transaction });
    await models.Review.update({ byName: left }, { where: { byId: { [Op.eq]: id } }, transaction });
  });
}
