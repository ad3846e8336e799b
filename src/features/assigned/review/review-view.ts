import type { Remark, ReviewedHandIn, SaveReview } from '@/contract/assigned-sweeps';

export type ReviewEdits = Omit<SaveReview, 'baseRevision'>;

/** The review with what was changed here over what the server has. */
export function reviewOf({ review }: ReviewedHandIn, edits: Partial<ReviewEdits>): ReviewEdits {
  return {
    judgements: edits.judgements ?? review?.judgements ?? {},
    remarks: edits.remarks ?? review?.remarks ?? [],
    note: edits.note ?? review?.note ?? '',
    outcome: edits.outcome === undefined ? (review?.outcome ?? null) : edits.outcome,
  };
}

export interface ReviewPart {
  readonly handIn: ReviewedHandIn;
  readonly review: ReviewEdits;
  readonly onChange: (edits: Partial<ReviewEdits>) => void;
}

export function withRemark(remarks: readonly Remark[], next: Remark): Remark[] {
  return remarks.some(({ id }) => id === next.id)
    ? remarks.map((one) => (one.id === next.id ? next : one))
    : [...remarks, next];
}

export function newRemark(about: Pick<Remark, 'finding' | 'place'>, text: string): Remark {
  return { id: crypto.randomUUID(), ...about, text };
}
