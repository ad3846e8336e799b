import { z } from '../engine/schema/zod';

export const MAIL_TIMINGS = ['at once', 'daily', 'off'] as const;
export type MailTiming = (typeof MAIL_TIMINGS)[number];

interface MailKindRule {
  /** What the settings call it. */
  readonly label: string;
  readonly help: string;
  /** What a person may choose; the first is what holds until they do. One alone: it always comes. */
  readonly timings: readonly [MailTiming, ...MailTiming[]];
  /** Whether several that are due together go out as one message. */
  readonly bundles: boolean;
}

/** Every kind of mail. Those without a choice are part of using an account and ignore unsubscribing. */
export const MAIL_KINDS = {
  account: {
    label: 'Your account',
    help: 'Confirmations, new passwords and other links that you asked for.',
    timings: ['at once'],
    bundles: false,
  },
  invitations: {
    label: 'Invitations to labs',
    help: 'Someone asks you to join a lab. Without this mail, invitations still wait on the page of your labs.',
    timings: ['at once', 'off'],
    bundles: false,
  },
  membership: {
    label: 'Your place in a lab',
    help: 'Your role was changed, or you were removed.',
    timings: ['at once', 'daily', 'off'],
    bundles: true,
  },
  people: {
    label: 'People of labs you supervise',
    help: 'Someone joined, declined or left.',
    timings: ['daily', 'at once', 'off'],
    bundles: true,
  },
  comments: {
    label: 'Comments',
    help: 'Someone mentioned you in a comment, or replied in a thread that you wrote in.',
    timings: ['at once', 'daily', 'off'],
    bundles: true,
  },
  assigned: {
    label: 'Sweeps set for you',
    help: 'A sweep was opened for you, is due within a day, was reviewed or sent back.',
    timings: ['at once', 'daily', 'off'],
    bundles: true,
  },
  receipts: {
    label: 'Receipts of what you hand in',
    help: 'One message for each hand-in, with its receipt.',
    timings: ['at once', 'off'],
    bundles: false,
  },
  'hand-ins': {
    label: 'Hand-ins to review',
    help: 'Someone handed in a sweep in a lab that you supervise.',
    timings: ['daily', 'at once', 'off'],
    bundles: true,
  },
} as const satisfies Record<string, MailKindRule>;

export type MailKind = keyof typeof MAIL_KINDS;
/** Kinds in the order in which the settings show them. */
export const MAIL_KIND_NAMES = Object.keys(MAIL_KINDS) as [MailKind, ...MailKind[]];

/** What one link of a message turns off: its own kind, or every kind that can be turned off. */
export type MailScope = MailKind | 'all';

/** The rule of a kind, with its timings as a plain list. */
export function mailRule(kind: MailKind): MailKindRule {
  return MAIL_KINDS[kind];
}

export function mayChoose(kind: MailKind, timing: MailTiming): boolean {
  return mailRule(kind).timings.includes(timing);
}

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

const digestHourSchema = z.int('An hour from 0 to 23 is needed.').min(0).max(23);
const timeZoneSchema = z.string().min(1).max(64).refine(isTimeZone, 'This is not a time zone that is known.');

/** PATCH /api/account/mail -> 200 mailSettingsSchema. Kinds that are left out stay as they are. */
export const changeMailSettingsSchema = z
  .object({
    timings: z.partialRecord(z.enum(MAIL_KIND_NAMES), z.enum(MAIL_TIMINGS)).default({}),
    digestHour: digestHourSchema.optional(),
    timeZone: timeZoneSchema.optional(),
  })
  .superRefine(({ timings }, context) => {
    for (const [kind, timing] of Object.entries(timings) as [MailKind, MailTiming][]) {
      if (mayChoose(kind, timing)) continue;
      context.addIssue({
        code: 'custom',
        path: ['timings', kind],
        message: `This mail cannot be set to “${timing}”.`,
      });
    }
  });
export type ChangeMailSettings = z.infer<typeof changeMailSettingsSchema>;

/** GET /api/account/mail */
export const mailSettingsSchema = z.object({
  timings: z.record(z.enum(MAIL_KIND_NAMES), z.enum(MAIL_TIMINGS)),
  digestHour: digestHourSchema,
  timeZone: z.string(),
});
export type MailSettingsBody = z.infer<typeof mailSettingsSchema>;

/**
 * `?token=` of a mailed link, on GET /api/mail/subscription, GET and POST /api/mail/unsubscribe and
 * POST /api/mail/subscribe-again. 400 `bad-token` when it is not one of ours.
 */
export const unsubscribeQuerySchema = z.object({ token: z.string().min(20).max(1000) });

/** GET /api/mail/subscription, and the answer of both POSTs. */
export const subscriptionSchema = z.object({
  address: z.string(),
  /** What the link is about, in words. */
  label: z.string(),
  off: z.boolean(),
});
export type SubscriptionBody = z.infer<typeof subscriptionSchema>;
