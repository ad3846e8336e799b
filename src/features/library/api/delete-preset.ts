import { api } from '@/lib/api-client';

export function deletePreset(id: string) {
  return api.delete(`/presets/${encodeURIComponent(id)}`);
}
