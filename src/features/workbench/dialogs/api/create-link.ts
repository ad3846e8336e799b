import { createdLinkSchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function createLink(id: string, label: string) {
  return api.post(`/presets/${encodeURIComponent(id)}/links`, { label }, createdLinkSchema);
}
