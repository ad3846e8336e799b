import { z } from '../engine/schema/zod';

import { PASSWORD_LIMITS } from './account';

/** What someone is called who asked for their name to go with the account. */
export const FORMER_MEMBER = 'Former member';

/** GET /api/account/deletion: what deleting the account brings, to be said before it. */
export const deletionSchema = z.object({
  /** Presets seen by nobody else; they go with the account. */
  privatePresets: z.number(),
  /** Presets that are open to labs; they stay there. */
  labPresets: z.number(),
  links: z.number(),
  handIns: z.number(),
  comments: z.number(),
  /** Labs that are left; of those where nobody else is a member nothing is reached any more. */
  labs: z.array(z.object({ name: z.string(), alone: z.boolean() })),
  /** Why it cannot be done now; empty where it can. */
  obstacles: z.array(z.string()),
});
export type DeletionBody = z.infer<typeof deletionSchema>;

/** POST /api/account/deletion -> 204, signed out; 400 on a wrong password, 409 in words on an obstacle. */
export const deleteAccountSchema = z.object({
  password: z.string().min(1, 'Your password is needed.').max(PASSWORD_LIMITS.longest),
  /** Whether the name goes too, wherever it may be changed. */
  anonymous: z.boolean(),
});
