import { Plus, X } from 'lucide-react';
import { useMemo } from 'react';

import { Menu, MenuChoice } from '@/components/layout/menu';
import { PANE_VIEWS, type PaneView, type Quantity } from '@/engine/schema/preset';
import { part } from '@/lib/part';

import { useWorkbench } from '../state/store';
import { axisOptions } from './axes-of-view';
import { AxisChoices } from './axis-choices';
import { EquationsPane } from './diagrams/equations-pane';
import { ProcessPane } from './diagrams/process-pane';
import { VIEW_NAMES, type PaneSettings } from './pane-settings';
import { useShownModel } from './use-shown-model';
import { DiagramView } from './views/diagram-view';
import { PlaneView } from './views/plane-view';
import { LongRunView } from '../long-run/long-run-view';
import { TwoParametersView } from '../two-parameters/two-parameters-view';
import { TrajectoriesView } from './views/trajectories-view';

const SpacePane = part(() => import('./space/space-pane'));

/** Lets the panes of an arrangement read their code before they are drawn. */
export function beginPanes(panes: readonly PaneSettings[]): void {
  // Its failure is told by the pane itself.
  if (panes.some(({ view }) => view.startsWith('space'))) SpacePane.begin().catch(() => undefined);
}

function PaneContent({ view, axes }: { readonly view: PaneView; readonly axes: readonly Quantity[] }) {
  switch (view) {
    case 'trajectories':
      return <TrajectoriesView axes={axes} />;
    case 'plane':
      return <PlaneView axes={axes} />;
    case 'diagram':
      return <DiagramView axes={axes} />;
    case 'two-parameters':
      return <TwoParametersView axes={axes} />;
    case 'long-run':
      return <LongRunView axes={axes} />;
    case 'processes':
      return <ProcessPane />;
    case 'equations':
      return <EquationsPane />;
    case 'space':
    case 'space-diagram':
      return (
        <SpacePane
          key={view}
          view={view}
          axes={axes}
          fallback={<p className="grid flex-1 place-items-center text-muted">Opening the space…</p>}
        />
      );
  }
}

interface PaneProps {
  readonly pane: PaneSettings;
  readonly onChange: (next: PaneSettings) => void;
  readonly onClose: (() => void) | null;
  readonly onAdd: (() => void) | null;
}

const ICON = 'rounded p-1 text-muted hover:bg-panel hover:text-ink';

export function Pane({ pane, onChange, onClose, onAdd }: PaneProps) {
  const model = useShownModel();
  const parameter = useWorkbench((state) => state.sweepSelection?.parameter ?? null);
  const options = useMemo(
    () => axisOptions(model, pane.view, pane.axes, parameter),
    [model, pane, parameter],
  );
  const name = VIEW_NAMES[pane.view];
  return (
    <section
      aria-label={name}
      className="flex h-full min-h-0 flex-col overflow-hidden rounded-lg border bg-raised"
    >
      <div className="flex flex-wrap items-center gap-x-3 gap-y-1 px-3 pt-2 pb-1">
        <Menu
          align="start"
          trigger={
            <button
              type="button"
              className="rounded px-1 font-heading text-lg font-semibold hover:bg-panel"
              aria-label={`${name}, choose another view`}
            >
              {name}{' '}
              <span aria-hidden className="text-sm text-muted">
                ▾
              </span>
            </button>
          }
        >
          <MenuChoice
            value={pane.view}
            choices={PANE_VIEWS.map((value) => ({ value, label: VIEW_NAMES[value] }))}
            onChoose={(view) => onChange({ view, axes: [] })}
          />
        </Menu>
        <div className="ml-auto flex flex-wrap items-center justify-end gap-x-3 gap-y-1 max-sm:hidden">
          <AxisChoices options={options} onChange={(axes) => onChange({ ...pane, axes })} />
          <span className="flex">
            {onAdd ? (
              <button
                type="button"
                className={ICON}
                aria-label="Add a pane"
                title="Add a pane"
                onClick={onAdd}
              >
                <Plus size={16} aria-hidden />
              </button>
            ) : null}
            {onClose ? (
              <button
                type="button"
                className={ICON}
                aria-label={`Close ${name}`}
                title="Close this pane"
                onClick={onClose}
              >
                <X size={16} aria-hidden />
              </button>
            ) : null}
          </span>
        </div>
      </div>
      <PaneContent view={pane.view} axes={pane.axes} />
    </section>
  );
}
