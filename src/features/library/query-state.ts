import { useCallback } from 'react';
import { useSearchParams } from 'react-router-dom';

import { presetQuerySchema, type PresetQuery } from '@/contract/presets';

const DEFAULTS = presetQuerySchema.parse({});

/** The library's search lives in the address, so that a search can be kept and sent. */
export function useLibraryQuery(): [PresetQuery, (patch: Partial<PresetQuery>) => void] {
  const [params, setParams] = useSearchParams();
  const parsed = presetQuerySchema.safeParse(Object.fromEntries(params));
  const query = parsed.success ? parsed.data : DEFAULTS;

  const change = useCallback(
    (patch: Partial<PresetQuery>) => {
      setParams(
        (previous) => {
          const next = new URLSearchParams(previous);
          const turned = 'page' in patch ? patch : { ...patch, page: 1 };
          for (const [key, value] of Object.entries(turned)) {
            const usual = DEFAULTS[key as keyof PresetQuery];
            if (value === undefined || value === usual) next.delete(key);
            else next.set(key, String(value));
          }
          return next;
        },
        { replace: !('page' in patch) },
      );
    },
    [setParams],
  );
  return [query, change];
}
