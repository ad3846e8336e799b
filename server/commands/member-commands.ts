import type { Transaction } from 'sequelize';

import type { DepartureBody } from '@/contract/labs';
import { rolesThatMay, type Role } from '@/contract/rights';

import { recordAudit } from '../audit/record-audit';
import type { Dependencies } from '../dependencies';
import { refuseNotFound } from '../errors';
import { makeId } from '../ids';
import { removedMessage, roleChangedMessage } from '../mail/lab-messages';
import { queueMail } from '../mail/queue-mail';
import { forgetRemindersIn } from '../mail/tell-assigned';
import { tellSupervisors } from '../mail/tell-supervisors';
import type { Person } from '../middleware/current-user';
import type { Database } from '../models/database';
import { demandInLabNow, obstacleToGivingUp, refuseObstacle } from '../policies/lab-policy';
import { keepCopies, presetsToKeep } from './keep-copies';

async function findMember({ models }: Database, labId: string, userId: string, transaction?: Transaction) {
  const membership = await models.Membership.findOne({
    where: { labId, userId },
    include: [{ association: 'user' }, { association: 'lab' }],
    ...(transaction ? { transaction } : {}),
  });
  if (membership?.user === undefined || membership.lab === undefined)
    throw refuseNotFound('There is no such member in this lab; they may have left.');
  const { user, lab, role } = membership;
  return { user, lab, role, labId, name: user.name };
}

/** Gives a member another role; refused where nobody would be left to hand out roles. */
export async function changeRole(
  dependencies: Dependencies,
  person: Person,
  labId: string,
  userId: string,
  role: Role,
): Promise<void> {
  const { database, settings } = dependencies;
  await database.change(async (transaction) => {
    await demandInLabNow(database, transaction, person.id, 'change roles', labId);
    const member = await findMember(database, labId, userId, transaction);
    if (member.role === role) return;
    if (!rolesThatMay('change roles').includes(role))
      refuseObstacle(await obstacleToGivingUp(database, member, transaction));
    await database.models.Membership.update({ role }, { where: { labId, userId }, transaction });
    await recordAudit(database, transaction, {
      actor: person,
      action: 'role changed',
      labId,
      subject: member.name,
      details: { member: userId, from: member.role, to: role },
    });
    if (userId === person.id) return;
    await queueMail(dependencies, transaction, {
      to: member.user.email,
      kind: 'membership',
      content: roleChangedMessage(member.name, member.lab, person.name, role, settings.publicUrl),
      key: `role changed ${makeId()}`,
    });
  });
}

/** What leaving or removal brings, to be said before it. */
export async function describeDeparture(
  { database }: Dependencies,
  labId: string,
  userId: string,
): Promise<DepartureBody> {
  const member = await findMember(database, labId, userId);
  const presets = await database.models.Preset.count({ where: presetsToKeep(labId, userId) });
  return { name: member.name, presets, obstacle: await obstacleToGivingUp(database, member) };
}

/** Takes a member out of a lab: oneself by leaving, others by the right to. Their presets in the lab stay there. */
export async function endMembership(
  dependencies: Dependencies,
  person: Person,
  labId: string,
  userId: string,
): Promise<void> {
  const { database } = dependencies;
  const leaving = userId === person.id;
  await database.change(async (transaction) => {
    const right = leaving ? 'leave the lab' : 'remove members';
    await demandInLabNow(database, transaction, person.id, right, labId);
    const member = await findMember(database, labId, userId, transaction);
    refuseObstacle(await obstacleToGivingUp(database, member, transaction));
    const copies = await keepCopies(dependencies, transaction, member.user, member.lab);
    await database.models.Membership.destroy({ where: { labId, userId }, transaction });
    await forgetRemindersIn(dependencies, transaction, labId, userId);
    await recordAudit(database, transaction, {
      actor: person,
      action: leaving ? 'member left' : 'member removed',
      labId,
      subject: member.name,
      details: { member: userId, role: member.role, presetsKept: copies },
    });
    const key = `departure ${makeId()}`;
    if (leaving) {
      const words = `${member.name} left ${member.lab.name}`;
      await tellSupervisors(dependencies, transaction, member.lab, { key, words });
      return;
    }
    await queueMail(dependencies, transaction, {
      to: member.user.email,
      kind: 'membership',
      content: removedMessage(member.name, member.lab.name, person.name, copies),
      key,
    });
  });
}
