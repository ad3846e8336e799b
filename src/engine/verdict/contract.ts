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

export interface VerdictEvidence {
  readonly label: string;
  readonly unit: string;
  /** Null: none found or not computed; `note` says which. */
  readonly pooled: number | null;
  readonly split: number | null;
  readonly note: string;
}
