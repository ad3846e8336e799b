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
import type { Database } from '../models/database';
import type { User } from '../models/user';

const HOUR = 60 * 60_000;
const CONFIRM_WITHIN = 48 * HOUR;
const RESET_WITHIN = HOUR;

const SPENT = 'This link was used already or is too old. Ask for a new one.';

const auditAccount = (database: Database, user: User | null, action: AuditAction, transaction: Transaction) =>
  recordAudit(database, transaction, { actor: user, action, labId: null, subject: '', details: {} });

/** Tidies up. Done where a known and an unknown address part ways, so that both wait for one write. */
export async function discardExpired(database: Database): Promise<void> {
  const expired = { where: { expiresAt: { [Op.lt]: new Date() } } };
  await database.write(async () => {
    await database.models.PendingAccount.destroy(expired);
    await database.models.PasswordReset.destroy(expired);
  });
}

/** Takes a sign-up; what the mail says differs for a known address, what the caller learns does not. */
export async function requestAccount(
  { database, passwords, mailer, settings }: Dependencies,
  { name, email, password }: { name: string; email: string; password: string },
): Promise<void> {
  const known = await database.models.User.findOne({ where: { email } });
  const passwordHash = await passwords.hash(password);
  if (known) {
    await discardExpired(database);
    mailer.send(knownAddressMessage(email, known.name, settings.publicUrl));
    return;
  }
  const token = makeToken();
  await database.write(() =>
    database.models.PendingAccount.create({
      tokenHash: hashToken(token),
      name,
      email,
      passwordHash,
      expiresAt: new Date(Date.now() + CONFIRM_WITHIN),
    }),
  );
  mailer.send(confirmationMessage(email, name, settings.publicUrl, token));
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
export async function requestReset(
  { database, mailer, settings }: Dependencies,
  email: string,
): Promise<void> {
  const user = await database.models.User.findOne({ where: { email } });
  if (user === null) return discardExpired(database);
  const token = makeToken();
  await database.write(() =>
    database.models.PasswordReset.create({
      tokenHash: hashToken(token),
      userId: user.id,
      expiresAt: new Date(Date.now() + RESET_WITHIN),
    }),
  );
  mailer.send(resetMessage(user.email, user.name, settings.publicUrl, token));
}

/** Sets a new password by a mailed link and ends every session of the account. */
export async function resetPassword(
  { database, passwords, mailer, settings }: Dependencies,
  { token, password }: { token: string; password: string },
): Promise<void> {
  const { PasswordReset, User, SessionRecord } = database.models;
  const passwordHash = await passwords.hash(password);
  const user = await database.change(async (transaction) => {
    const reset = await PasswordReset.findByPk(hashToken(token), { transaction });
    if (reset === null || reset.expiresAt < new Date()) throw refuseBadToken(SPENT);
    await PasswordReset.destroy({ where: { userId: reset.userId }, transaction });
    await SessionRecord.destroy({ where: { userId: reset.userId }, transaction });
    await User.update({ passwordHash }, { where: { id: reset.userId }, transaction });
    const owner = await User.findByPk(reset.userId, { transaction });
    await auditAccount(database, owner, 'password changed', transaction);
    return owner;
  });
  if (user) mailer.send(passwordChangedMessage(user.email, user.name, settings.publicUrl));
}

/** Changes the password of someone signed in and ends all sessions; the caller begins a new one. */
export async function changePassword(
  { database, passwords, mailer, settings }: Dependencies,
  userId: string,
  { current, next }: { current: string; next: string },
): Promise<void> {
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
  });
  mailer.send(passwordChangedMessage(user.email, user.name, settings.publicUrl));
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
