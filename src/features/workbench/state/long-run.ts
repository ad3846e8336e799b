import type { AnalysisResults } from '@/engine/analyses/contract';
import type { BasinsTask, ExtremesTask, LyapunovTask, SectionTask } from '@/engine/schema/analysis-tasks';

import type { Answered } from './two-parameters';

/** Tasks of the long run by name. */
export type LongRunName = 'extremes' | 'basins' | 'section' | 'lyapunov';

export interface LongRun {
  /** What the pane shows. */
  readonly show: Exclude<LongRunName, 'lyapunov'>;
  /** Class or total that is observed; the first class where null. */
  readonly observe: string | null;
  /** Value at which the section lies; that of the coexistence equilibrium where null. */
  readonly level: number | null;
  readonly extremes: Answered<ExtremesTask, AnalysisResults['extremes']> | null;
  readonly basins: Answered<BasinsTask, AnalysisResults['basins']> | null;
  readonly section: Answered<SectionTask, AnalysisResults['section']> | null;
  readonly lyapunov: Answered<LyapunovTask, AnalysisResults['lyapunov']> | null;
}

export const NO_LONG_RUN: LongRun = {
  show: 'extremes',
  observe: null,
  level: null,
  extremes: null,
  basins: null,
  section: null,
  lyapunov: null,
};
