import { useInfiniteQuery } from '@tanstack/react-query';
import { useState } from 'react';

import { FieldMessage } from '@/components/fields/field-message';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench } from '../state/store';
import { ActivityList } from './activity-list';
import { listVersions } from './api/list-versions';
import { errorWords } from './error-words';
import { VersionComparison } from './version-comparison';
import { VersionRow } from './version-row';

/** Number of a version, or what is on the bench. */
export type Side = number | 'bench';

/** Versions of the preset: open, compare, restore, duplicate. */
export function HistoryDialog() {
  const set = useBenchUi((state) => state.set);
  const origin = useWorkbench((state) => state.origin);
  const id = origin.kind === 'preset' ? origin.id : '';
  const [before, setBefore] = useState<Side | null>(null);
  const [after, setAfter] = useState<Side>('bench');
  const versions = useInfiniteQuery({
    queryKey: ['versions', id],
    queryFn: ({ pageParam }) => listVersions(id, pageParam),
    initialPageParam: 1,
    getNextPageParam: (last) => (last.page * last.pageSize < last.total ? last.page + 1 : undefined),
    staleTime: 0,
    enabled: id !== '',
  });
  const close = () => set({ dialog: null });
  if (origin.kind !== 'preset') return null;
  const all = versions.data?.pages.flatMap((page) => page.items) ?? [];
  const head = all[0]?.number ?? origin.version;
  return (
    <Dialog
      open
      onOpenChange={close}
      title="Version history"
      description="Versions never change. Restoring one makes a new version equal to it."
      width="wide"
    >
      {versions.isPending ? <p role="status">Reading the versions…</p> : null}
      {versions.isError ? <FieldMessage>{errorWords(versions.error)}</FieldMessage> : null}
      <ul aria-label="Versions" className="max-h-[40vh] divide-y overflow-y-auto rounded-md border">
        {all.map((version) => (
          <VersionRow
            key={version.number}
            origin={origin}
            version={version}
            head={head}
            compared={before === version.number}
            onCompare={() => setBefore(before === version.number ? null : version.number)}
            onClose={close}
          />
        ))}
      </ul>
      {versions.hasNextPage ? (
        <Button
          size="small"
          className="mt-2"
          disabled={versions.isFetchingNextPage}
          onClick={() => void versions.fetchNextPage()}
        >
          Earlier versions
        </Button>
      ) : null}
      {before !== null ? (
        <VersionComparison
          id={id}
          before={before}
          after={after}
          choices={['bench', ...all.map((one) => one.number)]}
          onAfter={setAfter}
          onBefore={setBefore}
        />
      ) : null}
      <ActivityList id={id} />
    </Dialog>
  );
}
