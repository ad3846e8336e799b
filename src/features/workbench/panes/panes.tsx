import { Tabs } from 'radix-ui';
import { Fragment, useSyncExternalStore } from 'react';
import { Group, Panel, Separator } from 'react-resizable-panels';

import { useWorkbench, useWorkbenchStore, type Arrangement } from '../state/store';
import { Pane } from './pane';
import { ARRANGEMENTS, MOST_PANES, type PaneSettings } from './pane-settings';
import { usePanes } from './use-panes';

const phone = typeof window === 'undefined' ? null : window.matchMedia('(max-width: 639px)');
function useIsPhone(): boolean {
  return useSyncExternalStore(
    (notify) => {
      phone?.addEventListener('change', notify);
      return () => phone?.removeEventListener('change', notify);
    },
    () => phone?.matches ?? false,
  );
}

/** Two panes side by side above, the rest beneath: one row up to two panes, else two. */
function rowsOf(count: number, arrangement: Arrangement): readonly (readonly number[])[] {
  const indices = Array.from({ length: count }, (_value, k) => k);
  if (arrangement !== 'explore' && count === 2) return [[0], [1]];
  return count <= 2 ? [indices] : [indices.slice(0, 2), indices.slice(2)];
}

const EDGE = 'rounded-full bg-transparent transition-colors hover:bg-hairline focus-visible:bg-accent';

function PaneGrid() {
  const { panes, change } = usePanes();
  const arrangement = useWorkbench((state) => state.arrangement);
  const isPhone = useIsPhone();
  const replace = (index: number, next: PaneSettings | null) =>
    change(panes.flatMap((one, at) => (at === index ? (next ?? []) : one)));
  const add = () => change([...panes, { view: 'trajectories', axes: [] }]);
  const cell = (index: number) => {
    const pane = panes[index];
    if (!pane) return null;
    return (
      <Pane
        pane={pane}
        onChange={(next) => replace(index, next)}
        onClose={panes.length > 1 ? () => replace(index, null) : null}
        onAdd={index === panes.length - 1 && panes.length < MOST_PANES ? add : null}
      />
    );
  };
  if (isPhone)
    return (
      <div className="grid gap-3">
        {panes.map((_pane, index) => (
          <div key={index} className="h-96">
            {cell(index)}
          </div>
        ))}
      </div>
    );
  const rows = rowsOf(panes.length, arrangement);
  return (
    <Group
      orientation="vertical"
      className="min-h-0"
      id={`panes-${arrangement}-${panes.length}`}
      key={`${arrangement}-${panes.length}`}
    >
      {rows.map((row, at) => (
        <Fragment key={at}>
          {at > 0 ? <Separator className={`my-0.5 h-2 ${EDGE}`} aria-label="Height of the panes" /> : null}
          <Panel
            id={`row-${at}`}
            minSize="20%"
            defaultSize={rows.length === 1 ? '100%' : at === 0 ? '56%' : '44%'}
          >
            <Group orientation="horizontal" className="h-full" id={`row-${arrangement}-${at}`}>
              {row.map((index, k) => (
                <Fragment key={index}>
                  {k > 0 ? (
                    <Separator className={`mx-0.5 w-2 ${EDGE}`} aria-label="Width of the panes" />
                  ) : null}
                  <Panel id={`pane-${index}`} minSize="22%" defaultSize={`${100 / row.length}%`}>
                    {cell(index)}
                  </Panel>
                </Fragment>
              ))}
            </Group>
          </Panel>
        </Fragment>
      ))}
    </Group>
  );
}

/** The middle of the workbench: named arrangements of one to four panes. */
export function Panes() {
  const store = useWorkbenchStore();
  const arrangement = useWorkbench((state) => state.arrangement);
  return (
    <Tabs.Root
      value={arrangement}
      onValueChange={(next) => {
        const chosen = ARRANGEMENTS.find((one) => one.value === next);
        if (chosen) store.getState().set({ arrangement: chosen.value });
      }}
      className="flex h-full min-h-0 flex-col gap-2 px-3 pt-2 pb-3"
    >
      <Tabs.List aria-label="Arrangements" className="flex gap-1 px-8 max-lg:px-0">
        {ARRANGEMENTS.map((one) => (
          <Tabs.Trigger
            key={one.value}
            value={one.value}
            className="rounded-md px-3 py-1.5 font-medium text-muted hover:bg-panel data-[state=active]:bg-panel data-[state=active]:font-semibold data-[state=active]:text-ink"
          >
            {one.label}
          </Tabs.Trigger>
        ))}
      </Tabs.List>
      <Tabs.Content value={arrangement} className="flex min-h-0 flex-1 flex-col outline-none" tabIndex={-1}>
        <PaneGrid />
      </Tabs.Content>
    </Tabs.Root>
  );
}
