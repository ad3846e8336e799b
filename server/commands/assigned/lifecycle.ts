import { recordAudit } from '../../audit/record-audit';
import type { Dependencies } from '../../dependencies';
import { Refusal } from '../../errors';
import { forgetReminders, remind, tellSet } from '../../mail/tell-assigned';
import type { Person } from '../../middleware/current-user';
import { demandRevision, findForLab } from './find';
import { obstaclesToOpening } from './obstacles';

/** Opens a draft, or a closed one again, once nothing stands in the way. */
export async function openAssigned(
  dependencies: Dependencies,
  person: Person,
  id: string,
  baseRevision: number,
): Promise<void> {
  const { database } = dependencies;
  const { AssignedPerson } = database.models;
  await database.change(async (transaction) => {
    const assigned = await findForLab(dependencies, person, id, 'set sweeps', transaction);
    demandRevision(assigned, baseRevision);
    if (assigned.state === 'open') return;
    const people = await AssignedPerson.findAll({ where: { assignedId: id }, transaction });
    const obstacles = obstaclesToOpening(assigned, people.length);
    if (obstacles.length > 0)
      throw new Refusal(409, 'conflict', `It cannot be opened yet. ${obstacles.join(' ')}`);
    const again = assigned.state === 'closed';
    await assigned.update(
      { state: 'open', openedAt: new Date(), closedAt: null, revision: assigned.revision + 1 },
      { transaction },
    );
    const unfinished = people.filter(({ state }) => ['untouched', 'running', 'sent back'].includes(state));
    const ids = unfinished.map(({ userId }) => userId);
    await tellSet(dependencies, transaction, assigned, person.name, ids);
    await remind(dependencies, transaction, assigned, ids);
    await recordAudit(database, transaction, {
      actor: person,
      action: again ? 'sweep reopened' : 'sweep opened',
      labId: assigned.labId,
      subject: assigned.title,
      details: { sweep: id, people: people.length },
    });
  });
}

export async function closeAssigned(
  dependencies: Dependencies,
  person: Person,
  id: string,
  baseRevision: number,
): Promise<void> {
  const { database } = dependencies;
  await database.change(async (transaction) => {
    const assigned = await findForLab(dependencies, person, id, 'set sweeps', transaction);
    demandRevision(assigned, baseRevision);
    if (assigned.state === 'closed') return;
    if (assigned.state === 'draft')
      throw new Refusal(409, 'conflict', 'A draft is not open yet, so there is nothing to close.');
    await assigned.update(
      { state: 'closed', closedAt: new Date(), revision: assigned.revision + 1 },
      { transaction },
    );
    await forgetReminders(dependencies, transaction, id);
    await recordAudit(database, transaction, {
      actor: person,
      action: 'sweep closed',
      labId: assigned.labId,
      subject: assigned.title,
      details: { sweep: id },
    });
  });
}

/** Deletes a draft. What was opened stays: people worked on it. */
export async function deleteDraft(dependencies: Dependencies, person: Person, id: string): Promise<void> {
  const { database } = dependencies;
  await database.change(async (transaction) => {
    const assigned = await findForLab(dependencies, person, id, 'set sweeps', transaction);
    if (assigned.state !== 'draft')
      throw new Refusal(409, 'conflict', 'It was opened before, so it stays. Close it instead.');
    await assigned.destroy({ transaction });
    await recordAudit(database, transaction, {
      actor: person,
      action: 'sweep deleted',
      labId: assigned.labId,
      subject: assigned.title,
      details: { sweep: id },
    });
  });
}
