import { useSession } from '@/lib/session';

import { useWorkbench, type Origin } from '../state/store';

/** Drafts belong to a person and a preset. Visitors by link keep none; assigned sweeps are kept by themselves. */
export function draftKey(origin: Origin, userId: string | undefined): string | null {
  if (!userId || origin.kind === 'shared' || origin.kind === 'assigned') return null;
  return `${userId}.${origin.kind === 'preset' ? origin.id : 'new'}`;
}

export function useDraftKey(): string | null {
  const origin = useWorkbench((state) => state.origin);
  return draftKey(origin, useSession().data?.user?.id);
}
