import { z } from '../engine/schema/zod';

/** Every refusal has this body. `fields` maps a body path (`document.title`) to a sentence. */
export const errorBodySchema = z.object({
  error: z.object({
    code: z.enum([
      'invalid',
      'not-signed-in',
      'not-allowed',
      'not-found',
      'conflict',
      'too-large',
      'too-many-requests',
      'bad-token',
      'unavailable',
      'internal',
    ]),
    message: z.string(),
    fields: z.record(z.string(), z.string()).optional(),
    /** With `conflict` on saving: what the head is now. */
    head: z
      .object({ number: z.number(), author: z.string(), savedAt: z.string(), note: z.string() })
      .optional(),
    requestId: z.string().optional(),
  }),
});
export type ErrorBody = z.infer<typeof errorBodySchema>;
