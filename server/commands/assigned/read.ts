import type { AssignedBody, ReviewedHandIn, Task } from '@/contract/assigned-sweeps';

import type { Dependencies } from '../../dependencies';
import type { Person } from '../../middleware/current-user';
import {
  presentAssigned,
  presentReviewedHandIn,
  presentTask,
  type PersonAsPresented,
} from '../../presenters/present-assigned';
import { findForAssignee, findForLab } from './find';
import { obstaclesToOpening } from './obstacles';
import { findHandIn } from './review';

/** Made once: a comparison that reads its locale anew takes longer than reading the people. */
const byName = new Intl.Collator();

/** Whom a sweep is for, by name; those who left keep the name under which they were last seen. */
export async function readPeople(
  { database }: Dependencies,
  { id, labId }: { id: string; labId: string },
): Promise<PersonAsPresented[]> {
  const rows = await database.read<Omit<PersonAsPresented, 'member'> & { member: 0 | 1 }>(
    `SELECT p.userId AS id, COALESCE(u.name, p.name) AS name, p.state, m.userId IS NOT NULL AS member
     FROM assigned_people p LEFT JOIN memberships m ON m.userId = p.userId AND m.labId = $labId
     LEFT JOIN users u ON u.id = m.userId WHERE p.assignedId = $id`,
    { id, labId },
  );
  return rows
    .map((one) => ({ ...one, member: one.member === 1 }))
    .sort((a, b) => byName.compare(a.name, b.name) || byName.compare(a.id, b.id));
}

export async function readAssigned(
  dependencies: Dependencies,
  person: Person,
  id: string,
): Promise<AssignedBody> {
  const assigned = await findForLab(dependencies, person, id, 'set sweeps');
  const people = await readPeople(dependencies, assigned);
  return presentAssigned(assigned, people, obstaclesToOpening(assigned, people.length));
}

export async function readTask(dependencies: Dependencies, person: Person, id: string): Promise<Task> {
  const { assigned, place } = await findForAssignee(dependencies, person, id);
  const { AssignedWork, HandIn } = dependencies.database.models;
  const where = { assignedId: id, userId: person.id };
  const work = await AssignedWork.findOne({ where });
  const handIns = await HandIn.findAll({
    where,
    include: [{ association: 'review' }],
    order: [['number', 'DESC']],
  });
  return presentTask(assigned, place, work, handIns);
}

export async function readHandIn(
  dependencies: Dependencies,
  person: Person,
  id: string,
): Promise<ReviewedHandIn> {
  const { handIn, assigned } = await findHandIn(dependencies, person, id);
  const { userId, name } = handIn;
  const all = await dependencies.database.models.HandIn.findAll({
    where: { assignedId: assigned.id, userId },
    attributes: { exclude: ['frozen'] },
    include: [{ association: 'review' }],
    order: [['number', 'DESC']],
  });
  return presentReviewedHandIn(assigned, handIn, { id: userId, name }, all);
}
