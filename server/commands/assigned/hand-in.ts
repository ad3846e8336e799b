import { createHash } from 'node:crypto';

import type { HandIn as HandInBody, Receipt } from '@/contract/assigned-sweeps';

import { recordAudit } from '../../audit/record-audit';
import type { Dependencies } from '../../dependencies';
import { refuseInvalid } from '../../errors';
import { makeId } from '../../ids';
import { forgetReminder, tellHandedIn } from '../../mail/tell-assigned';
import type { Person } from '../../middleware/current-user';
import { presentReceipt } from '../../presenters/present-assigned';
import { checkDocument } from '../check-document';
import { findForAssignee, refuseClosed } from './find';
import { demandWithinLocks } from './work';

const CODE_LENGTH = 12;

/**
 * Freezes what was handed in. The same key gives the same receipt again, so that an answer that was lost on the
 * way costs nothing and makes no second hand-in, even when the sweep was closed meanwhile.
 */
export async function handIn(
  dependencies: Dependencies,
  person: Person,
  id: string,
  { key, ...body }: HandInBody,
): Promise<Receipt> {
  const { database } = dependencies;
  const { HandIn } = database.models;
  checkDocument(body.document);
  return database.change(async (transaction) => {
    const { assigned, place } = await findForAssignee(dependencies, person, id, transaction);
    const before = await HandIn.findOne({
      where: { userId: person.id, key },
      attributes: { exclude: ['frozen'] },
      transaction,
    });
    if (before?.assignedId === id) return presentReceipt(before);
    if (before !== null)
      throw refuseInvalid({ key: 'This key belongs to a hand-in of another sweep. A new one is needed.' });
    if (assigned.state === 'closed') throw refuseClosed();
    demandWithinLocks(assigned, body);
    const last = await HandIn.max<number, InstanceType<typeof HandIn>>('number', {
      where: { assignedId: id, userId: person.id },
      transaction,
    });
    const frozen = JSON.stringify(body);
    const handedInAt = new Date();
    const made = await HandIn.create(
      {
        id: makeId(),
        assignedId: id,
        userId: person.id,
        name: person.name,
        number: (last ?? 0) + 1,
        key,
        frozen,
        findings: body.findings,
        code: createHash('sha256').update(frozen).digest('hex').slice(0, CODE_LENGTH),
        late: assigned.dueAt !== null && handedInAt > assigned.dueAt,
        handedInAt,
      },
      { transaction },
    );
    await place.update({ state: 'sent', name: person.name }, { transaction });
    await forgetReminder(dependencies, transaction, id, person.id);
    await tellHandedIn(dependencies, transaction, assigned, made, person.email);
    await recordAudit(database, transaction, {
      actor: person,
      action: 'handed in',
      labId: assigned.labId,
      subject: assigned.title,
      details: {
        sweep: id,
        handIn: made.id,
        number: made.number,
        receipt: made.code,
        late: made.late ? 'yes' : 'no',
      },
    });
    return presentReceipt(made);
  });
}
