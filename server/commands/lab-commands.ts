import { MOST_LABS } from '@/contract/labs';

import { recordAudit } from '../audit/record-audit';
import type { Dependencies } from '../dependencies';
import { Refusal } from '../errors';
import { makeId } from '../ids';
import type { Person } from '../middleware/current-user';
import { demandInLabNow } from '../policies/lab-policy';

export const refuseTooManyLabs = () =>
  new Refusal(409, 'conflict', `One person is in at most ${MOST_LABS} labs. Leave one first.`);

/** A new lab, supervised by whoever makes it. */
export async function createLab({ database }: Dependencies, person: Person, name: string): Promise<string> {
  const { Lab, Membership } = database.models;
  const id = makeId();
  const now = new Date();
  await database.change(async (transaction) => {
    if ((await Membership.count({ where: { userId: person.id }, transaction })) >= MOST_LABS)
      throw refuseTooManyLabs();
    await Lab.create({ id, name, createdAt: now }, { transaction });
    await Membership.create(
      { userId: person.id, labId: id, role: 'supervisor', joinedAt: now },
      { transaction },
    );
    await recordAudit(database, transaction, {
      actor: person,
      action: 'lab created',
      labId: id,
      subject: name,
      details: {},
    });
  });
  return id;
}

export async function renameLab(
  { database }: Dependencies,
  person: Person,
  labId: string,
  name: string,
): Promise<void> {
  await database.change(async (transaction) => {
    await demandInLabNow(database, transaction, person.id, 'rename the lab', labId);
    const lab = await database.models.Lab.findByPk(labId, { transaction });
    if (lab?.name === name) return;
    await database.models.Lab.update({ name }, { where: { id: labId }, transaction });
    await recordAudit(database, transaction, {
      actor: person,
      action: 'lab renamed',
      labId,
      subject: name,
      details: { from: lab?.name ?? '' },
    });
  });
}
