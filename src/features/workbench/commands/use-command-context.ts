import { useMemo } from 'react';
import { useNavigate } from 'react-router-dom';

import { useSession } from '@/lib/session';

import { useBenchUi } from '../layout/bench-ui';
import { PHONE, useMedia, WIDE } from '../layout/use-media';
import { useWorkbenchStore } from '../state/store';
import type { CommandContext } from './command';

/** Makes the context of commands at the moment it is asked for, so that it is never stale. */
export function useCommandContext(): () => CommandContext {
  const store = useWorkbenchStore();
  const navigate = useNavigate();
  const signedIn = Boolean(useSession().data?.user);
  const readOnly = useMedia(PHONE);
  const wide = useMedia(WIDE);
  return useMemo(() => {
    const ui = () => useBenchUi.getState();
    return () => ({
      state: store.getState(),
      signedIn,
      readOnly,
      openDialog: (dialog) => ui().set({ dialog }),
      navigate: (path) => void navigate(path),
      toggleRail: () =>
        wide
          ? ui().set({ railOpen: !ui().railOpen })
          : ui().set({ sheet: ui().sheet === 'model' ? null : 'model' }),
      toggleFindings: () =>
        wide
          ? ui().set({ findingsOpen: !ui().findingsOpen })
          : ui().set({ sheet: ui().sheet === 'findings' ? null : 'findings' }),
    });
  }, [store, navigate, signedIn, readOnly, wide]);
}
