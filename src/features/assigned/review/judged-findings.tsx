import { Button } from '@/components/ui/button';
import type { Judgement } from '@/contract/assigned-sweeps';

import { JudgedFinding } from './judged-finding';
import type { ReviewPart } from './review-view';

/** Every finding that was wanted; proposals can be taken over at once and changed one by one. */
export function JudgedFindings(part: ReviewPart) {
  const { handIn, review, onChange } = part;
  const proposed = handIn.wanted.flatMap(({ id }): (readonly [string, Judgement])[] => {
    const judgement = handIn.proposals[id]?.judgement;
    return judgement && !review.judgements[id] ? [[id, judgement]] : [];
  });
  return (
    <section aria-label="Findings" className="grid gap-3">
      <div className="flex flex-wrap items-baseline justify-between gap-3">
        <h2 className="text-xl">Findings</h2>
        {proposed.length > 0 ? (
          <Button
            size="small"
            onClick={() =>
              onChange({ judgements: { ...review.judgements, ...Object.fromEntries(proposed) } })
            }
          >
            Take over what is proposed
          </Button>
        ) : null}
      </div>
      <ul className="divide-y rounded-lg border bg-raised">
        {handIn.wanted.map((wanted) => (
          <JudgedFinding key={wanted.id} {...part} wanted={wanted} />
        ))}
      </ul>
    </section>
  );
}
