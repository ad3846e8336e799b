import type { SweepResult } from '@/engine/continuation/contract';
import type { CyclesResult, CycleSpecialPoint } from '@/engine/cycles/contract';

import type { MarkedPoint } from '../state/store';

/** Special points of equilibria, then those of cycles. */
export function markedPoints(
  sweep: SweepResult | null | undefined,
  cycles: CyclesResult | null | undefined,
): readonly MarkedPoint[] {
  return [...(sweep?.specialPoints ?? []), ...(cycles?.specialPoints ?? [])];
}

export function isOfCycles(point: MarkedPoint): point is CycleSpecialPoint {
  return 'period' in point;
}
