import { useEffect } from 'react';
import { useBlocker } from 'react-router-dom';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';

import { isDirty } from '../dialogs/saving-rules';
import { useWorkbench, useWorkbenchStore, type WorkbenchState } from '../state/store';
import { useDraftKey } from './draft-key';
import { forgetDraft } from './draft-storage';

/** A visitor by link saves nothing, and an assigned sweep is kept by itself: there is nothing to lose. */
const mayBeLost = (state: WorkbenchState) =>
  state.origin.kind !== 'shared' && state.origin.kind !== 'assigned' && isDirty(state);

/** Leaving unsaved work asks, whether by a link or by closing the tab. */
export function LeaveGuard() {
  const store = useWorkbenchStore();
  const key = useDraftKey();
  const guarded = useWorkbench((state) => mayBeLost(state));
  const blocker = useBlocker(({ currentLocation, nextLocation }) => {
    const state = store.getState();
    return mayBeLost(state) && currentLocation.pathname !== nextLocation.pathname;
  });
  useEffect(() => {
    if (!guarded) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener('beforeunload', ask);
    return () => window.removeEventListener('beforeunload', ask);
  }, [guarded]);
  if (blocker.state !== 'blocked') return null;

  const handleDiscard = () => {
    const state = store.getState();
    state.set({ document: state.saved });
    if (key) forgetDraft(key);
    blocker.proceed();
  };
  return (
    <Dialog
      open
      onOpenChange={(open) => (open ? undefined : blocker.reset())}
      title="Leave with unsaved work?"
      description="The changes since the last saved version are not saved. They can be kept in this browser as a draft, which is offered when you open the preset again."
      width="narrow"
    >
      <div className="flex flex-wrap justify-end gap-2">
        <Button look="caution" onClick={handleDiscard}>
          Discard changes
        </Button>
        <Button onClick={() => blocker.proceed()}>Keep draft and leave</Button>
        <Button look="primary" onClick={() => blocker.reset()}>
          Stay
        </Button>
      </div>
    </Dialog>
  );
}
