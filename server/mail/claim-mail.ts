import { Op, type Transaction } from 'sequelize';

import { mailRule } from '@/contract/mail';

import { makeId } from '../ids';
import type { Database } from '../models/database';
import type { MailMessage, MailState } from '../models/mail-message';
import { readMailSettings } from './mail-settings';
import { BUNDLED_KINDS } from './queue-mail';

/** Longer than any handing over may take, so that a claim outlives only a process that died. */
export const LEASE = 5 * 60_000;
const MOST_IN_BUNDLE = 50;
const LONGEST_ERROR = 500;

/** Messages that go out as one, under a claim that nobody else holds. */
export interface ClaimedMail {
  readonly claim: string;
  readonly messages: readonly [MailMessage, ...MailMessage[]];
}

/** Ends messages; what they said goes with it, links included. */
function settle(
  database: Database,
  transaction: Transaction,
  where: { id: string[] } | { claim: string },
  state: Exclude<MailState, 'waiting'>,
  lastError = '',
): Promise<[number]> {
  return database.models.MailMessage.update(
    {
      state,
      content: null,
      claim: null,
      settledAt: new Date(),
      lastError: lastError.slice(0, LONGEST_ERROR),
    },
    { where: { ...where, state: 'waiting' }, transaction },
  );
}

/** Those that go with `lead`: fixed by the first attempt, so that a later one is the same message. */
function companions(database: Database, transaction: Transaction, lead: MailMessage, now: Date) {
  if (!mailRule(lead.kind).bundles) return Promise.resolve([lead]);
  const together =
    lead.bundleId === null
      ? { address: lead.address, kind: BUNDLED_KINDS, bundleId: null, dueAt: { [Op.lte]: now } }
      : { bundleId: lead.bundleId };
  return database.models.MailMessage.findAll({
    where: { state: 'waiting', ...together },
    order: [
      ['createdAt', 'ASC'],
      ['id', 'ASC'],
    ],
    limit: MOST_IN_BUNDLE,
    transaction,
  });
}

/**
 * Claims what is due first, for the length of a lease; null when nothing is. What came too late, or what its
 * reader has turned off since, is settled on the way.
 */
export function claimMail(database: Database, now = new Date()): Promise<ClaimedMail | null> {
  const { MailMessage } = database.models;
  return database.change(async (transaction) => {
    for (;;) {
      const lead = await MailMessage.findOne({
        where: { state: 'waiting', dueAt: { [Op.lte]: now } },
        order: [['dueAt', 'ASC']],
        transaction,
      });
      if (lead === null) return null;
      const { timings } = await readMailSettings(database, lead.address, transaction);
      const group = await companions(database, transaction, lead, now);
      const late = group.filter(({ expiresAt }) => expiresAt !== null && expiresAt <= now);
      const unwanted = group.filter((one) => !late.includes(one) && timings[one.kind] === 'off');
      if (late.length > 0) await settle(database, transaction, { id: late.map(({ id }) => id) }, 'too late');
      if (unwanted.length > 0)
        await settle(database, transaction, { id: unwanted.map(({ id }) => id) }, 'withheld');
      const [first, ...rest] = group.filter((one) => !late.includes(one) && !unwanted.includes(one));
      if (first === undefined) continue;
      const claim = makeId();
      const bundleId = first.bundleId ?? first.id;
      await MailMessage.update(
        { claim, bundleId, attempts: first.attempts + 1, dueAt: new Date(now.getTime() + LEASE) },
        { where: { id: [first.id, ...rest.map(({ id }) => id)] }, transaction },
      );
      first.attempts += 1;
      first.bundleId = bundleId;
      return { claim, messages: [first, ...rest] };
    }
  });
}

/** Whether the claim was still held; where not, another process has taken the message over. */
export async function settleClaim(
  database: Database,
  claim: string,
  state: 'sent' | 'given up',
  lastError = '',
): Promise<boolean> {
  const [count] = await database.change((transaction) =>
    settle(database, transaction, { claim }, state, lastError),
  );
  return count > 0;
}

/** Gives a claim back, to be sent at `dueAt`. */
export async function postponeClaim(
  database: Database,
  claim: string,
  dueAt: Date,
  lastError: string,
): Promise<void> {
  await database.write(() =>
    database.models.MailMessage.update(
      { claim: null, dueAt, lastError: lastError.slice(0, LONGEST_ERROR) },
      { where: { claim, state: 'waiting' } },
    ),
  );
}

/** When the next message falls due; null when none waits. */
export async function nextDue(database: Database): Promise<Date | null> {
  const next = await database.models.MailMessage.findOne({
    where: { state: 'waiting' },
    order: [['dueAt', 'ASC']],
    attributes: ['dueAt'],
  });
  return next?.dueAt ?? null;
}

/** How long settled messages are kept, and with them the names that keep them from being sent twice. */
const A_DAY = 24 * 60 * 60_000;
const KEPT = 90 * A_DAY;

async function forgetOldMail(database: Database): Promise<void> {
  await database.write(() =>
    database.models.MailMessage.destroy({ where: { settledAt: { [Op.lt]: new Date(Date.now() - KEPT) } } }),
  );
}

/** Forgets now and once a day; the returned function ends it. */
export async function forgetMailDaily(
  database: Database,
  onFault: (error: unknown) => void,
): Promise<() => void> {
  await forgetOldMail(database);
  const timer = setInterval(() => void forgetOldMail(database).catch(onFault), A_DAY);
  timer.unref();
  return () => clearInterval(timer);
}
