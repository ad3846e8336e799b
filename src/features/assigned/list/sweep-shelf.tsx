import { Link } from 'react-router-dom';
import type { UseQueryResult } from '@tanstack/react-query';

import { ErrorState, LoadingState } from '@/components/states/page-state';
import type { AssignedPage } from '@/contract/assigned-sweeps';

import { SweepRow } from '../components/sweep-row';

interface SweepShelfProps {
  readonly title: string;
  readonly sweeps: UseQueryResult<AssignedPage>;
  readonly most: number;
  readonly empty: string;
  readonly withLab: boolean;
  readonly more: string | null;
}

/** The first few of a list of sweeps, as a part of another page. */
export function SweepShelf({ title, sweeps, most, empty, withLab, more }: SweepShelfProps) {
  return (
    <section aria-label={title} className="grid content-start gap-2">
      <div className="flex items-baseline justify-between">
        <h2 className="text-xl">{title}</h2>
        {more ? (
          <Link to={more} className="text-sm text-accent underline underline-offset-2">
            all of them
          </Link>
        ) : null}
      </div>
      {sweeps.isPending ? <LoadingState label="Reading…" /> : null}
      {sweeps.isError ? <ErrorState error={sweeps.error} /> : null}
      {sweeps.data?.items.length === 0 ? (
        <p className="rounded-lg border border-dashed p-4 text-muted">{empty}</p>
      ) : null}
      {sweeps.data && sweeps.data.items.length > 0 ? (
        <ul className="divide-y rounded-lg border bg-raised">
          {sweeps.data.items.slice(0, most).map((sweep) => (
            <SweepRow key={sweep.id} sweep={sweep} withLab={withLab} />
          ))}
        </ul>
      ) : null}
    </section>
  );
}
