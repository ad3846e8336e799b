import { LevaPanel, useControls, useCreateStore } from 'leva';
import { createPlugin, useInputContext } from 'leva/plugin';
import { useEffect } from 'react';

import { useWorkbench } from '../../state/store';
import { LEVA_THEME } from './leva-theme';
import { setParameterValue } from './parameter-edits';
import { ParameterRow } from './parameter-row';

/** Leva hands on an input named `value` alone, without what stands beside it; hence `amount`. */
interface RowInput {
  readonly amount: number;
  readonly index: number;
}

function LevaRow() {
  const { settings, onUpdate } = useInputContext<{
    value: number;
    settings: { index: number };
  }>();
  return <ParameterRow index={settings.index} onSlide={onUpdate} />;
}

/** A number of leva's store, drawn as a row of ours. */
const parameterRow = createPlugin<RowInput, number, { index: number }>({
  component: LevaRow,
  normalize: ({ amount, index }) => ({ value: amount, settings: { index } }),
  sanitize: (value: unknown) => Number(value),
});

/**
 * The parameters under leva controls. The document stays the single truth: leva hands moves of its
 * controls on, and is told of every change that came from elsewhere.
 */
export default function LevaParameters() {
  const store = useCreateStore();
  const parameters = useWorkbench((state) => state.document.parameters);
  const edit = useWorkbench((state) => state.edit);
  const symbols = parameters.map((one) => one.symbol).join(' ');
  const [, set] = useControls(
    () =>
      Object.fromEntries(
        parameters.map((parameter, index) => [
          parameter.symbol,
          {
            ...parameterRow({ amount: parameter.value, index }),
            onChange: (value: number, _path: string, context: { initial: boolean; fromPanel: boolean }) => {
              if (context.initial || !context.fromPanel) return;
              edit(
                `Change ${parameter.symbol}`,
                (document) => setParameterValue(document, index, value),
                `slide:${parameter.symbol}`,
              );
            },
          },
        ]),
      ),
    { store },
    [symbols],
  );
  useEffect(() => {
    set(Object.fromEntries(parameters.map((one) => [one.symbol, one.value])));
  }, [parameters, set]);
  return <LevaPanel store={store} theme={LEVA_THEME} fill flat titleBar={false} hideCopyButton neverHide />;
}
