import { useQuery } from '@tanstack/react-query';

import { roleMay, type Role } from '@/contract/rights';

import { ASSIGNED_KEYS, fetchOfLab } from '../api/assigned-operations';
import { SweepShelf } from './sweep-shelf';

/** The newest sweeps of a lab, on its page. */
export function LabSweeps({ labId, role }: { readonly labId: string; readonly role: Role }) {
  const sweeps = useQuery({
    queryKey: ASSIGNED_KEYS.ofLab(labId, undefined, 1),
    queryFn: () => fetchOfLab(labId, undefined, 1),
  });
  return (
    <SweepShelf
      title="Assigned sweeps"
      sweeps={sweeps}
      most={5}
      withLab={false}
      more={`/lab/sweeps?in=${encodeURIComponent(labId)}`}
      empty={
        roleMay(role, 'set sweeps')
          ? 'None yet. Choose a preset in the library, and “Set as an assigned sweep” in its menu.'
          : 'No sweep is set for you here.'
      }
    />
  );
}
