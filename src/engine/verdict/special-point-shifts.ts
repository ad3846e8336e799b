import type { SpecialPoint, SpecialPointKind, SweepResult } from '../continuation/contract';

/** A special point of the pooled twin and the one of the split model that it became, in order along the range. */
export interface SpecialPointShift {
  readonly kind: SpecialPointKind;
  readonly pooled: SpecialPoint | null;
  readonly split: SpecialPoint | null;
  /** Split minus pooled, in units of the parameter; null where one of them is missing. */
  readonly moved: number | null;
}

/**
 * Pairs the feasible special points of two sweeps: of one kind, and with the same populations absent on their
 * branches, those nearest along the range first. Points without a partner stay alone.
 * It pairs by place, not by following each point in spread, which the caller should say.
 */
export function specialPointShifts(split: SweepResult, pooled: SweepResult): SpecialPointShift[] {
  const mine = split.specialPoints.filter((point) => point.feasible);
  const theirs = pooled.specialPoints.filter((point) => point.feasible);
  const absentOn = (sweep: SweepResult, point: SpecialPoint): string =>
    [...(sweep.branches[point.branch]?.absent ?? [])].sort().join(' ');
  const candidates = mine
    .flatMap((a) =>
      theirs
        .filter((b) => b.kind === a.kind && absentOn(split, a) === absentOn(pooled, b))
        .map((b) => ({ a, b, gap: Math.abs(a.parameter - b.parameter) })),
    )
    .sort((x, y) => x.gap - y.gap);
  const used = new Set<SpecialPoint>();
  const shifts: SpecialPointShift[] = [];
  for (const { a, b } of candidates) {
    if (used.has(a) || used.has(b)) continue;
    used.add(a);
    used.add(b);
    shifts.push({ kind: a.kind, pooled: b, split: a, moved: a.parameter - b.parameter });
  }
  for (const point of mine)
    if (!used.has(point)) shifts.push({ kind: point.kind, pooled: null, split: point, moved: null });
  for (const point of theirs)
    if (!used.has(point)) shifts.push({ kind: point.kind, pooled: point, split: null, moved: null });
  const place = (shift: SpecialPointShift): number => (shift.pooled ?? shift.split)?.parameter ?? 0;
  return shifts.sort((x, y) => place(x) - place(y));
}
