import { useSyncExternalStore } from 'react';

export function useMedia(query: string): boolean {
  return useSyncExternalStore(
    (notify) => {
      const list = window.matchMedia(query);
      list.addEventListener('change', notify);
      return () => list.removeEventListener('change', notify);
    },
    () => window.matchMedia(query).matches,
  );
}

/** Room for rails beside the panes. */
export const WIDE = '(min-width: 1180px)';
/** Too narrow to edit a model in. */
export const PHONE = '(max-width: 639px)';
