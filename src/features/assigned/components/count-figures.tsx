import { WORK_STATES, type AssignedSummary, type WorkState } from '@/contract/assigned-sweeps';
import { joinClasses } from '@/lib/join-classes';

const BARS: Readonly<Record<WorkState, string>> = {
  untouched: 'bg-hairline',
  running: 'bg-muted',
  sent: 'bg-ink',
  agreed: 'bg-accent',
  differs: 'bg-caution',
  'sent back': 'bg-caution/60',
};

/** How many people stand where: figures with their words, and their shares as a bar. */
export function CountFigures({ counts }: { readonly counts: NonNullable<AssignedSummary['counts']> }) {
  const shown = WORK_STATES.map((state) => ({ state, count: counts[state] })).filter(
    ({ count }) => count > 0,
  );
  const total = shown.reduce((sum, { count }) => sum + count, 0);
  if (total === 0) return <p className="text-sm text-muted">for nobody yet</p>;
  return (
    <div className="grid gap-1">
      <div aria-hidden className="flex h-1.5 w-full gap-px overflow-hidden rounded-full">
        {shown.map(({ state, count }) => (
          <span key={state} className={BARS[state]} style={{ width: `${(100 * count) / total}%` }} />
        ))}
      </div>
      <ul className="flex flex-wrap gap-x-3 text-sm text-muted">
        {shown.map(({ state, count }) => (
          <li key={state} className="flex items-center gap-1">
            <span aria-hidden className={joinClasses('size-2 rounded-full', BARS[state])} />
            <span className="figures text-ink">{count}</span> {state}
          </li>
        ))}
      </ul>
    </div>
  );
}
