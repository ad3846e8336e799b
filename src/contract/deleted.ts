import { z } from '../engine/schema/zod';

/** Days that something deleted can be brought back. The triggers of the versions hold the same number. */
export const KEPT_DAYS = 30;

export const deletedPresetsSchema = z.object({
  items: z.array(
    z.object({
      id: z.string(),
      title: z.string(),
      owner: z.string(),
      deletedAt: z.string(),
      /** When it goes for good. */
      goneAt: z.string(),
    }),
  ),
});

export type DeletedPresetsBody = z.infer<typeof deletedPresetsSchema>;
