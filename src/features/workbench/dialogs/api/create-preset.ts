import { presetBodySchema } from '@/contract/presets';
import type { PresetDocument } from '@/engine/schema/preset';
import { api } from '@/lib/api-client';

interface NewPreset {
  readonly document: PresetDocument;
  readonly note: string;
  readonly visibility: 'private' | 'lab';
  readonly labId: string | null;
}

export function createPreset(body: NewPreset) {
  return api.post('/presets', body, presetBodySchema);
}
