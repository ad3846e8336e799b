import type { Transaction } from 'sequelize';

import { roleMay, rolesThatMay, type LabRight, type Role } from '@/contract/rights';

import { Refusal, refuseNotAllowed, refuseNotFound } from '../errors';
import type { Person } from '../middleware/current-user';
import type { Database } from '../models/database';

function demandRight(role: Role | undefined, right: LabRight): Role {
  if (role === undefined || !roleMay(role, 'view lab')) throw refuseNotFound();
  if (!roleMay(role, right))
    throw refuseNotAllowed(`Your role in this lab does not let you ${right}. Ask a supervisor.`);
  return role;
}

/** A lab that one is not in does not exist; what one may not do there is refused by name. */
export function demandInLab(person: Person, right: LabRight, labId: string): Role {
  return demandRight(person.memberships.find((one) => one.labId === labId)?.role, right);
}

/** The same as things stand within a change, whatever they were when the request began. */
export async function demandInLabNow(
  database: Database,
  transaction: Transaction,
  personId: string,
  right: LabRight,
  labId: string,
): Promise<Role> {
  const membership = await database.models.Membership.findOne({
    where: { userId: personId, labId },
    transaction,
  });
  return demandRight(membership?.role, right);
}

const KEEPERS = rolesThatMay('change roles');

/** Why a member cannot give up the role now: a lab always keeps one who may hand out roles. */
export async function obstacleToGivingUp(
  database: Database,
  member: { labId: string; role: Role; name: string },
  transaction?: Transaction,
): Promise<string | null> {
  if (!KEEPERS.includes(member.role)) return null;
  const keepers = await database.models.Membership.count({
    where: { labId: member.labId, role: [...KEEPERS] },
    ...(transaction ? { transaction } : {}),
  });
  return keepers > 1
    ? null
    : `A lab always keeps a supervisor, and ${member.name} is the only one. Make someone else a supervisor first.`;
}

export function refuseObstacle(obstacle: string | null): void {
  if (obstacle !== null) throw new Refusal(409, 'conflict', obstacle);
}
