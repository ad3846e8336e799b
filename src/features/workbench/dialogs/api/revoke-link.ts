import { api } from '@/lib/api-client';

export function revokeLink(id: string, linkId: string) {
  return api.delete(`/presets/${encodeURIComponent(id)}/links/${encodeURIComponent(linkId)}`);
}
