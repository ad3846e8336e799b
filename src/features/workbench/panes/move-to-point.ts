import { withParameterValue } from '../engine/parameter-values';
import type { MarkedPoint, WorkbenchStore } from '../state/store';

/** Moves the model to a special point of the sweep on show, and selects it. */
export function moveToPoint(store: WorkbenchStore, point: MarkedPoint): void {
  const { sweep, edit, set } = store.getState();
  if (!sweep) return;
  const key = sweep.split.parameterKey;
  edit(`Move ${key} to ${point.kind}`, (document) => withParameterValue(document, key, point.parameter));
  set({ selectedPoint: point });
}
