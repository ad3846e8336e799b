import { useQuery } from '@tanstack/react-query';

import { ASSIGNED_KEYS, fetchMine, fetchOfLab } from '../api/assigned-operations';
import { SweepShelf } from './sweep-shelf';
import { useSettingLabs } from './use-setting-labs';

/** Labs whose open sweeps stand on the desk of their supervisor. */
const MOST_LABS = 3;

function OpenSweeps({ labId, labName }: { readonly labId: string; readonly labName: string }) {
  const sweeps = useQuery({
    queryKey: ASSIGNED_KEYS.ofLab(labId, 'open', 1),
    queryFn: () => fetchOfLab(labId, 'open', 1),
  });
  if (sweeps.isPending || sweeps.data?.items.length === 0) return null;
  return (
    <SweepShelf
      title={`Open sweeps of ${labName}`}
      sweeps={sweeps}
      most={5}
      withLab={false}
      empty=""
      more={`/lab/sweeps?in=${encodeURIComponent(labId)}`}
    />
  );
}

/** On the desk: what is set for oneself, what is due first on top, and the open sweeps of labs one supervises. */
export function AssignedToMe() {
  const labs = useSettingLabs();
  const sweeps = useQuery({ queryKey: ASSIGNED_KEYS.mine, queryFn: fetchMine });
  const none = sweeps.isPending || sweeps.data?.items.length === 0;
  return (
    <>
      {none ? null : (
        <SweepShelf title="Assigned to you" sweeps={sweeps} most={6} withLab empty="" more={null} />
      )}
      {labs.slice(0, MOST_LABS).map(({ labId, labName }) => (
        <OpenSweeps key={labId} labId={labId} labName={labName} />
      ))}
    </>
  );
}
