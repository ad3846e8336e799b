import { Op, UniqueConstraintError, type Transaction } from 'sequelize';

import type { AuditAction } from '@/contract/audit';

import { recordAudit } from '../audit/record-audit';
import { refuseBadToken, refuseInvalid } from '../errors';
import type { Dependencies } from '../dependencies';
import { hashToken, makeId, makeToken } from '../ids';
import {
  confirmationMessage,
  knownAddressMessage,
  passwordChangedMessage,
  resetMessage,
} from '../mail/messages';
import { queueMail } from '../mail/queue-mail';
import type { Database } from '../models/database';
import type { User } from '../models/user';

const HOUR = 60 * 60_000;
const CONFIRM_WITHIN = 48 * HOUR;
const RESET_WITHIN = HOUR;

const SPENT = 'This link was used already or is too old. Ask for a new one.';

const auditAccount = (database: Database, user: User | null, action: AuditAction, transaction: Transaction) =>
  recordAudit(database, transaction, { actor: user, action, labId: null, subject: '', details: {} });

/** Tidies up. Done where a known and an unknown address part ways, so that both wait for one write. */
async function discardExpired({ models }: Database, transaction: Transaction): Promise<void> {
  const expired = { where: { expiresAt: { [Op.lt]: new Date() } }, transaction };
  await models.PendingAccount.destroy(expired);
  await models.PasswordReset.destroy(expired);
}

/** Takes a sign-up; what the mail says differs for a known address, what the caller learns does not. */
export async function requestAccount(
  dependencies: Dependencies,
  { name, email, password }: { name: string; email: string; password: string },
): Promise<void> {
  const { database, passwords, settings } = dependencies;
  const known = await database.models.User.findOne({ where: { email } });
  const passwordHash = await passwords.hash(password);
  const token = makeToken();
  await database.change(async (transaction) => {
    await discardExpired(database, transaction);
    const expiresAt = new Date(Date.now() + CONFIRM_WITHIN);
    const mail = { to: email, kind: 'account', key: `sign-up ${hashToken(token)}`, expiresAt } as const;
    if (known) {
      const content = knownAddressMessage(known.name, settings.publicUrl);
      await queueMail(dependencies, transaction, { ...mail, content });
      return;
    }
    const pending = { tokenHash: hashToken(token), name, email, passwordHash, expiresAt };
    await database.models.PendingAccount.create(pending, { transaction });
    const content = confirmationMessage(name, settings.publicUrl, token);
    await queueMail(dependencies, transaction, { ...mail, content });
  });
}

/** Makes the account that a mailed link confirms. */
export async function confirmAccount({ database }: Dependencies, token: string): Promise<User> {
  const { PendingAccount, User } = database.models;
  try {
    return await database.change(async (transaction) => {
      const pending = await PendingAccount.findByPk(hashToken(token), { transaction });
      if (pending === null || pending.expiresAt < new Date()) throw refuseBadToken(SPENT);
      await PendingAccount.destroy({ where: { email: pending.email }, transaction });
      return User.create(
        {
          id: makeId(),
          name: pending.name,
          email: pending.email,
          passwordHash: pending.passwordHash,
          createdAt: new Date(),
        },
        { transaction },
      );
    });
  } catch (error) {
    if (error instanceof UniqueConstraintError) throw refuseBadToken(SPENT);
    throw error;
  }
}

/** Mails a link for a new password where the address has an account. */
export async function requestReset(dependencies: Dependencies, email: string): Promise<void> {
  const { database, settings } = dependencies;
  const user = await database.models.User.findOne({ where: { email } });
  const token = makeToken();
  await database.change(async (transaction) => {
    await discardExpired(database, transaction);
    if (user === null) return;
    const reset = {
      tokenHash: hashToken(token),
      userId: user.id,
      expiresAt: new Date(Date.now() + RESET_WITHIN),
    };
    await database.models.PasswordReset.create(reset, { transaction });
    await queueMail(dependencies, transaction, {
      to: user.email,
      kind: 'account',
      content: resetMessage(user.name, settings.publicUrl, token),
      key: `reset ${reset.tokenHash}`,
      expiresAt: reset.expiresAt,
    });
  });
}

/** Tells the owner of an account that its password is another. */
function queuePasswordChanged(dependencies: Dependencies, transaction: Transaction, user: User) {
  return queueMail(dependencies, transaction, {
    to: user.email,
    kind: 'account',
    content: passwordChangedMessage(user.name, dependencies.settings.publicUrl),
    key: `password changed ${makeId()}`,
  });
}

/** Sets a new password by a mailed link and ends every session of the account. */
export async function resetPassword(
  dependencies: Dependencies,
  { token, password }: { token: string; password: string },
): Promise<void> {
  const { database, passwords } = dependencies;
  const { PasswordReset, User, SessionRecord } = database.models;
  const passwordHash = await passwords.hash(password);
  await database.change(async (transaction) => {
    const reset = await PasswordReset.findByPk(hashToken(token), { transaction });
    if (reset === null || reset.expiresAt < new Date()) throw refuseBadToken(SPENT);
    await PasswordReset.destroy({ where: { userId: reset.userId }, transaction });
    await SessionRecord.destroy({ where: { userId: reset.userId }, transaction });
    await User.update({ passwordHash }, { where: { id: reset.userId }, transaction });
    const owner = await User.findByPk(reset.userId, { transaction });
    await auditAccount(database, owner, 'password changed', transaction);
    if (owner) await queuePasswordChanged(dependencies, transaction, owner);
  });
}

/** Changes the password of someone signed in and ends all sessions; the caller begins a new one. */
export async function changePassword(
  dependencies: Dependencies,
  userId: string,
  { current, next }: { current: string; next: string },
): Promise<void> {
  const { database, passwords } = dependencies;
  const { User, SessionRecord, PasswordReset } = database.models;
  const user = await User.findByPk(userId);
  if (user === null || !(await passwords.verify(user.passwordHash, current))) {
    throw refuseInvalid({ current: 'This is not your current password.' });
  }
  const passwordHash = await passwords.hash(next);
  await database.change(async (transaction) => {
    await User.update({ passwordHash }, { where: { id: userId }, transaction });
    await PasswordReset.destroy({ where: { userId }, transaction });
    await SessionRecord.destroy({ where: { userId }, transaction });
    await auditAccount(database, user, 'password changed', transaction);
    await queuePasswordChanged(dependencies, transaction, user);
  });
}

/** The user of an address and password, or null; takes as long for an unknown address. */
export async function checkPassword(
  { database, passwords, settings }: Dependencies,
  { email, password }: { email: string; password: string },
): Promise<User | null> {
  const user = await database.models.User.findOne({ where: { email } });
  if (user === null || (user.demo && !settings.demo)) {
    await passwords.verifyNobody(password);
    // The same write as for a known address, so that the time taken tells nothing. The address is not kept.
    await database.change((transaction) =>
      recordAudit(database, transaction, {
        actor: null,
        action: 'sign-in refused',
        labId: null,
        subject: 'an address that is not known',
        details: {},
      }),
    );
    return null;
  }
  const right = await passwords.verify(user.passwordHash, password);
  await database.change((transaction) =>
    auditAccount(database, user, right ? 'signed in' : 'sign-in refused', transaction),
  );
  return right ? user : null;
}
