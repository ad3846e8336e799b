import { useId } from 'react';

import type { MapQuantity } from '@/engine/maps/contract';
import { parameterName } from '@/graphics/quantities';

import { useShownModel } from '../panes/use-shown-model';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import type { TwoParameters } from '../state/two-parameters';
import { RangeField } from '../strip/range-field';
import { secondAt, secondParameter } from './second-parameter';

const QUANTITIES: readonly { readonly value: MapQuantity; readonly label: string }[] = [
  { value: 'margin', label: 'stability margin' },
  { value: 'attractor', label: 'kind of attractor' },
  { value: 'lowest', label: 'lowest density' },
  { value: 'exponent', label: 'largest exponent' },
];

const SELECT = 'max-w-44 rounded border bg-raised px-1.5 py-0.5 text-ink';
const BUTTON =
  'rounded-md border bg-raised px-2.5 py-1 text-sm font-medium hover:bg-panel disabled:text-muted disabled:hover:bg-raised';

/** What lies up, over which range, and what is computed. */
export function TwoParametersControls() {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const id = useId();
  const state = useWorkbench((one) => one);
  const second = secondParameter(state);
  const { quantity, side, map } = state.twoParameters;
  const parameters = (state.shownReport?.parameters ?? []).filter(
    (one) => one.key !== state.sweepSelection?.parameter,
  );
  const change = (patch: Partial<TwoParameters>) =>
    store.getState().set({ twoParameters: { ...store.getState().twoParameters, ...patch } });
  if (!second || !state.sweepSelection) return null;
  return (
    <div className="flex flex-wrap items-center gap-x-3 gap-y-1 px-3 pb-1 text-sm text-muted max-sm:hidden">
      <label htmlFor={`${id}-up`}>up</label>
      <select
        id={`${id}-up`}
        className={SELECT}
        value={second.parameter}
        onChange={(event) => change({ second: secondAt(store.getState(), event.target.value) })}
      >
        {parameters.map((one) => (
          <option key={one.key} value={one.key}>
            {parameterName(model, one.key).name}
          </option>
        ))}
      </select>
      <RangeField
        key={`from:${second.parameter}`}
        label="from"
        value={second.from}
        check={(value) => (value < second.to ? null : `The range begins below its end, ${second.to}.`)}
        onChange={(from) => change({ second: { ...second, from } })}
      />
      <RangeField
        key={`to:${second.parameter}`}
        label="to"
        value={second.to}
        check={(value) =>
          value > second.from ? null : `The range ends above its beginning, ${second.from}.`
        }
        onChange={(to) => change({ second: { ...second, to } })}
      />
      <button type="button" className={BUTTON} onClick={() => store.getState().engine?.traceBoundaries()}>
        Trace boundaries
      </button>
      <label htmlFor={`${id}-map`} className="ml-auto">
        map
      </label>
      <select
        id={`${id}-map`}
        className={SELECT}
        value={quantity}
        onChange={(event) => {
          const chosen = QUANTITIES.find((one) => one.value === event.target.value);
          if (chosen) change({ quantity: chosen.value });
        }}
      >
        {QUANTITIES.map((one) => (
          <option key={one.value} value={one.value}>
            {one.label}
          </option>
        ))}
      </select>
      {map?.result.twin ? (
        <>
          <label htmlFor={`${id}-of`}>of</label>
          <select
            id={`${id}-of`}
            className={SELECT}
            value={side}
            onChange={(event) => change({ side: event.target.value === 'twin' ? 'twin' : 'split' })}
          >
            <option value="split">split</option>
            <option value="twin">pooled twin</option>
          </select>
        </>
      ) : null}
      <button type="button" className={BUTTON} onClick={() => store.getState().engine?.computeMap()}>
        Compute map
      </button>
    </div>
  );
}
