import { useState } from 'react';

import { Button } from '@/components/ui/button';
import { JUDGEMENTS, type Judgement, type WantedFinding } from '@/contract/assigned-sweeps';
import { formatNumber } from '@/graphics/numbers';
import { joinClasses } from '@/lib/join-classes';

import { NewRemark, RemarkField } from './remark-fields';
import { newRemark, withRemark, type ReviewPart } from './review-view';

const number = (value: number | null | undefined) =>
  value === null || value === undefined ? '' : formatNumber(value, 7);

/** One finding: theirs beside the reference, what the tool proposes and why, the decision, and remarks. */
export function JudgedFinding({
  handIn,
  review,
  onChange,
  wanted,
}: ReviewPart & { readonly wanted: WantedFinding }) {
  const [writing, setWriting] = useState(false);
  const given = handIn.findings.find(({ id }) => id === wanted.id);
  const expected = handIn.reference.findings.find(({ id }) => id === wanted.id);
  const proposal = handIn.proposals[wanted.id];
  const judged = review.judgements[wanted.id];
  const remarks = review.remarks.filter(({ finding }) => finding === wanted.id);
  const unit = wanted.kind === 'number' && wanted.unit ? ` ${wanted.unit}` : '';

  const handleJudge = (judgement: Judgement) => {
    const rest = Object.fromEntries(
      Object.entries(review.judgements).filter(([id]) => id !== wanted.id),
    ) as typeof review.judgements;
    onChange({ judgements: judged === judgement ? rest : { ...rest, [wanted.id]: judgement } });
  };

  return (
    <li className="grid gap-3 p-4 lg:grid-cols-[minmax(0,1fr)_minmax(0,1fr)_minmax(0,1.2fr)]">
      <div className="grid content-start gap-1">
        <h3 className="text-lg">{wanted.label}</h3>
        <p className="text-sm text-muted">
          {wanted.kind === 'special point'
            ? `${wanted.point} of the ${wanted.of === 'split' ? 'split model' : 'pooled twin'}`
            : wanted.kind === 'number'
              ? `a number${unit ? ` in${unit}` : ''}`
              : 'a reading in words'}
        </p>
        <div role="group" aria-label={`Decision on ${wanted.label}`} className="flex gap-2 pt-1">
          {JUDGEMENTS.map((judgement) => (
            <Button
              key={judgement}
              size="small"
              aria-pressed={judged === judgement}
              look={judged === judgement ? (judgement === 'agrees' ? 'primary' : 'caution') : 'plain'}
              className={
                judged === judgement && judgement === 'differs' ? 'bg-caution! text-raised!' : undefined
              }
              onClick={() => handleJudge(judgement)}
            >
              {judgement}
            </Button>
          ))}
        </div>
      </div>
      <dl className="grid content-start gap-1 text-sm">
        <div>
          <dt className="inline text-muted">theirs </dt>
          <dd className="inline">
            <span className="figures text-base">
              {number(given?.value)}
              {given?.value === null || !given ? '' : unit}
            </span>
            {given?.pin ? <span className="text-muted"> pinned from a sweep</span> : null}
            {given?.text ? <span className="block whitespace-pre-wrap">{given.text}</span> : null}
            {!given || (given.value === null && !given.text) ? 'nothing given' : null}
          </dd>
        </div>
        <div>
          <dt className="inline text-muted">reference </dt>
          <dd className="inline">
            <span className="figures text-base">
              {number(expected?.value)}
              {expected?.value === null || !expected ? '' : unit}
            </span>
            {expected?.text ? <span className="block whitespace-pre-wrap">{expected.text}</span> : null}
            {!expected || (expected.value === null && !expected.text) ? 'none' : null}
          </dd>
        </div>
        {proposal ? (
          <div>
            <dt className="inline text-muted">proposed </dt>
            <dd
              className={joinClasses(
                'inline',
                proposal.judgement === 'agrees' && 'text-accent',
                proposal.judgement === 'differs' && 'text-caution',
              )}
            >
              {proposal.judgement ? `${proposal.judgement}: ` : ''}
              {proposal.reason}
            </dd>
          </div>
        ) : null}
      </dl>
      <div className="grid content-start gap-2">
        {remarks.map((remark, index) => (
          <RemarkField
            key={remark.id}
            label={`Remark ${index + 1} on ${wanted.label}`}
            remark={remark}
            onChange={(next) => onChange({ remarks: withRemark(review.remarks, next) })}
            onRemove={() => onChange({ remarks: review.remarks.filter(({ id }) => id !== remark.id) })}
          />
        ))}
        {writing ? (
          <NewRemark
            label={`Remark on ${wanted.label}`}
            onAdd={(text) => {
              onChange({
                remarks: [...review.remarks, newRemark({ finding: wanted.id, place: null }, text)],
              });
              setWriting(false);
            }}
            onCancel={() => setWriting(false)}
          />
        ) : (
          <Button
            size="small"
            className="justify-self-start"
            aria-label={`Remark on ${wanted.label}`}
            onClick={() => setWriting(true)}
          >
            Remark
          </Button>
        )}
      </div>
    </li>
  );
}
