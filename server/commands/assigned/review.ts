import type { Transaction } from 'sequelize';

import type { SaveReview } from '@/contract/assigned-sweeps';

import { recordAudit } from '../../audit/record-audit';
import type { Dependencies } from '../../dependencies';
import { Refusal, refuseInvalid, refuseNotFound } from '../../errors';
import { forgetReminder, remind, tellReviewed } from '../../mail/tell-assigned';
import type { Person } from '../../middleware/current-user';
import type { AssignedSweep } from '../../models/assigned-sweep';
import type { HandIn } from '../../models/hand-in';
import type { Outcome } from '../../models/review';
import { findForLab } from './find';

export interface FoundHandIn {
  readonly handIn: HandIn;
  readonly assigned: AssignedSweep;
}

/** A hand-in for those who review in its lab; to everybody else it does not exist. */
export async function findHandIn(
  dependencies: Dependencies,
  person: Person,
  id: string,
  transaction?: Transaction,
): Promise<FoundHandIn> {
  const handIn = await dependencies.database.models.HandIn.findOne({
    where: { id },
    include: [{ association: 'review' }],
    ...(transaction ? { transaction } : {}),
  });
  if (handIn === null) throw refuseNotFound();
  try {
    const { assignedId } = handIn;
    return {
      handIn,
      assigned: await findForLab(dependencies, person, assignedId, 'review hand-ins', transaction),
    };
  } catch (error) {
    throw error instanceof Refusal ? refuseNotFound() : error;
  }
}

/** Where someone stands follows their newest hand-in alone. */
async function followOutcome(
  dependencies: Dependencies,
  transaction: Transaction,
  { handIn, assigned }: FoundHandIn,
  outcome: Outcome | null,
): Promise<void> {
  const { HandIn, AssignedPerson } = dependencies.database.models;
  const { assignedId, userId } = handIn;
  const newest = await HandIn.max<number, HandIn>('number', { where: { assignedId, userId }, transaction });
  if (newest !== handIn.number) return;
  await AssignedPerson.update({ state: outcome ?? 'sent' }, { where: { assignedId, userId }, transaction });
  if (outcome === 'sent back' && assigned.state === 'open')
    await remind(dependencies, transaction, assigned, [userId]);
  else await forgetReminder(dependencies, transaction, assignedId, userId);
}

async function giveBack(
  dependencies: Dependencies,
  transaction: Transaction,
  person: Person,
  { handIn, assigned }: FoundHandIn,
  review: { outcome: Outcome; note: string; revision: number },
): Promise<void> {
  await tellReviewed(dependencies, transaction, assigned, handIn, { ...review, by: person.name });
  await recordAudit(dependencies.database, transaction, {
    actor: person,
    action: review.outcome === 'sent back' ? 'hand-in sent back' : 'hand-in reviewed',
    labId: assigned.labId,
    subject: assigned.title,
    details: {
      sweep: assigned.id,
      handIn: handIn.id,
      of: handIn.name,
      number: handIn.number,
      outcome: review.outcome,
    },
  });
}

/** Keeps a review; with an outcome it is given back to whoever handed in. */
export async function saveReview(
  dependencies: Dependencies,
  person: Person,
  id: string,
  { baseRevision, ...review }: SaveReview,
): Promise<void> {
  const { database } = dependencies;
  await database.change(async (transaction) => {
    const found = await findHandIn(dependencies, person, id, transaction);
    const kept = found.handIn.review ?? null;
    if ((kept?.revision ?? 0) !== baseRevision)
      throw new Refusal(
        409,
        'conflict',
        `${kept?.byName ?? 'Someone'} reviewed this hand-in meanwhile, so nothing was kept over it. Look at it anew.`,
        {
          head: {
            number: kept?.revision ?? 0,
            author: kept?.byName ?? '',
            savedAt: kept?.at.toISOString() ?? '',
            note: '',
          },
        },
      );
    const wanted = new Set(found.assigned.wanted.map((one) => one.id));
    const stray = [
      ...Object.keys(review.judgements),
      ...review.remarks.flatMap((one) => (one.finding === null ? [] : [one.finding])),
    ].find((finding) => !wanted.has(finding));
    if (stray !== undefined)
      throw refuseInvalid({ judgements: 'A finding was judged that is not asked for.' });
    const revision = baseRevision + 1;
    await database.models.Review.upsert(
      { handInId: id, revision, ...review, byId: person.id, byName: person.name, at: new Date() },
      { transaction },
    );
    await followOutcome(dependencies, transaction, found, review.outcome);
    const { outcome, note } = review;
    const told = outcome !== null && (outcome !== kept?.outcome || note !== kept.note);
    if (told) await giveBack(dependencies, transaction, person, found, { outcome, note, revision });
  });
}

/** Sends the newest hand-ins of these people back; those who have none, or had theirs sent back, stay as they are. */
export async function sendBack(
  dependencies: Dependencies,
  person: Person,
  assignedId: string,
  { people, note }: { people: readonly string[]; note: string },
): Promise<void> {
  const { database } = dependencies;
  const { HandIn, Review } = database.models;
  await database.change(async (transaction) => {
    const assigned = await findForLab(dependencies, person, assignedId, 'review hand-ins', transaction);
    for (const userId of new Set(people)) {
      const handIn = await HandIn.findOne({
        where: { assignedId, userId },
        include: [{ association: 'review' }],
        attributes: { exclude: ['frozen'] },
        order: [['number', 'DESC']],
        transaction,
      });
      if (handIn === null || handIn.review?.outcome === 'sent back') continue;
      const revision = (handIn.review?.revision ?? 0) + 1;
      await Review.upsert(
        {
          handInId: handIn.id,
          revision,
          judgements: handIn.review?.judgements ?? {},
          remarks: handIn.review?.remarks ?? [],
          outcome: 'sent back',
          note,
          byId: person.id,
          byName: person.name,
          at: new Date(),
        },
        { transaction },
      );
      await followOutcome(dependencies, transaction, { handIn, assigned }, 'sent back');
      await giveBack(
        dependencies,
        transaction,
        person,
        { handIn, assigned },
        { outcome: 'sent back', note, revision },
      );
    }
  });
}
