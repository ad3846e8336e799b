import { useCallback } from 'react';

import type { Quantity } from '@/engine/schema/preset';

import { withParameterValue } from '../engine/parameter-values';
import { PlotFrame } from '../panes/plot/plot-frame';
import { useWorkbenchStore } from '../state/store';
import { TwoParametersControls } from './two-parameters-controls';
import { twoParametersSpec } from './two-parameters-spec';

const significant = (value: number) => Number(value.toPrecision(6));

/** Boundaries and maps over the swept parameter and a second one; the ring moves the model over both. */
export function TwoParametersView({ axes }: { readonly axes: readonly Quantity[] }) {
  const store = useWorkbenchStore();
  const handleMove = useCallback(
    (id: string, x: number, y: number) => {
      const [first = '', second = ''] = id.replace('two:', '').split('|');
      store
        .getState()
        .edit(
          `Move ${first} and ${second}`,
          (document) =>
            withParameterValue(withParameterValue(document, first, significant(x)), second, significant(y)),
          id,
        );
    },
    [store],
  );
  return (
    <>
      <TwoParametersControls />
      <PlotFrame build={twoParametersSpec} axes={axes} onMoveHandle={handleMove} />
    </>
  );
}
