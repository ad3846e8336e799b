import { useMemo } from 'react';
import { create } from 'zustand';

import { useWorkbench, useWorkbenchStore, type Arrangement } from '../state/store';
import { defaultPanes, type PaneSettings } from './pane-settings';

/** Panes changed by the user in the arrangements that are no part of the document. */
const usePaneOverrides = create<Partial<Record<Arrangement, readonly PaneSettings[]>>>()(() => ({}));

export interface PaneList {
  readonly panes: readonly PaneSettings[];
  change(next: readonly PaneSettings[]): void;
}

/** The panes on show. Those of the first arrangement are kept in the document, so they are saved and shared. */
export function usePanes(): PaneList {
  const store = useWorkbenchStore();
  const arrangement = useWorkbench((state) => state.arrangement);
  const saved = useWorkbench((state) => state.document.view.panes);
  const classes = useWorkbench((state) => state.document.populations.flatMap((one) => one.classes).length);
  const sweeps = useWorkbench((state) => state.document.sweeps.length);
  const overrides = usePaneOverrides((state) => state[arrangement]);
  return useMemo(() => {
    void [saved, classes, sweeps];
    const own = arrangement === 'explore' ? undefined : overrides;
    return {
      panes: own ?? defaultPanes(store.getState().document, arrangement),
      change: (next) => {
        if (arrangement !== 'explore') usePaneOverrides.setState({ [arrangement]: next });
        else
          store.getState().edit(
            'Change the panes',
            (document) => ({
              ...document,
              view: { ...document.view, panes: next.map((one) => ({ view: one.view, axes: [...one.axes] })) },
            }),
            'panes',
          );
      },
    };
  }, [arrangement, saved, classes, sweeps, overrides, store]);
}
