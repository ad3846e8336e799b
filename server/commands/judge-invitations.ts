import { Op, type Transaction } from 'sequelize';

import { emailSchema } from '@/contract/account';
import type { InvitationPreview, InvitationRow, RowProblem } from '@/contract/labs';
import { ROLES, type Role } from '@/contract/rights';

import type { Database } from '../models/database';
import type { MailMessage } from '../models/mail-message';

const A_DAY = 24 * 60 * 60_000;
/** Messages that people may cause to one address in a day, over all labs. */
const MOST_TO_ONE_ADDRESS = 6;
/** Messages that one person may cause in a day. */
const MOST_BY_ONE_PERSON = 600;

export const UNANSWERED = { acceptedAt: null, declinedAt: null, withdrawnAt: null };

const aDayAgo = () => new Date(Date.now() - A_DAY);

/** Of some addresses those that were written to as often as a day allows. */
export async function wornOutAddresses(
  { models }: Database,
  addresses: readonly string[],
  transaction?: Transaction,
): Promise<Set<string>> {
  const rows = (await models.MailMessage.findAll({
    attributes: ['address'],
    where: {
      address: [...addresses],
      createdAt: { [Op.gt]: aDayAgo() },
      senderId: { [Op.ne]: null },
    },
    ...(transaction ? { transaction } : {}),
  })) as Pick<MailMessage, 'address'>[];
  const counts = new Map<string, number>();
  for (const { address } of rows) counts.set(address, (counts.get(address) ?? 0) + 1);
  return new Set([...counts].flatMap(([address, count]) => (count >= MOST_TO_ONE_ADDRESS ? [address] : [])));
}

/** How many more messages a person may cause today. */
export async function mailLeftToday(
  { models }: Database,
  senderId: string,
  transaction: Transaction,
): Promise<number> {
  const sent = await models.MailMessage.count({
    where: { senderId, createdAt: { [Op.gt]: aDayAgo() } },
    transaction,
  });
  return MOST_BY_ONE_PERSON - sent;
}

const roleNamed = (text: string, usual: Role): Role | null =>
  text.trim() === '' ? usual : (ROLES.find((role) => role === text.trim().toLowerCase()) ?? null);

/** Looks at each row as the lab stands, and says what keeps it from being invited. */
export async function judgeInvitations(
  database: Database,
  labId: string,
  rows: readonly InvitationRow[],
  usual: Role,
  transaction?: Transaction,
): Promise<InvitationPreview> {
  const within = transaction ? { transaction } : {};
  const { Membership, Invitation } = database.models;
  const read = rows.map(({ line, email, role }) => ({
    line,
    typed: email.trim(),
    email: emailSchema.safeParse(email).data ?? null,
    typedRole: role.trim(),
    role: roleNamed(role, usual),
  }));
  const emails = [...new Set(read.flatMap(({ email }) => (email === null ? [] : [email])))];
  const members = await Membership.findAll({
    where: { labId },
    attributes: ['userId'],
    include: [{ association: 'user', attributes: ['email'], where: { email: emails } }],
    ...within,
  });
  const invited = await Invitation.findAll({
    where: { labId, email: emails, ...UNANSWERED, expiresAt: { [Op.gt]: new Date() } },
    attributes: ['email'],
    ...within,
  });
  const memberEmails = new Set(members.map(({ user }) => user?.email.toLowerCase()));
  const invitedEmails = new Set(invited.map(({ email }) => email.toLowerCase()));
  const wornOut = await wornOutAddresses(database, emails, transaction);
  const seen = new Set<string>();

  const problemOf = ({ email, role }: (typeof read)[number]): RowProblem | null => {
    if (email === null) return 'malformed';
    const repeated = seen.has(email);
    seen.add(email);
    if (role === null) return 'unknown role';
    if (repeated) return 'duplicate';
    if (memberEmails.has(email)) return 'member';
    if (invitedEmails.has(email)) return 'invited';
    return wornOut.has(email) ? 'too often' : null;
  };
  return {
    rows: read.map((row) => ({
      line: row.line,
      email: row.email ?? row.typed,
      role: row.role ?? row.typedRole,
      problem: problemOf(row),
    })),
  };
}
