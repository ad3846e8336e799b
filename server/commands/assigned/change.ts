import { Op, type Transaction } from 'sequelize';

import type { ChangeAssigned, WantedFinding } from '@/contract/assigned-sweeps';
import { rolesThatMay } from '@/contract/rights';

import { recordAudit } from '../../audit/record-audit';
import type { Dependencies } from '../../dependencies';
import { Refusal, refuseInvalid } from '../../errors';
import { forgetReminder, remind, tellSet } from '../../mail/tell-assigned';
import type { Person } from '../../middleware/current-user';
import type { AssignedSweep } from '../../models/assigned-sweep';
import { demandRevision, findForLab } from './find';

/** What of a finding stays once people work on it; labels and tolerances do not. */
const fixed = (wanted: readonly WantedFinding[]) =>
  JSON.stringify(
    wanted.map((one) => [
      one.id,
      one.kind,
      one.kind === 'special point' ? [one.point, one.of] : one.kind === 'number' ? one.unit : '',
    ]),
  );

function refuseFixed(assigned: AssignedSweep, change: ChangeAssigned): void {
  if (assigned.state === 'draft') return;
  const moved =
    (change.range && JSON.stringify(change.range) !== JSON.stringify(assigned.range)) ||
    (change.freedom && JSON.stringify(change.freedom) !== JSON.stringify(assigned.freedom)) ||
    (change.wanted && fixed(change.wanted) !== fixed(assigned.wanted));
  if (moved)
    throw new Refusal(
      409,
      'conflict',
      'People work on this sweep: its range, its locks and the kinds of its findings stay. Set it again to change them.',
    );
  if (change.dueAt === null)
    throw refuseInvalid({ dueAt: 'An open sweep keeps a due date.' }, 'The due date cannot be taken away.');
}

/** Puts people in and takes untouched ones out; returns those who are new. */
async function changePeople(
  { database }: Dependencies,
  transaction: Transaction,
  assigned: AssignedSweep,
  wanted: readonly string[],
): Promise<{ added: string[]; removed: string[] }> {
  const { AssignedPerson, Membership } = database.models;
  const present = await AssignedPerson.findAll({ where: { assignedId: assigned.id }, transaction });
  const ids = new Set(present.map(({ userId }) => userId));
  const added = [...new Set(wanted)].filter((id) => !ids.has(id));
  const removed = present.filter(({ userId }) => !wanted.includes(userId));
  const busy = removed.filter(({ state }) => state !== 'untouched');
  if (busy.length > 0)
    throw new Refusal(
      409,
      'conflict',
      `${busy.map(({ name }) => name).join(', ')} began already and cannot be taken out.`,
    );
  const members = await Membership.findAll({
    where: { labId: assigned.labId, userId: { [Op.in]: added } },
    include: [{ association: 'user' }],
    transaction,
  });
  const may = rolesThatMay('do assigned sweeps');
  for (const id of added) {
    const member = members.find(({ userId }) => userId === id);
    if (!member?.user)
      throw refuseInvalid(
        { people: 'Someone chosen is not in this lab any more.' },
        'Look at the people anew.',
      );
    if (!may.includes(member.role))
      throw refuseInvalid(
        {
          people: `${member.user.name} sees the reference as a ${member.role}, so a sweep cannot be for them.`,
        },
        'Someone chosen cannot be given this sweep.',
      );
    await AssignedPerson.create(
      {
        assignedId: assigned.id,
        userId: id,
        name: member.user.name,
        state: 'untouched',
        addedAt: new Date(),
      },
      { transaction },
    );
  }
  const gone = removed.map(({ userId }) => userId);
  await AssignedPerson.destroy({
    where: { assignedId: assigned.id, userId: { [Op.in]: gone } },
    transaction,
  });
  return { added, removed: gone };
}

/** Changes a draft in everything, and an open or closed one in what may still move. */
export async function changeAssigned(
  dependencies: Dependencies,
  person: Person,
  id: string,
  change: ChangeAssigned,
): Promise<void> {
  const { database } = dependencies;
  await database.change(async (transaction) => {
    const assigned = await findForLab(dependencies, person, id, 'set sweeps', transaction);
    demandRevision(assigned, change.baseRevision);
    refuseFixed(assigned, change);
    const { title, brief, range, freedom, wanted, reference, timeZone } = change;
    const given = { title, brief, range, freedom, wanted, reference, timeZone };
    const fields = Object.fromEntries(Object.entries(given).filter(([, value]) => value !== undefined));
    const dueAt = change.dueAt === undefined ? assigned.dueAt : change.dueAt ? new Date(change.dueAt) : null;
    const moved = dueAt?.getTime() !== assigned.dueAt?.getTime();
    await assigned.update({ ...fields, dueAt, revision: assigned.revision + 1 }, { transaction });
    const people = change.people
      ? await changePeople(dependencies, transaction, assigned, change.people)
      : { added: [], removed: [] };
    if (assigned.state === 'draft') return;
    if (assigned.state === 'open') {
      await tellSet(dependencies, transaction, assigned, person.name, people.added);
      const unfinished = await database.models.AssignedPerson.findAll({
        where: { assignedId: id, state: ['untouched', 'running', 'sent back'] },
        transaction,
      });
      const late = moved ? unfinished.map(({ userId }) => userId) : people.added;
      await remind(dependencies, transaction, assigned, late);
      for (const userId of people.removed) await forgetReminder(dependencies, transaction, id, userId);
    }
    await recordAudit(database, transaction, {
      actor: person,
      action: 'sweep changed',
      labId: assigned.labId,
      subject: assigned.title,
      details: {
        sweep: id,
        changed: [
          ...Object.keys(fields),
          ...(moved ? ['due date'] : []),
          ...(change.people ? ['people'] : []),
        ].join(', '),
      },
    });
  });
}
