import { useSession } from '@/lib/session';

import { useWorkbench, type Origin } from '../state/store';

/** Drafts belong to a person and a preset; visitors by link keep none. */
export function draftKey(origin: Origin, userId: string | undefined): string | null {
  if (!userId || origin.kind === 'shared') return null;
  return `${userId}.${origin.kind === 'preset' ? origin.id : 'new'}`;
}

export function useDraftKey(): string | null {
  const origin = useWorkbench((state) => state.origin);
  return draftKey(origin, useSession().data?.user?.id);
}
