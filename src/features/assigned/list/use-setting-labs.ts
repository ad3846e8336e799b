import { roleMay } from '@/contract/rights';
import { useSession } from '@/lib/session';

/** Labs in which whoever is signed in may set sweeps. */
export function useSettingLabs() {
  const memberships = useSession().data?.user?.memberships ?? [];
  return memberships.filter(({ role }) => roleMay(role, 'set sweeps'));
}
