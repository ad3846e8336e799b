import { Op, type Transaction } from 'sequelize';

import { MOST_LABS, ROW_PROBLEMS } from '@/contract/labs';

import { recordAudit } from '../audit/record-audit';
import type { Dependencies } from '../dependencies';
import { Refusal, refuseBadToken, refuseInvalid, refuseNotAllowed, refuseNotFound } from '../errors';
import { hashToken, makeId, makeToken } from '../ids';
import { confirmAddressMessage } from '../mail/lab-messages';
import { queueMail } from '../mail/queue-mail';
import { tellSupervisors } from '../mail/tell-supervisors';
import type { Person } from '../middleware/current-user';
import type { Database } from '../models/database';
import type { Invitation } from '../models/invitation';
import type { User } from '../models/user';
import { mailLeftToday, UNANSWERED, wornOutAddresses } from './judge-invitations';
import { refuseTooManyLabs } from './lab-commands';

const WITH_NAMES = [{ association: 'lab' }, { association: 'inviter' }];

/** An invitation that can still be answered, and whom besides its own address its link is for. */
export interface OpenInvitation {
  invitation: Invitation;
  forUserId: string | null;
}

/** Why an invitation can no longer be answered, in words for whoever was invited; null while it can. */
function reasonClosed(invitation: Invitation): string | null {
  if (invitation.withdrawnAt !== null)
    return 'This invitation was withdrawn by the lab. Ask whoever invited you.';
  if (invitation.acceptedAt !== null)
    return 'This invitation was accepted already; it works once. Sign in to see the lab.';
  if (invitation.declinedAt !== null) return 'This invitation was declined. Ask the lab for a new one.';
  if (invitation.expiresAt <= new Date())
    return 'This invitation has run out. Ask whoever invited you to send it again.';
  return null;
}

/** What a mailed link opens; a wrong, spent or stale one is refused in words. */
export async function findInvitation(
  { database }: Dependencies,
  token: string,
  transaction?: Transaction,
): Promise<OpenInvitation> {
  const found = await database.models.InvitationToken.findByPk(hashToken(token), {
    include: [{ association: 'invitation', include: WITH_NAMES }],
    ...(transaction ? { transaction } : {}),
  });
  if (found?.invitation === undefined)
    throw refuseNotFound(
      'This link opens no invitation. Its address may be incomplete: open it from the message again.',
    );
  const closed = reasonClosed(found.invitation);
  if (closed !== null) throw refuseBadToken(closed);
  return { invitation: found.invitation, forUserId: found.forUserId };
}

const sameAddress = (a: string, b: string) => a.toLowerCase() === b.toLowerCase();

/** Whether an invitation is a person's: sent to their address, or to one that they showed to be theirs. */
export function isFor(
  { invitation, forUserId }: OpenInvitation,
  person: Pick<Person, 'id' | 'email'>,
): boolean {
  return forUserId === person.id || (forUserId === null && sameAddress(person.email, invitation.email));
}

/** Makes someone a member by an invitation that is theirs; a member already stays as they are. */
async function join(
  dependencies: Dependencies,
  transaction: Transaction,
  person: { id: string; name: string },
  invitation: Invitation,
): Promise<void> {
  const { database } = dependencies;
  const { Membership } = database.models;
  const { id, labId, role, lab } = invitation;
  await invitation.update({ acceptedAt: new Date() }, { transaction });
  if (await Membership.findOne({ where: { userId: person.id, labId }, transaction })) return;
  if ((await Membership.count({ where: { userId: person.id }, transaction })) >= MOST_LABS)
    throw refuseTooManyLabs();
  await Membership.create({ userId: person.id, labId, role, joinedAt: new Date() }, { transaction });
  await recordAudit(database, transaction, {
    actor: person,
    action: 'invitation accepted',
    labId,
    subject: person.name,
    details: { invitation: id, role },
  });
  const labName = lab?.name ?? '';
  await tellSupervisors(
    dependencies,
    transaction,
    { id: labId, name: labName },
    {
      key: `joined ${id}`,
      words: `${person.name} joined ${labName}`,
      exceptId: person.id,
    },
  );
}

/** Joins by a mailed link; returns the lab. */
export function acceptInvitation(dependencies: Dependencies, person: Person, token: string): Promise<string> {
  return dependencies.database.change(async (transaction) => {
    const open = await findInvitation(dependencies, token, transaction);
    if (!isFor(open, person))
      throw refuseNotAllowed(
        open.forUserId === null
          ? 'This invitation was sent to another address than that of your account. Confirm first that it is yours too.'
          : 'This link is for the account that asked for it. Sign in with that one.',
      );
    await join(dependencies, transaction, person, open.invitation);
    return open.invitation.labId;
  });
}

