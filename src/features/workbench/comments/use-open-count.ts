import { useQuery } from '@tanstack/react-query';

import { whenIdle } from '@/lib/when-idle';

import { useWorkbench } from '../state/store';
import { listComments } from './api/comment-operations';

/** Number of open threads on the preset at hand; asked for when the page has nothing more pressing to do. */
export function useOpenCount(): number {
  const id = useWorkbench(({ origin }) => (origin.kind === 'preset' && !origin.starter ? origin.id : null));
  const count = useQuery({
    queryKey: ['comments', id, 'count'],
    queryFn: async () => {
      await whenIdle();
      return (await listComments(id ?? '', { state: 'open', page: 1 })).open;
    },
    enabled: id !== null,
    staleTime: 30_000,
    refetchOnWindowFocus: true,
  });
  return count.data ?? 0;
}
