import { useSearchParams } from 'react-router-dom';

import { useSession } from '@/lib/session';

const STORAGE_KEY = 'moiety.lab';

function remembered(): string | null {
  try {
    return localStorage.getItem(STORAGE_KEY);
  } catch {
    return null;
  }
}

/** The lab that the page shows: the one of its address, the one looked at last, or the first. */
export function useCurrentLab() {
  const memberships = useSession().data?.user?.memberships ?? [];
  const [search, setSearch] = useSearchParams();
  const find = (id: string | null) => memberships.find(({ labId }) => labId === id);
  const current = find(search.get('in')) ?? find(remembered()) ?? memberships[0] ?? null;

  const choose = (labId: string) => {
    try {
      localStorage.setItem(STORAGE_KEY, labId);
    } catch {
      // Storage may be closed to us; the address still holds the choice.
    }
    setSearch({ in: labId });
  };
  return { memberships, current, choose };
}
