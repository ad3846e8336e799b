import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useParams } from 'react-router-dom';

import { ErrorState, LoadingState } from '@/components/states/page-state';
import { saveReviewSchema, type ReviewedHandIn } from '@/contract/assigned-sweeps';

import { fetchHandIn, REVIEW_KEYS, saveReview } from '../api/review-operations';
import { SavingWords } from '../keeping/saving-words';
import { useKeeper } from '../keeping/use-keeper';
import { EvidenceSection } from './evidence-section';
import { HandInHeader } from './hand-in-header';
import { JudgedFindings } from './judged-findings';
import { OutcomeSection } from './outcome-section';
import { reviewOf, type ReviewEdits } from './review-view';

const revisionOf = ({ review }: ReviewedHandIn) => review?.revision ?? 0;

function bodyOf(handIn: ReviewedHandIn, edits: Partial<ReviewEdits>) {
  return { ...reviewOf(handIn, edits), baseRevision: revisionOf(handIn) };
}

function refusalOf(handIn: ReviewedHandIn, edits: Partial<ReviewEdits>): string | null {
  const parsed = saveReviewSchema.safeParse(bodyOf(handIn, edits));
  return parsed.success ? null : (parsed.error.issues[0]?.message ?? 'Something in it cannot be saved.');
}

function HandInReview({ initial }: { readonly initial: ReviewedHandIn }) {
  const queries = useQueryClient();
  const [busy, setBusy] = useState(false);
  const { id } = initial;
  const { keeper, body, edits, saving } = useKeeper<ReviewedHandIn, ReviewEdits>({
    initial,
    revisionOf,
    send: (base, changed) => saveReview(id, bodyOf(base, changed)),
    fetch: () => fetchHandIn(id),
    check: refusalOf,
    // Once it was given back, a change is seen by its person: it goes with the next giving back.
    automatic: ({ review }) => !review?.outcome,
    onBody: (fresh) => {
      queries.setQueryData(REVIEW_KEYS.handIn(id), fresh);
      void queries.invalidateQueries({ queryKey: REVIEW_KEYS.table(fresh.assigned.id), refetchType: 'none' });
      void queries.invalidateQueries({ queryKey: ['assigned', 'lab'], refetchType: 'none' });
    },
  });
  const part = { handIn: body, review: reviewOf(body, edits), onChange: keeper.change };
  const changed = Object.keys(edits).length > 0;

  const handleGive = async (outcome: NonNullable<ReviewEdits['outcome']>) => {
    setBusy(true);
    keeper.change({ outcome });
    if (!(await keeper.flush())) keeper.forget('outcome');
    setBusy(false);
  };

  return (
    <div className="mx-auto grid max-w-6xl gap-8 px-4 py-8">
      <HandInHeader handIn={body} />
      <JudgedFindings {...part} />
      <EvidenceSection {...part} />
      <OutcomeSection
        {...part}
        busy={busy}
        changed={changed}
        onGive={(outcome) => void handleGive(outcome)}
      />
      {body.review?.outcome && saving.state === 'waiting' ? null : (
        <SavingWords keeper={keeper} saving={saving} />
      )}
    </div>
  );
}

/** One hand-in exactly as it was, and its review. */
export default function HandInPage() {
  const { id = '' } = useParams();
  const handIn = useQuery({
    queryKey: REVIEW_KEYS.handIn(id),
    queryFn: () => fetchHandIn(id),
    refetchOnMount: 'always',
    refetchOnWindowFocus: false,
  });
  if (handIn.isError) return <ErrorState error={handIn.error} />;
  if (!handIn.data || (handIn.isFetching && !handIn.isFetchedAfterMount))
    return <LoadingState label="Opening the hand-in…" />;
  return <HandInReview key={id} initial={handIn.data} />;
}
