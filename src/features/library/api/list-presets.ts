import { keepPreviousData, useQuery } from '@tanstack/react-query';

import { presetChoicesSchema, presetPageSchema, type PresetPage, type PresetQuery } from '@/contract/presets';
import { api } from '@/lib/api-client';

export function listPresets(query: Partial<PresetQuery>, signal?: AbortSignal): Promise<PresetPage> {
  const search = new URLSearchParams();
  for (const [key, value] of Object.entries(query)) {
    if (value !== undefined && value !== '') search.set(key, String(value));
  }
  return api.get(`/presets?${search.toString()}`, presetPageSchema, signal);
}

export function usePresetList(query: Partial<PresetQuery>) {
  return useQuery({
    queryKey: ['presets', query],
    queryFn: ({ signal }) => listPresets(query, signal),
    placeholderData: keepPreviousData,
  });
}

export function usePresetChoices() {
  return useQuery({
    queryKey: ['presets', 'choices'],
    queryFn: ({ signal }) => api.get('/presets/choices', presetChoicesSchema, signal),
  });
}
