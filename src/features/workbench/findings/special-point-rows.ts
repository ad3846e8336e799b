import type { SplitAnd } from '@/engine/analyses/contract';
import type { CyclesResult } from '@/engine/cycles/contract';
import type { SplitSweepResult } from '@/workers/protocol';

import { markedPoints } from '../cycles/marked-points';
import type { MarkedPoint } from '../state/store';

export interface SpecialPointRow {
  readonly id: string;
  readonly kind: MarkedPoint['kind'];
  readonly split: MarkedPoint | null;
  readonly twin: MarkedPoint | null;
  /** Split minus twin, where both are there. */
  readonly shift: number | null;
}

/**
 * Pairs the points of the split model with those of its twin: of one kind and feasibility, nearest first,
 * each used once. What has no partner stands alone.
 */
export function specialPointRows(
  sweep: SplitSweepResult,
  cycles: SplitAnd<CyclesResult> | null,
): readonly SpecialPointRow[] {
  const points = markedPoints(sweep.split, cycles?.split);
  const twins = markedPoints(sweep.twin, cycles?.twin);
  const pairs: { split: number; twin: number; distance: number }[] = [];
  points.forEach((point, split) =>
    twins.forEach((other, twin) => {
      if (other.kind === point.kind && other.feasible === point.feasible)
        pairs.push({ split, twin, distance: Math.abs(other.parameter - point.parameter) });
    }),
  );
  pairs.sort((a, b) => a.distance - b.distance);
  const partner = new Map<number, number>();
  const taken = new Set<number>();
  for (const { split, twin } of pairs) {
    if (partner.has(split) || taken.has(twin)) continue;
    partner.set(split, twin);
    taken.add(twin);
  }
  const own = points.map((point, k): SpecialPointRow => {
    const twin = twins[partner.get(k) ?? -1] ?? null;
    return {
      id: `own:${point.id}`,
      kind: point.kind,
      split: point,
      twin,
      shift: twin ? point.parameter - twin.parameter : null,
    };
  });
  const alone = twins
    .filter((_point, k) => !taken.has(k))
    .map((point): SpecialPointRow => ({
      id: `twin:${point.id}`,
      kind: point.kind,
      split: null,
      twin: point,
      shift: null,
    }));
  return [...own, ...alone];
}

export type SortKey = 'kind' | 'split' | 'twin' | 'shift';
export interface SortOrder {
  readonly key: SortKey;
  readonly descending: boolean;
}

/** Rows without the number sorted by stand last, whichever way. */
export function sortRows(
  rows: readonly SpecialPointRow[],
  { key, descending }: SortOrder,
): readonly SpecialPointRow[] {
  const number = (row: SpecialPointRow) =>
    key === 'split' ? row.split?.parameter : key === 'twin' ? row.twin?.parameter : (row.shift ?? undefined);
  const sign = descending ? -1 : 1;
  return [...rows].sort((a, b) => {
    if (key === 'kind') return sign * a.kind.localeCompare(b.kind);
    const x = number(a);
    const y = number(b);
    if (x === undefined || y === undefined) return Number(x === undefined) - Number(y === undefined);
    return sign * (x - y);
  });
}
