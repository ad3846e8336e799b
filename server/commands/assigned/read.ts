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

/** Whom a sweep is for, by name; those who left keep the name under which they were last seen. */
export async function readPeople(
  { database }: Dependencies,
  { id, labId }: { id: string; labId: string },
): Promise<PersonAsPresented[]> {
  const { AssignedPerson, Membership } = database.models;
  const places = await AssignedPerson.findAll({ where: { assignedId: id } });
  const memberships = await Membership.findAll({
    where: { labId, userId: places.map(({ userId }) => userId) },
    include: [{ association: 'user' }],
  });
  const names = new Map(memberships.map(({ userId, user }) => [userId, user?.name]));
  return places
    .map(({ userId, name, state }) => ({
      id: userId,
      name: names.get(userId) ?? name,
      state,
      member: names.has(userId),
    }))
    .sort((a, b) => a.name.localeCompare(b.name) || a.id.localeCompare(b.id));
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
