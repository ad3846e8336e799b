import { useCallback, useId } from 'react';

import type { Quantity } from '@/engine/schema/preset';

import { observedSymbol, planeOfStarts, sectionLevel } from '../engine/long-run-tasks';
import { moveHandle } from '../panes/move-handle';
import { PlotFrame } from '../panes/plot/plot-frame';
import { useShownModel } from '../panes/use-shown-model';
import { listClassNames } from '../panes/views/view-input';
import type { LongRun } from '../state/long-run';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { RangeField } from '../strip/range-field';
import { longRunSpec } from './long-run-spec';

const SHOWN: readonly { readonly value: LongRun['show']; readonly label: string }[] = [
  { value: 'extremes', label: 'maxima along the strip' },
  { value: 'basins', label: 'basins over start values' },
  { value: 'section', label: 'a section' },
];

const SELECT = 'max-w-52 rounded border bg-raised px-1.5 py-0.5 text-ink';

function Controls() {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const id = useId();
  const state = useWorkbench((one) => one);
  const { show } = state.longRun;
  const change = (patch: Partial<LongRun>) =>
    store.getState().set({ longRun: { ...store.getState().longRun, ...patch } });
  const split = model.populations.filter((one) => one.classes.length > 1);
  const level = sectionLevel(state);
  const possible =
    show === 'extremes' ? state.sweepSelection !== null : show !== 'basins' || planeOfStarts(state) !== null;
  return (
    <div className="flex flex-wrap items-center gap-x-3 gap-y-1 px-3 pb-1 text-sm text-muted max-sm:hidden">
      <label htmlFor={`${id}-show`}>show</label>
      <select
        id={`${id}-show`}
        className={SELECT}
        value={show}
        onChange={(event) => {
          const chosen = SHOWN.find((one) => one.value === event.target.value);
          if (chosen) change({ show: chosen.value });
        }}
      >
        {SHOWN.map((one) => (
          <option key={one.value} value={one.value}>
            {one.label}
          </option>
        ))}
      </select>
      {show === 'basins' ? null : (
        <>
          <label htmlFor={`${id}-of`}>of</label>
          <select
            id={`${id}-of`}
            className={SELECT}
            value={observedSymbol(state) ?? ''}
            onChange={(event) => change({ observe: event.target.value, level: null })}
          >
            {listClassNames(model).map((one) => (
              <option key={one.symbol} value={one.symbol}>
                {one.name}
              </option>
            ))}
            {split.map((one) => (
              <option key={one.symbol} value={one.symbol}>
                {one.name || one.symbol}, all classes
              </option>
            ))}
          </select>
        </>
      )}
      {show === 'section' && level !== null ? (
        <RangeField
          label="rising through"
          value={level}
          check={() => null}
          onChange={(value) => change({ level: value })}
        />
      ) : null}
      <button
        type="button"
        className="rounded-md border bg-raised px-2.5 py-1 font-medium hover:bg-panel disabled:text-muted disabled:hover:bg-raised"
        disabled={!possible}
        title={possible ? undefined : 'This needs a swept parameter, or two classes.'}
        onClick={() => store.getState().engine?.longRun(show)}
      >
        Compute
      </button>
    </div>
  );
}

/** The long run: maxima with the parameter rising and falling, basins of attraction, sections. */
export function LongRunView({ axes }: { readonly axes: readonly Quantity[] }) {
  const store = useWorkbenchStore();
  const handleMove = useCallback((id: string, x: number, y: number) => moveHandle(store, id, x, y), [store]);
  return (
    <>
      <Controls />
      <PlotFrame build={longRunSpec} axes={axes} onMoveHandle={handleMove} />
    </>
  );
}
