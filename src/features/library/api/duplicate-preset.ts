import { presetBodySchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function duplicatePreset(id: string) {
  return api.post(`/presets/${encodeURIComponent(id)}/duplicate`, {}, presetBodySchema);
}
