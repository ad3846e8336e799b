import type { SaveWork } from '@/contract/assigned-sweeps';
import { lockBreaches } from '@/contract/locks';
import type { PresetDocument } from '@/engine/schema/preset';

import type { Dependencies } from '../../dependencies';
import { Refusal, refuseInvalid } from '../../errors';
import type { Person } from '../../middleware/current-user';
import type { AssignedSweep } from '../../models/assigned-sweep';
import { checkDocument } from '../check-document';
import { findForAssignee, refuseClosed } from './find';

/** Refuses what the locks do not allow, and findings that nobody asked for. */
export function demandWithinLocks(
  assigned: AssignedSweep,
  { document, range, findings }: Pick<SaveWork, 'document' | 'range' | 'findings'>,
): void {
  const { range: setRange, freedom } = assigned;
  const breaches = lockBreaches(
    { document: JSON.parse(assigned.document) as PresetDocument, range: setRange, freedom },
    { document, range },
  );
  if (breaches.length > 0)
    throw refuseInvalid(
      { document: breaches.slice(0, 5).join(' ') },
      'Something that is locked was changed, so nothing was kept.',
    );
  const wanted = new Set(assigned.wanted.map(({ id }) => id));
  const unknown = findings.findIndex(({ id }) => !wanted.has(id));
  if (unknown >= 0)
    throw refuseInvalid(
      { [`findings.${unknown}.id`]: 'This finding is not asked for.' },
      'A finding was given that is not asked for.',
    );
}

/** Keeps work in progress on top of what it began from; another window's is never written over. */
export async function saveWork(
  dependencies: Dependencies,
  person: Person,
  id: string,
  { baseRevision, ...work }: SaveWork,
): Promise<{ revision: number; savedAt: string }> {
  const { database } = dependencies;
  checkDocument(work.document);
  return database.change(async (transaction) => {
    const { assigned, place } = await findForAssignee(dependencies, person, id, transaction);
    if (assigned.state === 'closed') throw refuseClosed();
    demandWithinLocks(assigned, work);
    const { AssignedWork } = database.models;
    const kept = await AssignedWork.findOne({ where: { assignedId: id, userId: person.id }, transaction });
    if ((kept?.revision ?? 0) !== baseRevision)
      throw new Refusal(
        409,
        'conflict',
        'This sweep was worked on in another window meanwhile, so nothing was kept over it.',
        {
          head: {
            number: kept?.revision ?? 0,
            author: person.name,
            savedAt: kept?.savedAt.toISOString() ?? '',
            note: '',
          },
        },
      );
    const savedAt = new Date();
    await AssignedWork.upsert(
      {
        assignedId: id,
        userId: person.id,
        revision: baseRevision + 1,
        content: JSON.stringify(work),
        runs: work.runs.length,
        savedAt,
      },
      { transaction },
    );
    if (place.state === 'untouched')
      await place.update({ state: 'running', name: person.name }, { transaction });
    return { revision: baseRevision + 1, savedAt: savedAt.toISOString() };
  });
}
