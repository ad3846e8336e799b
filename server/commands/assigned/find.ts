import type { Transaction } from 'sequelize';

import { roleMay, type LabRight } from '@/contract/rights';

import type { Dependencies } from '../../dependencies';
import { Refusal, refuseNotAllowed, refuseNotFound } from '../../errors';
import type { Person } from '../../middleware/current-user';
import type { AssignedPerson } from '../../models/assigned-person';
import type { AssignedSweep } from '../../models/assigned-sweep';
import { demandInLab, demandInLabNow } from '../../policies/lab-policy';

const within = (transaction?: Transaction) => (transaction ? { transaction } : {});

/** An assigned sweep for those who hold a right in its lab; in a lab that one is not in it does not exist. */
export async function findForLab(
  { database }: Dependencies,
  person: Person,
  id: string,
  right: LabRight,
  transaction?: Transaction,
): Promise<AssignedSweep> {
  const assigned = await database.models.AssignedSweep.findOne({
    where: { id },
    include: [{ association: 'lab' }],
    ...within(transaction),
  });
  if (assigned === null) throw refuseNotFound();
  if (transaction) await demandInLabNow(database, transaction, person.id, right, assigned.labId);
  else demandInLab(person, right, assigned.labId);
  return assigned;
}

export interface Assignee {
  readonly assigned: AssignedSweep;
  readonly place: AssignedPerson;
}

/**
 * An assigned sweep for someone whom it is for. To others of the lab it does not exist, drafts not even to them;
 * whoever sets sweeps is sent to the page where its reference stands.
 */
export async function findForAssignee(
  { database }: Dependencies,
  person: Person,
  id: string,
  transaction?: Transaction,
): Promise<Assignee> {
  const { AssignedSweep, AssignedPerson, Membership } = database.models;
  const assigned = await AssignedSweep.findOne({
    where: { id },
    include: [{ association: 'lab' }],
    ...within(transaction),
  });
  if (assigned === null) throw refuseNotFound();
  const where = { userId: person.id, labId: assigned.labId };
  const member = await Membership.findOne({ where, ...within(transaction) });
  if (member === null) throw refuseNotFound();
  if (!roleMay(member.role, 'do assigned sweeps'))
    throw refuseNotAllowed('Those who set sweeps see the reference, so they hand nothing in.');
  const place = await AssignedPerson.findOne({
    where: { assignedId: id, userId: person.id },
    ...within(transaction),
  });
  if (place === null || assigned.state === 'draft') throw refuseNotFound();
  return { assigned, place };
}

/** The sweep as it is asked to be changed from; refused when it was changed meanwhile. */
export function demandRevision(assigned: AssignedSweep, baseRevision: number): void {
  if (assigned.revision !== baseRevision)
    throw new Refusal(
      409,
      'conflict',
      'This assigned sweep was changed in another window, so nothing was changed. Look at it anew.',
      { head: { number: assigned.revision, author: '', savedAt: '', note: '' } },
    );
}

export const refuseClosed = () =>
  new Refusal(409, 'conflict', 'This sweep is closed: nothing more is kept or handed in. Ask who set it.');
