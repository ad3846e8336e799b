import { Op, type Transaction } from 'sequelize';

import { ROW_PROBLEMS, type InvitationList } from '@/contract/labs';
import type { Role } from '@/contract/rights';

import { recordAudit } from '../audit/record-audit';
import type { Dependencies } from '../dependencies';
import { Refusal, refuseInvalid, refuseNotFound } from '../errors';
import { hashToken, makeId, makeToken } from '../ids';
import { invitationMessage } from '../mail/lab-messages';
import { queueMail } from '../mail/queue-mail';
import type { Person } from '../middleware/current-user';
import type { Invitation } from '../models/invitation';
import { demandInLab, demandInLabNow } from '../policies/lab-policy';
import { presentInvitations } from '../presenters/present-lab';
import { judgeInvitations, mailLeftToday, UNANSWERED, wornOutAddresses } from './judge-invitations';

const A_DAY = 24 * 60 * 60_000;
const MOST_LISTED = 1000;

const daysFromNow = (days: number) => new Date(Date.now() + days * A_DAY);

const refuseTooMuchMail = (words: string) => new Refusal(429, 'too-many-requests', words);

/** Names the message of each sending, by which its fate is found again. */
const mailKeyOf = ({ id, sends }: Pick<Invitation, 'id' | 'sends'>) => `invitation ${id} ${sends}`;

/** Invitations that nobody has accepted and nobody has withdrawn, newest first, with the fate of their mail. */
export async function listInvitations(
  { database }: Dependencies,
  person: Person,
  labId: string,
): Promise<InvitationList> {
  demandInLab(person, 'invite members', labId);
  const { Invitation, MailMessage } = database.models;
  const invitations = await Invitation.findAll({
    where: { labId, acceptedAt: null, withdrawnAt: null },
    include: [{ association: 'inviter' }],
    order: [
      ['createdAt', 'DESC'],
      ['email', 'ASC'],
    ],
    limit: MOST_LISTED,
  });
  const messages = await MailMessage.findAll({
    where: { idempotencyKey: invitations.map(mailKeyOf) },
    attributes: ['idempotencyKey', 'state'],
  });
  const states = new Map(messages.map(({ idempotencyKey, state }) => [idempotencyKey, state]));
  return presentInvitations(invitations, (one) => states.get(mailKeyOf(one)));
}

/** Mails a link of its own for an invitation as it stands. */
async function mailInvitation(
  dependencies: Dependencies,
  transaction: Transaction,
  person: Person,
  invitation: Invitation,
): Promise<void> {
  const { database, settings } = dependencies;
  const lab = await database.models.Lab.findByPk(invitation.labId, { transaction });
  const token = makeToken();
  await database.models.InvitationToken.create(
    { tokenHash: hashToken(token), invitationId: invitation.id, forUserId: null },
    { transaction },
  );
  await queueMail(dependencies, transaction, {
    to: invitation.email,
    kind: 'invitations',
    content: invitationMessage({
      labName: lab?.name ?? '',
      inviter: person.name,
      role: invitation.role,
      expiresAt: invitation.expiresAt,
      url: `${settings.publicUrl}/join?token=${token}`,
    }),
    key: mailKeyOf(invitation),
    senderId: person.id,
    expiresAt: invitation.expiresAt,
  });
}

/** Makes an invitation, or renews the one to this address that ran out unanswered. */
async function placeInvitation(
  { database }: Dependencies,
  transaction: Transaction,
  person: Person,
  labId: string,
  { email, role, expiresAt }: { email: string; role: Role; expiresAt: Date },
): Promise<Invitation> {
  const { Invitation } = database.models;
  const old = await Invitation.findOne({ where: { labId, email, ...UNANSWERED }, transaction });
  if (old !== null)
    return old.update({ role, expiresAt, invitedById: person.id, sends: old.sends + 1 }, { transaction });
  const now = new Date();
  return Invitation.create(
    { id: makeId(), labId, email, role, invitedById: person.id, sends: 1, createdAt: now, expiresAt },
    { transaction },
  );
}

