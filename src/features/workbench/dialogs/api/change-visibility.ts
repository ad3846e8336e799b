import { presetBodySchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function changeVisibility(id: string, body: { visibility: 'private' | 'lab'; labId: string | null }) {
  return api.patch(`/presets/${encodeURIComponent(id)}`, body, presetBodySchema);
}
