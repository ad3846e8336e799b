import type { Branch, SweepResult } from '@/engine/continuation/contract';

/** A stretch of a branch along which stability and feasibility stay the same; ends overlap by one point. */
export interface BranchRun {
  readonly branch: number;
  readonly from: number;
  readonly to: number;
  /** 1 attracts, 0 repels, 2 neutral or undecided. */
  readonly attracts: number;
  readonly feasible: boolean;
}

export function branchRuns(branch: Branch, index: number): readonly BranchRun[] {
  const runs: BranchRun[] = [];
  const count = branch.parameters.length;
  let from = 0;
  for (let k = 1; k <= count; k++) {
    const same =
      k < count &&
      branch.attracts[k] === branch.attracts[from] &&
      branch.feasible[k] === branch.feasible[from];
    if (same) continue;
    runs.push({
      branch: index,
      from,
      to: Math.min(k, count - 1),
      attracts: branch.attracts[from] ?? 2,
      feasible: branch.feasible[from] === 1,
    });
    from = k;
  }
  return runs;
}

export function sweepRuns(sweep: SweepResult): readonly BranchRun[] {
  return sweep.branches.flatMap((branch, index) => branchRuns(branch, index));
}

export const STABILITY_WORDS = ['repels', 'attracts', 'neutral or undecided'] as const;

/** Solid 2.6 px where it attracts, dashed 1.4 px where it repels, dotted where that is open. */
export function runStyle(
  attracts: number,
  twin: boolean,
): { readonly width: number; readonly dash?: readonly number[] } {
  if (attracts === 1) return { width: twin ? 1.9 : 2.6 };
  return { width: 1.4, dash: attracts === 0 ? [6, 4] : [1.5, 3.5] };
}
