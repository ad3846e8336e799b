import { withParameterValue, withStart } from '../engine/parameter-values';
import type { WorkbenchStore } from '../state/store';

const significant = (value: number) => Number(value.toPrecision(6));

/** What dragging a ring or the parameter's line does to the document; one drag is one step of undo. */
export function moveHandle(store: WorkbenchStore, id: string, x: number, y: number): void {
  const [kind, ...rest] = id.split(':');
  const { edit, document, sweep } = store.getState();
  if (kind === 'parameter') {
    const key = rest.join(':');
    const bounds = sweep?.split;
    const within = bounds ? Math.min(bounds.to, Math.max(bounds.from, x)) : x;
    edit(`Move ${key}`, (current) => withParameterValue(current, key, significant(within)), id);
    return;
  }
  const [first, second] = rest;
  if (second === undefined) {
    edit('Move a start value', (current) => withStart(current, first ?? '', significant(y)), id);
    return;
  }
  if (document)
    edit(
      'Move the start',
      (current) => withStart(withStart(current, first ?? '', significant(x)), second, significant(y)),
      id,
    );
}
