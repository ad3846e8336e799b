import { useEffect } from 'react';

import { isDirty } from '../dialogs/saving-rules';
import { useWorkbenchStore } from '../state/store';
import { forgetDraft, keepDraft } from './draft-storage';

/** Time between an edit and its being kept; short enough that a crash costs a keystroke at most. */
const DELAY = 250;

/** Keeps every edit in this browser until it is saved. Does nothing while `key` is null. */
export function useKeepDraft(key: string | null): void {
  const store = useWorkbenchStore();
  useEffect(() => {
    if (key === null) return;
    let timer: number | undefined;
    const keep = () => {
      window.clearTimeout(timer);
      timer = undefined;
      const state = store.getState();
      if (!isDirty(state)) return forgetDraft(key);
      keepDraft(key, {
        document: state.document,
        baseVersion: state.origin.kind === 'preset' ? state.origin.version : null,
        keptAt: new Date().toISOString(),
      });
    };
    const stop = store.subscribe((state, before) => {
      if (state.document === before.document && state.saved === before.saved) return;
      timer ??= window.setTimeout(keep, DELAY);
    });
    const flush = () => {
      if (timer !== undefined) keep();
    };
    window.addEventListener('pagehide', flush);
    document.addEventListener('visibilitychange', flush);
    return () => {
      stop();
      flush();
      window.removeEventListener('pagehide', flush);
      document.removeEventListener('visibilitychange', flush);
    };
  }, [key, store]);
}
