import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState, type ReactNode } from 'react';
import { Link, useNavigate } from 'react-router-dom';

import { Button, buttonClasses } from '@/components/ui/button';
import { ErrorState, LoadingState, PageState } from '@/components/states/page-state';
import type { PresetSummary } from '@/contract/presets';
import { plural } from '@/lib/format';
import { joinClasses } from '@/lib/join-classes';
import { useSession } from '@/lib/session';

import { deletePreset } from './api/delete-preset';
import { duplicatePreset } from './api/duplicate-preset';
import { usePresetChoices, usePresetList } from './api/list-presets';
import { DeletedPresets } from './components/deleted-presets';
import { DeleteDialog } from './components/delete-dialog';
import { ImportButton } from './components/import-button';
import { LibraryFilters } from './components/library-filters';
import { Pager } from './components/pager';
import { PresetCard } from './components/preset-card';
import { useLibraryQuery } from './query-state';

interface LibraryPageProps {
  /** Asks where a preset is to be set as an assigned sweep; null for those who may not. */
  readonly setSweep: ((preset: PresetSummary, onClose: () => void) => ReactNode) | null;
}

export default function LibraryPage({ setSweep }: LibraryPageProps) {
  const [query, changeQuery] = useLibraryQuery();
  const presets = usePresetList(query);
  const choices = usePresetChoices().data;
  const me = useSession().data?.user;
  const queries = useQueryClient();
  const navigate = useNavigate();
  const [setting, setSetting] = useState<PresetSummary | null>(null);
  const [doomed, setDoomed] = useState<PresetSummary | null>(null);
  const refresh = () => queries.invalidateQueries({ queryKey: ['presets'] });
  const duplicate = useMutation({
    mutationFn: duplicatePreset,
    onSuccess: async (body) => {
      await refresh();
      await navigate(`/presets/${body.preset.id}`);
    },
  });
  const remove = useMutation({
    mutationFn: deletePreset,
    onSuccess: async () => {
      setDoomed(null);
      await refresh();
    },
  });
  const failure = duplicate.error ?? remove.error;

  return (
    <div className="mx-auto grid max-w-6xl gap-5 px-4 py-8">
      <div className="flex flex-wrap items-end justify-between gap-3">
        <div>
          <h1 className="text-3xl">Presets</h1>
          <p role="status" className="text-muted">
            {presets.data ? plural(presets.data.total, 'preset') : ' '}
          </p>
        </div>
        <div className="flex gap-2">
          <ImportButton />
          <Link to="/presets/new" className={buttonClasses('primary')}>
            New preset
          </Link>
        </div>
      </div>
      <LibraryFilters query={query} choices={choices} onChange={changeQuery} />
      {failure ? (
        <p role="alert" className="rounded-md border border-caution px-3 py-2 text-caution">
          {failure.message}
        </p>
      ) : null}
      {presets.isPending ? <LoadingState label="Reading the library…" /> : null}
      {presets.isError ? (
        <ErrorState
          error={presets.error}
          actions={<Button onClick={() => void presets.refetch()}>Try again</Button>}
        />
      ) : null}
      {presets.data?.items.length === 0 ? (
        <PageState
          title="Nothing fits this search"
          actions={
            <Button onClick={() => changeQuery({ search: '', tag: '', owner: '', kind: 'all' })}>
              Show all presets
            </Button>
          }
        >
          Take away a filter, or look for another word.
        </PageState>
      ) : null}
      <ul
        className={joinClasses(
          'grid gap-3 sm:grid-cols-2 lg:grid-cols-3',
          presets.isPlaceholderData && 'opacity-60',
        )}
      >
        {presets.data?.items.map((preset) => (
          <PresetCard
            key={preset.id}
            preset={preset}
            mine={preset.owner?.id === me?.id}
            onTag={(tag) => changeQuery({ tag })}
            onDuplicate={(id) => duplicate.mutate(id)}
            onDelete={setDoomed}
            onSetSweep={setSweep ? setSetting : null}
          />
        ))}
      </ul>
      {presets.data ? (
        <Pager
          page={presets.data.page}
          pageSize={presets.data.pageSize}
          total={presets.data.total}
          onPage={(page) => changeQuery({ page })}
        />
      ) : null}
      {me ? <DeletedPresets /> : null}
      {setting && setSweep ? setSweep(setting, () => setSetting(null)) : null}
      <DeleteDialog preset={doomed} onCancel={() => setDoomed(null)} onConfirm={(id) => remove.mutate(id)} />
    </div>
  );
}
