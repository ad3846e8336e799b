import { useMemo } from 'react';

import type { CyclesResult } from '@/engine/cycles/contract';

import { readParameterValue } from '../engine/parameter-values';
import { useWorkbench } from '../state/store';
import { cyclesAt, type PresentCycle } from './present-cycles';

export interface PresentCycles {
  readonly result: CyclesResult | null;
  /** Present value of the parameter that they were followed along. */
  readonly value: number | null;
  /** None where the cycles were followed at other numbers. */
  readonly cycles: readonly PresentCycle[];
}

/** Feasible cycles of the model or of its twin at the present numbers. */
export function usePresentCycles(side: 'split' | 'twin'): PresentCycles {
  const result = useWorkbench((state) => state.cycles?.[side] ?? null);
  const outdated = useWorkbench((state) => state.sweepOutdated);
  const value = useWorkbench((state) =>
    result ? readParameterValue(state.document, result.parameterKey) : null,
  );
  return useMemo(() => {
    const known = result !== null && value !== null && !outdated;
    return { result, value, cycles: known ? cyclesAt(result, value).filter((one) => one.feasible) : [] };
  }, [result, value, outdated]);
}
