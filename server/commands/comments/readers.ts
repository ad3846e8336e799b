import { Op, type Transaction } from 'sequelize';

import { roleMay } from '@/contract/rights';

import type { Dependencies } from '../../dependencies';
import type { Person } from '../../middleware/current-user';
import type { FoundPreset } from '../find-preset';
import { may } from '../../policies/preset-policy';

const JUDGED = ['agreed', 'differs'];
const MOST_PEOPLE = 500;

/** Those of these people who may comment on the preset as things stand now. */
export async function commentersAmong(
  { database, settings }: Dependencies,
  preset: FoundPreset,
  userIds: readonly string[],
  transaction?: Transaction,
): Promise<Person[]> {
  if (userIds.length === 0) return [];
  const { User, Membership } = database.models;
  const within = transaction ? { transaction } : {};
  const users = await User.findAll({
    where: { id: { [Op.in]: [...userIds] } },
    order: [['name', 'ASC']],
    ...within,
  });
  const memberships = await Membership.findAll({ where: { userId: { [Op.in]: [...userIds] } }, ...within });
  return users
    .filter(({ demo }) => !demo || settings.demo)
    .map(({ id, name, email, demo }) => ({
      id,
      name,
      email,
      demo,
      memberships: memberships
        .filter(({ userId }) => userId === id)
        .map(({ labId, role }) => ({ labId, labName: '', role })),
    }))
    .filter((person) => may(person, 'comment', preset));
}

/** Everyone who may comment on the preset: its owner and the people of its lab. */
export async function commentersOn(dependencies: Dependencies, preset: FoundPreset): Promise<Person[]> {
  const members =
    preset.labId === null
      ? []
      : await dependencies.database.models.Membership.findAll({
          where: { labId: preset.labId },
          attributes: ['userId'],
          limit: MOST_PEOPLE,
        });
  const ids = new Set(members.map(({ userId }) => userId));
  if (preset.ownerId !== null) ids.add(preset.ownerId);
  return commentersAmong(dependencies, preset, [...ids]);
}

/** Whether a sweep from this preset waits for a judgement of the person's work: comments could tell its answer. */
export async function isHeldBack(
  { database }: Dependencies,
  person: Person,
  preset: FoundPreset,
  transaction?: Transaction,
): Promise<boolean> {
  if (preset.ownerId === person.id) return false;
  const places = await database.models.AssignedPerson.findAll({
    where: { userId: person.id },
    attributes: ['state'],
    include: [
      {
        association: 'assigned',
        attributes: ['state', 'labId'],
        where: { presetId: preset.id },
        required: true,
      },
    ],
    ...(transaction ? { transaction } : {}),
  });
  const sets = (labId: string) =>
    person.memberships.some((one) => one.labId === labId && roleMay(one.role, 'set sweeps'));
  return places.some(
    ({ state, assigned }) =>
      assigned !== undefined &&
      assigned.state !== 'draft' &&
      !JUDGED.includes(state) &&
      !sets(assigned.labId),
  );
}
