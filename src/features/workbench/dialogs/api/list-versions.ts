import { versionPageSchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function listVersions(id: string, page: number) {
  return api.get(`/presets/${encodeURIComponent(id)}/versions?page=${page}`, versionPageSchema);
}
