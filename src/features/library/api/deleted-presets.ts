import { useQuery } from '@tanstack/react-query';

import { deletedPresetsSchema } from '@/contract/deleted';
import { api } from '@/lib/api-client';

export function useDeletedPresets(enabled: boolean) {
  return useQuery({
    queryKey: ['presets', 'deleted'],
    queryFn: ({ signal }) => api.get('/presets/deleted', deletedPresetsSchema, signal),
    enabled,
  });
}

export function bringBackPreset(id: string) {
  return api.postOnly(`/presets/${encodeURIComponent(id)}/bring-back`, {});
}
