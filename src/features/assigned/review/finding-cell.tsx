import { Tooltip } from '@/components/ui/tooltip';
import type { PeopleTable, WantedFinding } from '@/contract/assigned-sweeps';
import { formatNumber } from '@/graphics/numbers';
import { joinClasses } from '@/lib/join-classes';

type Cell = PeopleTable['rows'][number]['cells'][string];

/** What one person gave for one finding, what the tool proposes with its reason, and what was decided. */
export function FindingCell({
  wanted,
  cell,
}: {
  readonly wanted: WantedFinding;
  readonly cell: Cell | undefined;
}) {
  if (!cell || (cell.value === null && !cell.text)) return <span className="text-muted">nothing given</span>;
  const { value, text, proposal, judgement } = cell;
  return (
    <div className="grid gap-0.5">
      {value === null ? null : (
        <span className="figures">
          {formatNumber(value, 6)}
          {wanted.kind === 'number' && wanted.unit ? ` ${wanted.unit}` : ''}
        </span>
      )}
      {text ? <span className="line-clamp-2 max-w-56 text-sm">{text}</span> : null}
      {proposal.judgement ? (
        <Tooltip text={proposal.reason}>
          <span
            tabIndex={0}
            className={joinClasses(
              'w-fit text-sm',
              proposal.judgement === 'agrees' ? 'text-accent' : 'text-caution',
            )}
          >
            proposed: {proposal.judgement}
            <span className="sr-only">. {proposal.reason}</span>
          </span>
        </Tooltip>
      ) : (
        <span className="sr-only">{proposal.reason}</span>
      )}
      {judgement ? (
        <span
          className={joinClasses(
            'w-fit rounded border px-1.5 text-sm font-medium',
            judgement === 'agrees' ? 'border-accent text-accent' : 'border-caution text-caution',
          )}
        >
          judged: {judgement}
        </span>
      ) : null}
    </div>
  );
}
