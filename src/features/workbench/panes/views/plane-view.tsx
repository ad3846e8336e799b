import { useCallback, useEffect } from 'react';

import type { Quantity } from '@/engine/schema/preset';
import type { PlaneRequest } from '@/workers/protocol';

import { useWorkbenchStore } from '../../state/store';
import { moveHandle } from '../move-handle';
import { PlotFrame } from '../plot/plot-frame';
import type { PlotView } from '../plot/plot-view';
import { useShownModel } from '../use-shown-model';
import { planeAxes, planeSpec } from './plane-spec';
import { listClassNames } from './view-input';

const CELLS = 64;
const ARROWS = 15;

/** Ranges close enough to those already asked for that the slice still fits the picture. */
function closeTo(a: readonly [number, number], b: readonly [number, number]): boolean {
  const size = Math.abs(b[1] - b[0]);
  return Math.abs(a[0] - b[0]) < size * 0.02 && Math.abs(a[1] - b[1]) < size * 0.02;
}

export function PlaneView({ axes }: { readonly axes: readonly Quantity[] }) {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const handleMove = useCallback((id: string, x: number, y: number) => moveHandle(store, id, x, y), [store]);

  const handleDrawn = useCallback(
    (view: PlotView) => {
      const pair = planeAxes(listClassNames(model), axes);
      const { planeRequest, result, set } = store.getState();
      if (!pair || !view.layout || !result) return;
      const [x, y] = pair;
      if (x.quantity !== 'class' || y.quantity !== 'class' || x.of === y.of || x.logarithm || y.logarithm)
        return;
      const next: PlaneRequest = {
        x: x.of,
        y: y.of,
        xRange: view.layout.xAxis.domain,
        yRange: view.layout.yAxis.domain,
        cells: CELLS,
        arrows: ARROWS,
      };
      const same =
        planeRequest?.x === next.x &&
        planeRequest.y === next.y &&
        closeTo(planeRequest.xRange, next.xRange) &&
        closeTo(planeRequest.yRange, next.yRange);
      if (!same) set({ planeRequest: next });
    },
    [store, model, axes],
  );

  useEffect(() => () => store.getState().set({ planeRequest: null }), [store]);

  return <PlotFrame build={planeSpec} axes={axes} onMoveHandle={handleMove} onDrawn={handleDrawn} />;
}
