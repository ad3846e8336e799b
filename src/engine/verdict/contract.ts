/** The answer to "does the split stabilise?" with what it rests on. */
export type VerdictAnswer =
  | 'stabilises'
  | 'stabilises partly'
  | 'destabilises'
  | 'no effect found'
  | 'depends'
  | 'not comparable'
  | 'cannot say';

export interface Verdict {
  readonly answer: VerdictAnswer;
  /** One plain sentence. */
  readonly sentence: string;
  readonly evidence: readonly VerdictEvidence[];
  readonly restsOn: readonly string[];
  readonly leavesOpen: readonly string[];
  /** Cautions due, e.g. on harvest. */
  readonly cautions: readonly string[];
}

/** What margins leave open; once cycles are followed on both sides, the second half is known. */
export const OPEN_WITHOUT_CYCLES =
  'What large disturbances do, and how wide and low cycles swing: margins speak of small disturbances.';
export const OPEN_WITH_CYCLES =
  'What large disturbances do: margins and the cycles followed speak of what lies near them.';

export interface VerdictEvidence {
  readonly label: string;
  readonly unit: string;
  /** Null: none found or not computed; `note` says which. */
  readonly pooled: number | null;
  readonly split: number | null;
  readonly note: string;
}
