import { presetBodySchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function fetchVersion(id: string, version: number) {
  return api.get(`/presets/${encodeURIComponent(id)}/versions/${version}`, presetBodySchema);
}