/** Invites all of them, or none: what became wrong since the preview refuses the whole. */
export async function invite(
  dependencies: Dependencies,
  person: Person,
  labId: string,
  { invitations, days }: { invitations: readonly { email: string; role: Role }[]; days: number },
): Promise<void> {
  const { database } = dependencies;
  await database.change(async (transaction) => {
    await demandInLabNow(database, transaction, person.id, 'invite members', labId);
    const rows = invitations.map(({ email, role }, index) => ({ line: index + 1, email, role }));
    const judged = await judgeInvitations(database, labId, rows, 'collaborator', transaction);
    const fields = judged.rows.flatMap(({ problem }, index): [string, string][] =>
      problem === null ? [] : [[`invitations.${index}.email`, ROW_PROBLEMS[problem]]],
    );
    if (fields.length > 0)
      throw refuseInvalid(
        Object.fromEntries(fields),
        'Some rows cannot be invited, so nobody was. Look again.',
      );
    if ((await mailLeftToday(database, person.id, transaction)) < invitations.length)
      throw refuseTooMuchMail(
        'That is more invitations than one person sends in a day. Invite the rest tomorrow.',
      );
    const expiresAt = daysFromNow(days);
    for (const { email, role } of invitations) {
      const placed = await placeInvitation(dependencies, transaction, person, labId, {
        email,
        role,
        expiresAt,
      });
      await mailInvitation(dependencies, transaction, person, placed);
      await recordAudit(database, transaction, {
        actor: person,
        action: 'member invited',
        labId,
        subject: email,
        details: { invitation: placed.id, role },
      });
    }
  });
}

async function findUnanswered(
  { database }: Dependencies,
  transaction: Transaction,
  labId: string,
  id: string,
): Promise<Invitation> {
  const invitation = await database.models.Invitation.findOne({
    where: { id, labId, ...UNANSWERED },
    transaction,
  });
  if (invitation === null)
    throw refuseNotFound(
      'There is no such invitation that waits for an answer; it may have been answered already.',
    );
  return invitation;
}

/** Mails an invitation once more; it stands anew from now. */
export async function resendInvitation(
  dependencies: Dependencies,
  person: Person,
  labId: string,
  id: string,
  days: number,
): Promise<void> {
  const { database } = dependencies;
  await database.change(async (transaction) => {
    await demandInLabNow(database, transaction, person.id, 'invite members', labId);
    const invitation = await findUnanswered(dependencies, transaction, labId, id);
    const wornOut = await wornOutAddresses(database, [invitation.email], transaction);
    if (wornOut.size > 0) throw refuseTooMuchMail(ROW_PROBLEMS['too often']);
    if ((await mailLeftToday(database, person.id, transaction)) < 1)
      throw refuseTooMuchMail('That is more invitations than one person sends in a day. Send it tomorrow.');
    await invitation.update(
      { expiresAt: daysFromNow(days), sends: invitation.sends + 1, invitedById: person.id },
      { transaction },
    );
    await mailInvitation(dependencies, transaction, person, invitation);
    await recordAudit(database, transaction, {
      actor: person,
      action: 'invitation sent again',
      labId,
      subject: invitation.email,
      details: { invitation: id, role: invitation.role },
    });
  });
}

/** Takes an invitation back: its links open nothing from now on, and mail that waits is not sent. */
export async function withdrawInvitation(
  dependencies: Dependencies,
  person: Person,
  labId: string,
  id: string,
): Promise<void> {
  const { database } = dependencies;
  const { MailMessage } = database.models;
  await database.change(async (transaction) => {
    await demandInLabNow(database, transaction, person.id, 'invite members', labId);
    const invitation = await findUnanswered(dependencies, transaction, labId, id);
    const now = new Date();
    await invitation.update({ withdrawnAt: now }, { transaction });
    await MailMessage.update(
      { expiresAt: now },
      {
        where: {
          idempotencyKey: Array.from({ length: invitation.sends }, (_one, k) =>
            mailKeyOf({ id, sends: k + 1 }),
          ),
          state: 'waiting',
          expiresAt: { [Op.ne]: null },
        },
        transaction,
      },
    );
    await recordAudit(database, transaction, {
      actor: person,
      action: 'invitation withdrawn',
      labId,
      subject: invitation.email,
      details: { invitation: id, role: invitation.role },
    });
  });
}
