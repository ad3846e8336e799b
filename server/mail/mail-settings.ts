import type { Transaction } from 'sequelize';

import {
  MAIL_KIND_NAMES,
  mailRule,
  mayChoose,
  type ChangeMailSettings,
  type MailKind,
  type MailScope,
  type MailSettingsBody,
  type MailTiming,
} from '@/contract/mail';

import type { Database } from '../models/database';

/** Bundles of the day go out at breakfast, in the zone of the address or else by Greenwich. */
const DEFAULTS = { digestHour: 7, timeZone: 'UTC' };

/** What an address wants of every kind: what was chosen, or what holds until then. */
export async function readMailSettings(
  { models }: Database,
  address: string,
  transaction?: Transaction,
): Promise<MailSettingsBody> {
  const kept = await models.MailSettings.findByPk(address, transaction ? { transaction } : {});
  const timings = Object.fromEntries(
    MAIL_KIND_NAMES.map((kind): [MailKind, MailTiming] => {
      const chosen = kept?.timings[kind];
      return [kind, chosen !== undefined && mayChoose(kind, chosen) ? chosen : mailRule(kind).timings[0]];
    }),
  ) as Record<MailKind, MailTiming>;
  return {
    timings,
    digestHour: kept?.digestHour ?? DEFAULTS.digestHour,
    timeZone: kept?.timeZone ?? DEFAULTS.timeZone,
  };
}

export async function changeMailSettings(
  database: Database,
  address: string,
  change: Pick<ChangeMailSettings, 'timings'> & Partial<ChangeMailSettings>,
): Promise<MailSettingsBody> {
  return database.change(async (transaction) => {
    const { MailSettings } = database.models;
    const kept = await MailSettings.findByPk(address, { transaction });
    await MailSettings.upsert(
      {
        address,
        timings: { ...kept?.timings, ...change.timings },
        digestHour: change.digestHour ?? kept?.digestHour ?? DEFAULTS.digestHour,
        timeZone: change.timeZone ?? kept?.timeZone ?? DEFAULTS.timeZone,
      },
      { transaction },
    );
    return readMailSettings(database, address, transaction);
  });
}

/** Kinds that a link of this scope turns off. */
export function kindsOf(scope: MailScope): MailKind[] {
  return MAIL_KIND_NAMES.filter((kind) => (scope === 'all' || scope === kind) && mayChoose(kind, 'off'));
}

export function describeScope(scope: MailScope): string {
  return scope === 'all' ? 'Everything that is not about your account' : mailRule(scope).label;
}

/** Turns the kinds of a link off, or back to what they were at first. */
export function turnMail(
  database: Database,
  address: string,
  scope: MailScope,
  off: boolean,
): Promise<MailSettingsBody> {
  const timings = Object.fromEntries(
    kindsOf(scope).map((kind) => [kind, off ? ('off' as const) : mailRule(kind).timings[0]]),
  );
  return changeMailSettings(database, address, { timings });
}
