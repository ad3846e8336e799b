import { presetBodySchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function duplicatePreset(id: string, body: { version: number | null; title: string }) {
  return api.post(`/presets/${encodeURIComponent(id)}/duplicate`, body, presetBodySchema);
}
