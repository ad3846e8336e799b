import type { CommentPin } from '@/contract/comments';

import { markedPoints } from '../cycles/marked-points';
import { readParameterValue, withParameterValue } from '../engine/parameter-values';
import type { SpecialPointRow } from '../findings/special-point-rows';
import type { WorkbenchStore } from '../state/store';

/** Share of the swept range within which a point of the sweep is the pinned one. */
const NEAR = 1e-3;

/** Where a row of the special points lies, as a comment is pinned to it. */
export function pinOf(row: SpecialPointRow, parameter: string): CommentPin | null {
  const point = row.split ?? row.twin;
  if (point === null) return null;
  return { model: row.split ? 'split' : 'twin', kind: row.kind, parameter, value: point.parameter };
}

/** Moves the bench to where a comment is pinned; a sentence where it cannot. */
export function showPin(store: WorkbenchStore, { kind, model, parameter, value }: CommentPin): string | null {
  const { document, edit, sweep, cycles, set } = store.getState();
  if (readParameterValue(document, parameter) === null)
    return `The model on the bench has no ${parameter}, so it stays where it is.`;
  edit(`Move ${parameter} to ${kind}`, (before) => withParameterValue(before, parameter, value));
  if (model === 'split' && sweep?.split.parameterKey === parameter) {
    const near = NEAR * Math.abs(sweep.split.to - sweep.split.from);
    const point = markedPoints(sweep.split, cycles?.split).find(
      (one) => one.kind === kind && Math.abs(one.parameter - value) <= near,
    );
    if (point) set({ selectedPoint: point });
  }
  return null;
}
