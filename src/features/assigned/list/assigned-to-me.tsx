import { useQuery } from '@tanstack/react-query';

import { ASSIGNED_KEYS, fetchMine } from '../api/assigned-operations';
import { SweepShelf } from './sweep-shelf';

/** What is set for oneself in all labs, what is due first on top; nothing where nothing is. */
export function AssignedToMe() {
  const sweeps = useQuery({ queryKey: ASSIGNED_KEYS.mine, queryFn: fetchMine });
  if (sweeps.isPending || sweeps.data?.items.length === 0) return null;
  return <SweepShelf title="Assigned to you" sweeps={sweeps} most={6} withLab empty="" more={null} />;
}
