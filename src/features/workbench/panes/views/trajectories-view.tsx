import { useCallback } from 'react';

import type { Quantity } from '@/engine/schema/preset';

import { useWorkbenchStore } from '../../state/store';
import { moveHandle } from '../move-handle';
import { PlotFrame } from '../plot/plot-frame';
import { trajectoriesSpec } from './trajectories-spec';

export function TrajectoriesView({ axes }: { readonly axes: readonly Quantity[] }) {
  const store = useWorkbenchStore();
  const handleMove = useCallback((id: string, x: number, y: number) => moveHandle(store, id, x, y), [store]);
  return <PlotFrame build={trajectoriesSpec} axes={axes} onMoveHandle={handleMove} />;
}
