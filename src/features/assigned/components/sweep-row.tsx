import { Link } from 'react-router-dom';

import type { AssignedSummary } from '@/contract/assigned-sweeps';

import { AssignedStateChip } from './assigned-state-chip';
import { CountFigures } from './count-figures';
import { DueWords } from './due-words';
import { WorkStateChip } from './work-state-chip';

/** One assigned sweep in a list: those who set it are led to its editor and the work on it, others to their task. */
export function SweepRow({ sweep, withLab }: { readonly sweep: AssignedSummary; readonly withLab: boolean }) {
  const { title, lab, state, dueAt, timeZone, mine, counts } = sweep;
  return (
    <li className="grid gap-1.5 px-4 py-3">
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1">
        <Link
          to={counts ? `/assigned/${sweep.id}/set` : `/assigned/${sweep.id}`}
          className="min-w-0 font-medium break-words hover:underline"
        >
          {title}
        </Link>
        <span className="flex items-center gap-2">
          {counts && state !== 'draft' ? (
            <Link
              to={`/assigned/${sweep.id}/review`}
              aria-label={`Review ${title}`}
              className="text-sm text-accent underline underline-offset-2"
            >
              review
            </Link>
          ) : null}
          {mine ? <WorkStateChip state={mine} /> : null}
          {counts || state === 'closed' ? <AssignedStateChip state={state} /> : null}
        </span>
      </div>
      <p className="text-sm">
        {withLab ? <span className="text-muted">{lab.name}, </span> : null}
        <DueWords dueAt={dueAt} timeZone={timeZone} open={state === 'open'} />
      </p>
      {counts && state !== 'draft' ? <CountFigures counts={counts} /> : null}
    </li>
  );
}
