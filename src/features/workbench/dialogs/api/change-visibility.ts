import { presetBodySchema } from '@/contract/presets';
import { api } from '@/lib/api-client';

interface Placement {
  readonly visibility: 'private' | 'lab';
  readonly labId: string | null;
}

/** `from` is who saw it when the change was decided on; the server refuses when that is no longer so. */
export function changeVisibility(id: string, body: Placement & { readonly from: Placement }) {
  return api.patch(`/presets/${encodeURIComponent(id)}`, body, presetBodySchema);
}
