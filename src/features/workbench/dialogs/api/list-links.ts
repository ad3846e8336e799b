import { linkListSchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function listLinks(id: string) {
  return api.get(`/presets/${encodeURIComponent(id)}/links`, linkListSchema);
}