/** Makes an account by a mailed link, which shows that the address is one's own, and joins. */
export async function signUpByInvitation(
  dependencies: Dependencies,
  token: string,
  { name, password }: { name: string; password: string },
): Promise<User> {
  const { database, passwords } = dependencies;
  const { User, PendingAccount } = database.models;
  await findInvitation(dependencies, token);
  const passwordHash = await passwords.hash(password);
  return database.change(async (transaction) => {
    const { invitation, forUserId } = await findInvitation(dependencies, token, transaction);
    if (forUserId !== null)
      throw refuseNotAllowed('This link is for the account that asked for it. Sign in with that one.');
    const { email } = invitation;
    if (await User.findOne({ where: { email }, transaction }))
      throw new Refusal(
        409,
        'conflict',
        'This address has an account already. Sign in with it, then accept.',
      );
    await PendingAccount.destroy({ where: { email }, transaction });
    const user = await User.create(
      { id: makeId(), name, email, passwordHash, createdAt: new Date() },
      { transaction },
    );
    await join(dependencies, transaction, user, invitation);
    return user;
  });
}

/** Mails the invited address a link that lets this person accept, though their account has another address. */
export async function askToConfirmAddress(
  dependencies: Dependencies,
  person: Person,
  token: string,
): Promise<void> {
  const { database, settings } = dependencies;
  await database.change(async (transaction) => {
    const open = await findInvitation(dependencies, token, transaction);
    const { invitation } = open;
    if (isFor(open, person))
      throw refuseInvalid({}, 'You can accept this invitation as you are. Nothing needs to be confirmed.');
    const wornOut = await wornOutAddresses(database, [invitation.email], transaction);
    if (wornOut.size > 0 || (await mailLeftToday(database, person.id, transaction)) < 1)
      throw new Refusal(429, 'too-many-requests', ROW_PROBLEMS['too often']);
    const fresh = makeToken();
    await database.models.InvitationToken.create(
      { tokenHash: hashToken(fresh), invitationId: invitation.id, forUserId: person.id },
      { transaction },
    );
    const url = `${settings.publicUrl}/join?token=${fresh}`;
    await queueMail(dependencies, transaction, {
      to: invitation.email,
      kind: 'account',
      content: confirmAddressMessage(person.name, invitation.lab?.name ?? '', url),
      key: `confirm address ${hashToken(fresh)}`,
      senderId: person.id,
      expiresAt: invitation.expiresAt,
    });
  });
}

async function decline(
  dependencies: Dependencies,
  transaction: Transaction,
  person: Person | null,
  invitation: Invitation,
): Promise<void> {
  const { id, labId, email, role, lab } = invitation;
  await invitation.update({ declinedAt: new Date() }, { transaction });
  await recordAudit(dependencies.database, transaction, {
    actor: person,
    action: 'invitation declined',
    labId,
    subject: email,
    details: { invitation: id, role },
  });
  const labName = lab?.name ?? '';
  await tellSupervisors(
    dependencies,
    transaction,
    { id: labId, name: labName },
    {
      key: `declined ${id}`,
      words: `${email} declined the invitation to ${labName}`,
    },
  );
}

/** Says no by a mailed link; whoever has it speaks for the address. */
export async function declineInvitation(
  dependencies: Dependencies,
  person: Person | null,
  token: string,
): Promise<void> {
  await dependencies.database.change(async (transaction) => {
    const { invitation } = await findInvitation(dependencies, token, transaction);
    await decline(dependencies, transaction, person, invitation);
  });
}

/** Invitations that wait for a person's own address. */
export function listOwnInvitations({ models }: Database, person: Person): Promise<Invitation[]> {
  return models.Invitation.findAll({
    where: { email: person.email, ...UNANSWERED, expiresAt: { [Op.gt]: new Date() } },
    include: WITH_NAMES,
    order: [['createdAt', 'DESC']],
    limit: MOST_LABS,
  });
}

/** Answers an invitation to one's own address; the mail is not needed for it. Returns the lab. */
export function answerOwnInvitation(
  dependencies: Dependencies,
  person: Person,
  id: string,
  answer: 'accept' | 'decline',
): Promise<string> {
  const { database } = dependencies;
  return database.change(async (transaction) => {
    const invitation = await database.models.Invitation.findOne({
      where: { id, email: person.email },
      include: WITH_NAMES,
      transaction,
    });
    if (invitation === null) throw refuseNotFound('You have no such invitation.');
    const closed = reasonClosed(invitation);
    if (closed !== null) throw refuseBadToken(closed);
    if (answer === 'accept') await join(dependencies, transaction, person, invitation);
    else await decline(dependencies, transaction, person, invitation);
    return invitation.labId;
  });
}
