import { presetBodySchema } from '@/contract/presets';
import type { PresetDocument } from '@/engine/schema/preset';
import { api } from '@/lib/api-client';

/** A refusal with code `conflict` tells in `head` what was saved in between. */
export function saveVersion(
  id: string,
  body: { document: PresetDocument; note: string; baseVersion: number },
) {
  return api.post(`/presets/${encodeURIComponent(id)}/versions`, body, presetBodySchema);
}
