import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';

import { buttonClasses } from '@/components/ui/button';
import { ErrorState, LoadingState } from '@/components/states/page-state';
import type { PresetQuery, PresetSummary } from '@/contract/presets';
import { formatDayAndTime } from '@/lib/format';
import { useSession } from '@/lib/session';

import { usePresetList } from './api/list-presets';
import { PopulationDots } from './components/population-dots';

function PresetRow({ preset }: { readonly preset: PresetSummary }) {
  return (
    <li className="relative grid gap-0.5 px-4 py-3 hover:bg-panel">
      <Link to={`/presets/${preset.id}`} className="font-medium after:absolute after:inset-0 hover:underline">
        {preset.title}
      </Link>
      <PopulationDots populations={preset.populations} />
      <p className="text-sm text-muted">
        {preset.starter
          ? 'starter'
          : `${preset.owner?.name ?? 'unknown'}, version ${preset.version}, ${formatDayAndTime(preset.changedAt)}`}
      </p>
    </li>
  );
}

function Shelf({
  title,
  query,
  empty,
  more,
}: {
  readonly title: string;
  readonly query: Partial<PresetQuery>;
  readonly empty: string;
  readonly more: string;
}) {
  const presets = usePresetList(query);
  return (
    <section className="grid content-start gap-2" aria-label={title}>
      <div className="flex items-baseline justify-between">
        <h2 className="text-xl">{title}</h2>
        <Link to={more} className="text-sm text-accent underline underline-offset-2">
          all of them
        </Link>
      </div>
      {presets.isPending ? <LoadingState label="Reading…" /> : null}
      {presets.isError ? <ErrorState error={presets.error} /> : null}
      {presets.data && presets.data.items.length === 0 ? (
        <p className="rounded-lg border border-dashed p-4 text-muted">{empty}</p>
      ) : null}
      {presets.data && presets.data.items.length > 0 ? (
        <ul className="divide-y overflow-hidden rounded-lg border bg-raised">
          {presets.data.items.map((preset) => (
            <PresetRow key={preset.id} preset={preset} />
          ))}
        </ul>
      ) : null}
    </section>
  );
}

/** What is new, and where to begin. */
export default function DeskPage({ assigned }: { readonly assigned: ReactNode }) {
  const user = useSession().data?.user;
  return (
    <div className="mx-auto grid max-w-6xl gap-8 px-4 py-8">
      <div className="flex flex-wrap items-end justify-between gap-3">
        <div>
          <h1 className="text-3xl">{user ? `Desk of ${user.name}` : 'Desk'}</h1>
          <p className="text-muted">
            {user?.memberships.map((membership) => `${membership.role} in ${membership.labName}`).join(', ')}
          </p>
        </div>
        <Link to="/presets/new" className={buttonClasses('primary')}>
          New preset
        </Link>
      </div>
      {assigned}
      <div className="grid gap-8 lg:grid-cols-3">
        <Shelf
          title="Your presets"
          query={{ kind: 'own', pageSize: 6 }}
          empty="None yet. Start from a starter, or define a population of your own."
          more="/presets?kind=own"
        />
        <Shelf
          title="New in your labs"
          query={{ kind: 'lab', pageSize: 6 }}
          empty="Nothing is open to your labs yet."
          more="/presets?kind=lab"
        />
        <Shelf
          title="Starters"
          query={{ kind: 'starter', sort: 'title', pageSize: 6 }}
          empty="No starters are installed."
          more="/presets?kind=starter"
        />
      </div>
    </div>
  );
}
