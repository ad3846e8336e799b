import { createdLinkSchema, type NewLink } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function createLink(id: string, link: NewLink) {
  return api.post(`/presets/${encodeURIComponent(id)}/links`, link, createdLinkSchema);
}
