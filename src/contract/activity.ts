import { z } from '../engine/schema/zod';

/** GET /api/presets/:id/activity?page: what was done to a preset, newest first. */
export const activityQuerySchema = z.object({ page: z.coerce.number().int().min(1).max(100_000).default(1) });

export const activityPageSchema = z.object({
  items: z.array(
    z.object({
      /** Unique within the preset. */
      key: z.string(),
      at: z.string(),
      actor: z.string(),
      /** What follows the name. */
      sentence: z.string(),
      version: z.number().nullable(),
      note: z.string(),
      /** Thread that it is about. */
      thread: z.string().nullable(),
    }),
  ),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
});
export type ActivityPage = z.infer<typeof activityPageSchema>;
