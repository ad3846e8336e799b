import { presetBodySchema } from '@/contract/presets';
import type { PresetDocument } from '@/engine/schema/preset';
import { api } from '@/lib/api-client';

export function createPreset(document: PresetDocument, note: string) {
  return api.post('/presets', { document, note, visibility: 'private' }, presetBodySchema);
}
