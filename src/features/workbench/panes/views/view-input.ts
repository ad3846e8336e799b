import type { PresetDocument, Quantity } from '@/engine/schema/preset';
import { CAUTION } from '@/engine/system/contract';
import type { Palette } from '@/graphics/palette';
import { className } from '@/graphics/quantities';

import type { WorkbenchState } from '../../state/store';

/** What every view draws from. */
export interface ViewInput {
  readonly state: WorkbenchState;
  /** Structure and names of the model on show; numbers are those of the bench. */
  readonly model: PresetDocument;
  readonly palette: Palette;
  readonly axes: readonly Quantity[];
}

/** Numbers of the document on the bench where its structure is the one on show. */
export function currentStart(state: WorkbenchState, classSymbol: string): number | null {
  for (const population of state.document.populations)
    for (const one of population.classes) if (one.symbol === classSymbol) return one.start;
  return null;
}

export interface ListedClass {
  readonly symbol: string;
  readonly name: string;
  readonly population: PresetDocument['populations'][number];
  readonly index: number;
}

export function listClassNames(model: PresetDocument): readonly ListedClass[] {
  const listed: ListedClass[] = [];
  for (const population of model.populations)
    for (const one of population.classes)
      listed.push({
        symbol: one.symbol,
        name: className(population.name, one.name, one.symbol, population.classes.length),
        population,
        index: listed.length,
      });
  return listed;
}

/** Whether the pooled twin is to be drawn at all. */
export function showsTwin(state: WorkbenchState): boolean {
  const kind = state.shownReport?.twin.kind;
  return state.document.view.showTwin && kind !== 'no-split' && kind !== 'not-comparable';
}

/** Remarks due under a picture and on its exports. */
export function commonNotes(state: WorkbenchState): string[] {
  const notes: string[] = [];
  if (showsTwin(state) && state.shownReport?.twin.kind === 'unlumped')
    notes.push('The pooled twin (grey) is not lumpable: it is the split model at spread 0.');
  if (state.shownReport?.harvested) notes.push(CAUTION);
  return notes;
}

export function waitingText(state: WorkbenchState): string | null {
  if (!state.shownReport)
    return state.report && !state.report.valid
      ? 'This model cannot be computed yet. Mend what the model rail marks, and the picture follows.'
      : 'Waiting for the first result…';
  return null;
}

export class Extent {
  low = Infinity;
  high = -Infinity;

  constructor(private readonly logarithm: boolean) {}

  add(value: number): void {
    if (!Number.isFinite(value) || (this.logarithm && value <= 0)) return;
    if (value < this.low) this.low = value;
    if (value > this.high) this.high = value;
  }

  addAll(values: Float64Array): void {
    for (const value of values) this.add(value);
  }
}
