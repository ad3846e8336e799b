/** The cycles at the present value of the swept parameter, as loops that follow the range strip. */
import type { CyclesResult } from '@/engine/cycles/contract';
import { formatNumber } from '@/graphics/numbers';

import { readParameterValue } from '../engine/parameter-values';
import { showsTwin } from '../panes/views/view-input';
import type { WorkbenchState } from '../state/store';
import { cycleNoun } from './cycle-words';
import { cyclesAt, presentOrbit, type PresentCycle } from './present-cycles';

export interface PresentLoop {
  readonly id: string;
  readonly label: string;
  /** The label without its numbers, which change as the strip is dragged. */
  readonly name: string;
  readonly isTwin: boolean;
  readonly cycle: PresentCycle;
  readonly stateSymbols: readonly string[];
  /** States one after another, the last equal to the first. */
  readonly orbit: Float64Array;
}

const STABILITY = ['repelling', 'attracting', 'undecided'] as const;

/** Loops of the model and of its pooled twin, where that is shown. */
export function presentLoops(state: WorkbenchState): readonly PresentLoop[] {
  const { cycles } = state;
  if (!cycles) return [];
  return [
    ...(showsTwin(state) && cycles.twin ? loopsOf(state, 'twin', cycles.twin) : []),
    ...loopsOf(state, 'split', cycles.split),
  ];
}

function loopsOf(
  state: WorkbenchState,
  side: 'split' | 'twin',
  result: CyclesResult,
): readonly PresentLoop[] {
  // Cycles followed at other numbers say nothing of the present ones.
  const value = state.sweepOutdated ? null : readParameterValue(state.document, result.parameterKey);
  const present = value === null ? [] : cyclesAt(result, value).filter((one) => one.feasible);
  return present.flatMap((cycle, order): PresentLoop[] => {
    const branch = result.branches[cycle.branch];
    if (!branch) return [];
    const isTwin = side === 'twin';
    const name = `${isTwin ? 'pooled twin, ' : ''}${STABILITY[cycle.attracts] ?? 'undecided'} ${cycleNoun(result)}`;
    return [
      {
        id: `cycle:${side}:${order}`,
        name,
        label: `${name}, period ${formatNumber(cycle.period, 3)}`,
        isTwin,
        cycle,
        stateSymbols: result.stateSymbols,
        orbit: presentOrbit(branch, cycle),
      },
    ];
  });
}
