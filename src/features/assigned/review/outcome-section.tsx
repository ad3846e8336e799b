import { TextAreaField } from '@/components/fields/text-area-field';
import { Button } from '@/components/ui/button';
import { ASSIGNED_LIMITS } from '@/contract/assigned-sweeps';
import { formatDayAndTime } from '@/lib/format';

import type { ReviewEdits, ReviewPart } from './review-view';

interface OutcomeSectionProps extends ReviewPart {
  readonly busy: boolean;
  /** Whether something was changed after the review was given back. */
  readonly changed: boolean;
  readonly onGive: (outcome: NonNullable<ReviewEdits['outcome']>) => void;
}

const OUTCOMES = [
  { outcome: 'agreed', label: 'Give back: agreed', look: 'primary' },
  { outcome: 'differs', label: 'Give back: differs', look: 'plain' },
  { outcome: 'sent back', label: 'Send back to be done again', look: 'caution' },
] as const;

/** The words that go with a review, and how it ends. Until then only reviewers see it. */
export function OutcomeSection({ handIn, review, onChange, busy, changed, onGive }: OutcomeSectionProps) {
  const given = handIn.review?.outcome ? handIn.review : null;
  return (
    <section aria-label="Outcome" className="grid gap-3">
      <h2 className="text-xl">Outcome</h2>
      {given ? (
        <p>
          Given back as <span className="font-medium">{given.outcome}</span> by {given.by},{' '}
          {formatDayAndTime(given.at)}.{' '}
          {changed ? 'What you have changed since is sent when you give it back again.' : ''}
        </p>
      ) : (
        <p className="text-muted">Kept as a draft that only reviewers see, until you give it back.</p>
      )}
      <TextAreaField
        label={`Note to ${handIn.person.name}`}
        rows={4}
        maxLength={ASSIGNED_LIMITS.textLength}
        value={review.note}
        onChange={(note) => onChange({ note })}
      />
      <div className="flex flex-wrap gap-2">
        {OUTCOMES.map(({ outcome, label, look }) => (
          <Button key={outcome} look={look} disabled={busy} onClick={() => onGive(outcome)}>
            {label}
          </Button>
        ))}
      </div>
    </section>
  );
}
