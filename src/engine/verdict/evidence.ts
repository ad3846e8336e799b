import type { SpecialPoint } from '../continuation/contract';
import type { PairFinding } from './compare-equilibria';
import type { SweepComparison } from './compare-sweeps';
import type { VerdictEvidence } from './contract';
import type { EquilibriumPair } from './pair-by-continuation';
import type { VerdictInput } from './verdict';

/** Stability margins pooled and split, a row for each pair of coexistence equilibria. */
export function equilibriumEvidence(
  pairs: readonly EquilibriumPair[],
  findings: readonly PairFinding[],
  timeUnit: string,
): VerdictEvidence[] {
  return pairs.map((pair, k) => ({
    label: pairs.length === 1 ? 'stability margin' : `stability margin, equilibrium ${k + 1}`,
    unit: `1/${timeUnit}`,
    pooled: findings[k].pooledMargin,
    split: findings[k].splitMargin,
    note: marginNote(pair, findings[k]),
  }));
}

function marginNote(pair: EquilibriumPair, finding: PairFinding): string {
  const types = `${pair.pooled?.type ?? 'no counterpart found'} pooled, ${pair.split.type} split.`;
  const { margin } = pair.split;
  if (margin === null || finding.splitMargin === null || finding.splitMargin <= margin) return types;
  return `${types} Changes of composition alone die more slowly, at ${margin.toPrecision(3)}; they are not counted.`;
}

/** Special points that moved or came or went, in order along the range. */
export function sweepEvidence(input: VerdictInput, comparison: SweepComparison | null): VerdictEvidence[] {
  if (comparison === null) return [];
  const unit = input.parameterUnit ?? '';
  return comparison.shifts.map((shift) => ({
    label: shift.kind === 'Hopf' ? 'onset of cycles (Hopf)' : shift.kind,
    unit,
    pooled: shift.pooled?.parameter ?? null,
    split: shift.split?.parameter ?? null,
    note: [missingSide(shift.pooled, shift.split), criticalityNote(shift.pooled, shift.split)]
      .filter((part) => part !== '')
      .join(' '),
  }));
}

function missingSide(pooled: SpecialPoint | null, split: SpecialPoint | null): string {
  if (pooled === null) return 'None found for the pooled twin in the range.';
  if (split === null) return 'None found for the split model in the range.';
  return '';
}

function criticalityNote(pooled: SpecialPoint | null, split: SpecialPoint | null): string {
  const before = pooled?.hopf?.criticality;
  const after = split?.hopf?.criticality;
  if (before !== undefined && after !== undefined)
    return before === after
      ? `${capitalised(after)} in both.`
      : `${capitalised(before)} pooled, ${after} split.`;
  const only = before ?? after;
  return only === undefined ? '' : `${capitalised(only)}.`;
}

function capitalised(word: string): string {
  return word.charAt(0).toUpperCase() + word.slice(1);
}
