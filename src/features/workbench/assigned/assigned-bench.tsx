import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useMemo, useRef, type ReactNode } from 'react';

import type { HandIn } from '@/contract/assigned-sweeps';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbenchStore } from '../state/store';
import { AssignedActionsContext, type AssignedActions } from './assigned-actions';
import { fetchTask } from './api/task-operations';
import { sendHandIn, type Sent } from './hand-in-sender';
import { forgetLocalWork, readLocalHandIn, type LocalPlace } from './local-work';
import { keepRuns } from './run-log';
import { WorkKeeper } from './work-keeper';

/** Time between tries to send a hand-in that waits for the connection. */
const TRY_AGAIN = 10_000;

/** Around the bench of an assigned sweep: keeps the work and the runs, sends what waits, tells what is locked. */
export function AssignedBench({
  place,
  dirty,
  onReload,
  children,
}: {
  readonly place: LocalPlace;
  /** Whether this browser had work that the server has not. */
  readonly dirty: boolean;
  /** Opens the server's copy anew. */
  readonly onReload: () => void;
  readonly children: ReactNode;
}) {
  const store = useWorkbenchStore();
  const queries = useQueryClient();
  const keeper = useRef<WorkKeeper | null>(null);

  useEffect(() => {
    const own = new WorkKeeper(store, place, dirty);
    keeper.current = own;
    own.start();
    const endRuns = keepRuns(store);
    return () => {
      endRuns();
      own.stop();
    };
  }, [store, place, dirty]);

  useEffect(
    () =>
      store.subscribe((state, before) => {
        if (state.refused && state.refused !== before.refused)
          useBenchUi.getState().set({ notice: state.refused.message });
      }),
    [store],
  );

  const actions = useMemo((): AssignedActions => {
    const send = async (body: HandIn): Promise<Sent> => {
      const sent = await sendHandIn(place, body);
      if (sent.kind !== 'received') return sent;
      void queries.invalidateQueries({ queryKey: ['assigned'] });
      // What the page shows of former hand-ins follows; a failure costs no more than that.
      await fetchTask(place.assignedId).then(
        (task) => {
          const { assigned, set } = store.getState();
          if (assigned) set({ assigned: { ...assigned, task } });
        },
        () => undefined,
      );
      return sent;
    };
    return {
      send,
      keepMine: (revision) => keeper.current?.keepMine(revision),
      takeTheirs: () => {
        forgetLocalWork(place);
        onReload();
      },
    };
  }, [place, queries, store, onReload]);

  useEffect(() => {
    let stopped = false;
    const sendWaiting = async () => {
      const waiting = readLocalHandIn(place);
      if (!waiting || stopped) return;
      const sent = await actions.send(waiting);
      if (sent.kind === 'waiting') return;
      useBenchUi.getState().set({
        notice:
          sent.kind === 'received'
            ? `The hand-in that waited was received as number ${sent.receipt.number}${sent.receipt.late ? ', late' : ''}.`
            : `The hand-in that waited was refused. ${sent.message}`,
      });
    };
    const handleOnline = () => void sendWaiting();
    handleOnline();
    window.addEventListener('online', handleOnline);
    const timer = setInterval(handleOnline, TRY_AGAIN);
    return () => {
      stopped = true;
      clearInterval(timer);
      window.removeEventListener('online', handleOnline);
    };
  }, [place, actions]);

  return <AssignedActionsContext value={actions}>{children}</AssignedActionsContext>;
}
