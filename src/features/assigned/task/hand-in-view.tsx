import type { OwnHandIn, Reference, WantedFinding } from '@/contract/assigned-sweeps';
import { formatNumber } from '@/graphics/numbers';
import { formatDayAndTime } from '@/lib/format';

const number = (value: number | null | undefined) =>
  value === null || value === undefined ? '' : formatNumber(value, 6);

/** One hand-in as it was received, and what its reviewer gave back. */
export function HandInView({
  handIn,
  wanted,
  reference,
}: {
  readonly handIn: OwnHandIn;
  readonly wanted: readonly WantedFinding[];
  readonly reference: Reference | null;
}) {
  const { review } = handIn;
  return (
    <article aria-label={`Hand-in ${handIn.number}`} className="grid gap-3 rounded-lg border bg-raised p-4">
      <header className="flex flex-wrap items-baseline justify-between gap-x-4">
        <h3 className="text-lg">
          Hand-in {handIn.number}
          {review?.outcome ? `: ${review.outcome}` : ''}
        </h3>
        <p className="text-sm text-muted">
          {formatDayAndTime(handIn.handedInAt)}
          {handIn.late ? ', late' : ''}, receipt <code className="figures">{handIn.code}</code>
        </p>
      </header>
      {review?.outcome ? (
        <p className="whitespace-pre-wrap">
          <span className="font-medium">{review.by}:</span> {review.note || 'no further words.'}
        </p>
      ) : (
        <p className="text-muted">Not reviewed yet.</p>
      )}
      <div className="overflow-x-auto">
        <table className="w-full border-collapse text-sm">
          <thead>
            <tr className="border-b text-left text-muted">
              <th className="py-1 pr-3 font-medium">finding</th>
              <th className="py-1 pr-3 text-right font-medium">given</th>
              {reference ? <th className="py-1 pr-3 text-right font-medium">reference</th> : null}
              <th className="py-1 pr-3 font-medium">judged</th>
              <th className="py-1 font-medium">words</th>
            </tr>
          </thead>
          <tbody>
            {wanted.map((one) => {
              const given = handIn.findings.find((finding) => finding.id === one.id);
              const expected = reference?.findings.find((finding) => finding.id === one.id);
              const judged = review?.judgements[one.id];
              const remarks = review?.remarks.filter((remark) => remark.finding === one.id) ?? [];
              return (
                <tr key={one.id} className="border-b align-top last:border-0">
                  <th scope="row" className="py-1.5 pr-3 text-left font-normal">
                    {one.label}
                  </th>
                  <td className="figures py-1.5 pr-3 text-right">{number(given?.value)}</td>
                  {reference ? (
                    <td className="figures py-1.5 pr-3 text-right">{number(expected?.value)}</td>
                  ) : null}
                  <td
                    className={judged === 'differs' ? 'py-1.5 pr-3 text-caution' : 'py-1.5 pr-3 text-accent'}
                  >
                    {judged ?? ''}
                  </td>
                  <td className="py-1.5 whitespace-pre-wrap">
                    {given?.text}
                    {remarks.map((remark) => (
                      <span key={remark.id} className="block text-accent">
                        {review?.by}: {remark.text}
                      </span>
                    ))}
                    {one.kind === 'reading' && expected?.text ? (
                      <span className="block text-muted">Reference: {expected.text}</span>
                    ) : null}
                  </td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
      {(review?.remarks ?? [])
        .filter((remark) => remark.finding === null)
        .map((remark) => (
          <p key={remark.id} className="text-sm">
            {remark.place
              ? `At ${formatNumber(remark.place.parameter, 5)}, ${remark.place.of} = ${formatNumber(remark.place.value, 4)}: `
              : ''}
            {remark.text}
          </p>
        ))}
    </article>
  );
}
