import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';

import { Markdown } from '@/components/markdown/markdown';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import { buttonClasses } from '@/components/ui/button';
import type { Freedom, WantedFinding } from '@/contract/assigned-sweeps';
import { parameterName } from '@/graphics/quantities';

import { ASSIGNED_KEYS, fetchTask } from '../api/assigned-operations';
import { DueWords } from '../components/due-words';
import { WorkStateChip } from '../components/work-state-chip';
import { HandInView } from './hand-in-view';

function freedomWords({ model, parameters, range }: Freedom, nameOf: (key: string) => string): string {
  const numbers =
    model || parameters === 'all'
      ? 'every number'
      : parameters.length === 0
        ? null
        : parameters.map(nameOf).join(', ');
  const free = [model ? 'the model itself' : null, numbers, range ? 'the sweep' : null].filter(Boolean);
  return free.length === 0
    ? 'Model and sweep are locked; start values and views are yours.'
    : `You may change ${free.join(', ')}, and start values and views.`;
}

function wantedWords(wanted: WantedFinding): string {
  if (wanted.kind === 'special point')
    return `${wanted.point} of the ${wanted.of === 'split' ? 'split' : 'pooled'} model`;
  return wanted.kind === 'number' ? (wanted.unit ? `a number (${wanted.unit})` : 'a number') : 'in words';
}

/** An assigned sweep as its assignee sees it: what is asked, when, and what became of what was handed in. */
export default function TaskPage() {
  const { id = '' } = useParams();
  const task = useQuery({
    queryKey: ASSIGNED_KEYS.task(id),
    queryFn: ({ signal }) => fetchTask(id, signal),
  });
  if (task.isPending) return <LoadingState label="Opening the assigned sweep…" />;
  if (task.isError) return <ErrorState error={task.error} />;
  const { data } = task;
  const nameOf = (key: string) => parameterName(data.document, key).name;
  const open = data.state === 'open';
  const begun = data.mine !== 'untouched';
  return (
    <div className="mx-auto grid max-w-4xl gap-6 px-4 py-8">
      <header className="grid gap-2">
        <p className="text-sm text-muted">
          {data.lab.name}, set by {data.setBy}
        </p>
        <h1 className="text-2xl">{data.title}</h1>
        <p className="flex flex-wrap items-center gap-3">
          <WorkStateChip state={data.mine} />
          <DueWords dueAt={data.dueAt} timeZone={data.timeZone} open={open} />
          {open ? null : <span className="text-caution">closed</span>}
        </p>
      </header>
      {data.brief ? (
        <section aria-label="Brief">
          <Markdown text={data.brief} />
        </section>
      ) : null}
      <section aria-label="What is asked" className="grid gap-2">
        <h2 className="text-lg">What is asked</h2>
        <p>
          Sweep {nameOf(data.range.parameter)} from {String(data.range.from)} to {String(data.range.to)}.{' '}
          {freedomWords(data.freedom, nameOf)}
        </p>
        <ul className="divide-y rounded-lg border bg-raised">
          {data.wanted.map((one) => (
            <li key={one.id} className="flex flex-wrap justify-between gap-x-4 px-4 py-2">
              <span>{one.label}</span>
              <span className="text-muted">{wantedWords(one)}</span>
            </li>
          ))}
        </ul>
        <p>
          <Link to={`/assigned/${id}/work`} className={buttonClasses('primary')}>
            {open
              ? begun
                ? 'Go on in the workbench'
                : 'Begin in the workbench'
              : 'Look at it in the workbench'}
          </Link>
        </p>
      </section>
      {data.handIns.length > 0 ? (
        <section aria-label="Hand-ins" className="grid gap-3">
          <h2 className="text-lg">Handed in</h2>
          {data.handIns.map((one) => (
            <HandInView key={one.id} handIn={one} wanted={data.wanted} reference={data.reference} />
          ))}
        </section>
      ) : null}
    </div>
  );
}
