import { presetBodySchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function fetchPreset(id: string, signal?: AbortSignal) {
  return api.get(`/presets/${encodeURIComponent(id)}`, presetBodySchema, signal);
}
