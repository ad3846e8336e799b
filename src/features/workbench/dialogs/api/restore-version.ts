import { presetBodySchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function restoreVersion(id: string, version: number, body: { note: string; baseVersion: number }) {
  return api.post(`/presets/${encodeURIComponent(id)}/versions/${version}/restore`, body, presetBodySchema);
}
