import { z } from '../engine/schema/zod';

import { emailSchema, passwordSchema, personNameSchema } from './account';
import { ROLES } from './rights';

/** Labs that one person may be in. */
export const MOST_LABS = 50;
/** People invited by one press. */
export const MOST_INVITED = 300;
/** Days that an invitation stands. */
export const INVITATION_DAYS = { shortest: 1, usual: 14, longest: 60 } as const;

/** Control characters, and those that turn the reading direction and could make a name read as another. */
const DECEIVING = /[\p{Cc}\u200e\u200f\u202a-\u202e\u2066-\u2069]/u;

export const labNameSchema = z
  .string()
  .trim()
  .min(1, 'A name is needed.')
  .max(80, 'A name has at most 80 characters.')
  .refine((name) => !DECEIVING.test(name), 'A name holds letters, digits and signs on one line.');

/** POST /api/labs -> 201 labSchema; whoever makes a lab supervises it. PATCH /api/labs/:labId -> 200 labSchema */
export const labNameBodySchema = z.object({ name: labNameSchema });

const roleSchema = z.enum(ROLES, 'Choose one of the roles.');

/** GET /api/labs/:labId */
export const labSchema = z.object({
  id: z.string(),
  name: z.string(),
  role: roleSchema,
  members: z.array(
    z.object({
      id: z.string(),
      name: z.string(),
      role: roleSchema,
      /** For those who may invite; null for others. */
      email: z.string().nullable(),
      /** Null for members of before it was kept. */
      joinedAt: z.string().nullable(),
    }),
  ),
});
export type LabBody = z.infer<typeof labSchema>;

/** PATCH /api/labs/:labId/members/:userId -> 200 labSchema; 409 `conflict` where it would leave no supervisor. */
export const changeRoleSchema = z.object({ role: roleSchema });

/** GET /api/labs/:labId/members/:userId/departure: what leaving or removal brings, to be said before it. */
export const departureSchema = z.object({
  name: z.string(),
  /** Presets of the person's that the lab keeps. */
  presets: z.number(),
  /** Why it cannot be done now; null where it can. */
  obstacle: z.string().nullable(),
});
export type DepartureBody = z.infer<typeof departureSchema>;

/** A row as it was pasted or read from a file. */
export const invitationRowSchema = z.object({
  /** Where it stood. */
  line: z.int().min(1).max(1_000_000),
  email: z.string().max(400),
  /** Empty: the role chosen for all. */
  role: z.string().max(80),
});
export type InvitationRow = z.infer<typeof invitationRowSchema>;

const TOO_MANY = `At most ${MOST_INVITED} people are invited at once. Invite the rest afterwards.`;

/** POST /api/labs/:labId/invitations/preview -> 200 invitationPreviewSchema; sends nothing. */
export const previewInvitationsSchema = z.object({
  rows: z.array(invitationRowSchema).min(1, 'At least one row is needed.').max(MOST_INVITED, TOO_MANY),
  role: roleSchema,
});

/** What is wrong with a row, as the person who pasted it reads it. */
export const ROW_PROBLEMS = {
  malformed: 'This is not an e-mail address.',
  'unknown role': `This is no role. There are ${ROLES.join(', ')}.`,
  duplicate: 'This address stands in an earlier row too.',
  member: 'Someone with this address is a member already.',
  invited: 'This address has been invited and has not answered yet.',
  'too often': 'This address was written to as often as a day allows. Try again tomorrow.',
} as const;
export type RowProblem = keyof typeof ROW_PROBLEMS;

export const invitationPreviewSchema = z.object({
  rows: z.array(
    z.object({
      line: z.number(),
      email: z.string(),
      role: z.string(),
      problem: z.enum(Object.keys(ROW_PROBLEMS) as [RowProblem, ...RowProblem[]]).nullable(),
    }),
  ),
});
export type InvitationPreview = z.infer<typeof invitationPreviewSchema>;

const daysSchema = z
  .int('A whole number of days is needed.')
  .min(INVITATION_DAYS.shortest, 'An invitation stands for a day at least.')
  .max(INVITATION_DAYS.longest, `An invitation stands for ${INVITATION_DAYS.longest} days at most.`)
  .default(INVITATION_DAYS.usual);

/** POST /api/labs/:labId/invitations -> 201 invitationListSchema. All of them, or none: 400 names the rows in trouble. */
export const inviteSchema = z.object({
  invitations: z
    .array(z.object({ email: emailSchema, role: roleSchema }))
    .min(1, 'At least one address is needed.')
    .max(MOST_INVITED, TOO_MANY),
  days: daysSchema,
});
/** POST /api/labs/:labId/invitations/:id/resend -> 200 invitationListSchema; stands anew for that many days. */
export const resendSchema = z.object({ days: daysSchema });

/** GET /api/labs/:labId/invitations; DELETE /api/labs/:labId/invitations/:id -> 204 */
export const invitationListSchema = z.object({
  invitations: z.array(
    z.object({
      id: z.string(),
      email: z.string(),
      role: roleSchema,
      state: z.enum(['open', 'expired', 'declined']),
      invitedBy: z.string(),
      createdAt: z.string(),
      expiresAt: z.string(),
      /** What became of the last message. */
      mail: z.enum(['waiting', 'sent', 'given up', 'withheld', 'too late', 'unknown']),
    }),
  ),
});
export type InvitationList = z.infer<typeof invitationListSchema>;

/**
 * GET /api/invitations/:token, for whoever has the mailed link. 404 `not-found` for a wrong one, 400 `bad-token`
 * for one that was used, withdrawn, declined or is too old.
 */
export const invitationSchema = z.object({
  labName: z.string(),
  role: roleSchema,
  invitedBy: z.string(),
  /** The address that it was sent to. */
  email: z.string(),
  expiresAt: z.string(),
  /** Whether whoever is signed in may accept: it is their address, or they have shown that it is theirs. */
  mine: z.boolean(),
});
export type InvitationBody = z.infer<typeof invitationSchema>;

/**
 * POST /api/invitations/:token/accept -> 200 joinedSchema, signed in; 403 where the address is another, until
 * POST /api/invitations/:token/confirm-address -> 202 has mailed a link to it that this person opens.
 * POST /api/invitations/:token/decline -> 204.
 */
export const joinedSchema = z.object({ labId: z.string() });
/** POST /api/invitations/:token/sign-up -> 201 sessionSchema: the link shows that the address is one's own. */
export const signUpByInvitationSchema = z.object({ name: personNameSchema, password: passwordSchema });

/** GET /api/account/invitations: those that wait for one's own address; POST .../:id/accept -> 200 joinedSchema, .../:id/decline -> 204. */
export const ownInvitationsSchema = z.object({
  invitations: z.array(
    z.object({
      id: z.string(),
      labName: z.string(),
      role: roleSchema,
      invitedBy: z.string(),
      expiresAt: z.string(),
    }),
  ),
});
export type OwnInvitations = z.infer<typeof ownInvitationsSchema>;
