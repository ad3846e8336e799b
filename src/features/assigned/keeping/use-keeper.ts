import { useEffect, useState, useSyncExternalStore } from 'react';

import { RevisionKeeper, type KeeperOptions } from './revision-keeper';

/** A keeper for as long as the page lives: it sends on leaving, and asks before a window with unsaved edits closes. */
export function useKeeper<Body, Edits extends object>(options: KeeperOptions<Body, Edits>) {
  const [keeper] = useState(() => new RevisionKeeper(options));
  const kept = useSyncExternalStore(keeper.subscribe, keeper.get);
  useEffect(() => {
    const handleUnload = (event: BeforeUnloadEvent) => {
      if (keeper.isSettled) return;
      keeper.leave();
      event.preventDefault();
    };
    window.addEventListener('beforeunload', handleUnload);
    window.addEventListener('online', keeper.retry);
    return () => {
      window.removeEventListener('beforeunload', handleUnload);
      window.removeEventListener('online', keeper.retry);
      keeper.leave();
    };
  }, [keeper]);
  return { keeper, ...kept };
}
