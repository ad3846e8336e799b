import { sharedBodySchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function fetchShared(token: string, signal?: AbortSignal) {
  return api.get(`/shared/${encodeURIComponent(token)}`, sharedBodySchema, signal);
}
