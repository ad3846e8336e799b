import { z } from '../engine/schema/zod';

import { ROLES } from './rights';

export const PASSWORD_LIMITS = { shortest: 10, longest: 200 } as const;

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .max(254)
  .pipe(z.email('An e-mail address is needed, like name@example.org.'));
export const passwordSchema = z
  .string()
  .min(PASSWORD_LIMITS.shortest, `A password needs at least ${PASSWORD_LIMITS.shortest} characters.`)
  .max(PASSWORD_LIMITS.longest, `A password has at most ${PASSWORD_LIMITS.longest} characters.`);
export const personNameSchema = z.string().trim().min(1, 'A name is needed.').max(80);

/**
 * POST /api/accounts -> 202 `acceptedSchema`, the same for known and unknown addresses. A mail follows
 * either way: a link to `/confirm?token=...` for a new address, a notice for one that has an account.
 */
export const signUpSchema = z.object({
  name: personNameSchema,
  email: emailSchema,
  password: passwordSchema,
});
/** Body of every 202: the request was taken, what follows comes by mail. */
export const acceptedSchema = z.object({ accepted: z.literal(true) });
/** Token of a mailed link. */
export const mailedTokenSchema = z.string().trim().min(20).max(200);
/** POST /api/accounts/confirm -> 201 sessionSchema; signs in. 400 `bad-token` when used or expired. */
export const confirmAccountSchema = z.object({ token: mailedTokenSchema });
/** POST /api/session -> 200 sessionSchema (with a new csrfToken); DELETE /api/session -> 204; fetch the session again. */
export const signInSchema = z.object({
  email: emailSchema,
  password: z.string().min(1, 'A password is needed.').max(PASSWORD_LIMITS.longest),
});
/** POST /api/password/forgotten; always 202 `acceptedSchema`; the mail links to `/reset?token=...`. */
export const forgottenPasswordSchema = z.object({ email: emailSchema });
/** POST /api/password/reset -> 204; ends all sessions, does not sign in. 400 `bad-token` when used or expired. */
export const resetPasswordSchema = z.object({ token: mailedTokenSchema, password: passwordSchema });
/** POST /api/password/change -> 200 sessionSchema (with a new csrfToken); ends the other sessions. */
export const changePasswordSchema = z.object({
  current: z.string().min(1).max(PASSWORD_LIMITS.longest),
  next: passwordSchema,
});
/** PATCH /api/account -> 200 sessionSchema */
export const changeAccountSchema = z.object({ name: personNameSchema });

export const membershipSchema = z.object({ labId: z.string(), labName: z.string(), role: z.enum(ROLES) });

/**
 * GET /api/session: who is signed in; `csrfToken` goes back in the header `x-csrf-token` of every change.
 * The token changes on signing in and out; a 403 `bad-token` means: fetch the session again and retry once.
 */
export const sessionSchema = z.object({
  user: z
    .object({
      id: z.string(),
      name: z.string(),
      email: z.string(),
      demo: z.boolean(),
      memberships: z.array(membershipSchema),
    })
    .nullable(),
  csrfToken: z.string(),
  /** Whether demo accounts and the mail page exist. */
  demo: z.boolean(),
});
export type SessionBody = z.infer<typeof sessionSchema>;

/** GET /api/account/sessions; DELETE /api/account/sessions/:id; DELETE /api/account/sessions (all others); both 204. */
export const sessionListSchema = z.object({
  sessions: z.array(
    z.object({
      id: z.string(),
      current: z.boolean(),
      startedAt: z.string(),
      lastSeenAt: z.string(),
      agent: z.string(),
    }),
  ),
});
export type SessionList = z.infer<typeof sessionListSchema>;

/** GET /api/demo/accounts (DEMO only): invented people one may sign in as. */
export const demoAccountsSchema = z.object({
  accounts: z.array(
    z.object({ name: z.string(), email: z.string(), password: z.string(), role: z.enum(ROLES) }),
  ),
});
/** GET /api/demo/mail and /api/demo/mail/:id (DEMO only). */
export const mailListSchema = z.object({
  messages: z.array(
    z.object({ id: z.string(), to: z.string(), subject: z.string(), receivedAt: z.string() }),
  ),
});
export const mailSchema = z.object({
  id: z.string(),
  from: z.string(),
  to: z.string(),
  subject: z.string(),
  receivedAt: z.string(),
  text: z.string(),
  html: z.string(),
  unsubscribeUrl: z.string().nullable(),
});
