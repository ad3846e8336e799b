import type { AnalysisResults } from '@/engine/analyses/contract';
import type { MapQuantity } from '@/engine/maps/contract';
import type { BoundariesTask, MapTask } from '@/engine/schema/analysis-tasks';

/** A result with the task it answers, so that it can be told from what is wanted now, and rerun. */
export interface Answered<Task, Result> {
  readonly task: Task;
  readonly result: Result;
}

/** What is chosen and shown over the swept parameter and a second one. */
export interface TwoParameters {
  /** The second parameter and its range; null before one was chosen. */
  readonly second: { readonly parameter: string; readonly from: number; readonly to: number } | null;
  readonly quantity: MapQuantity;
  readonly side: 'split' | 'twin';
  readonly cells: number;
  readonly boundaries: Answered<BoundariesTask, AnalysisResults['boundaries']> | null;
  readonly map: Answered<MapTask, AnalysisResults['map']> | null;
}

export const NO_TWO_PARAMETERS: TwoParameters = {
  second: null,
  quantity: 'margin',
  side: 'split',
  cells: 80,
  boundaries: null,
  map: null,
};
