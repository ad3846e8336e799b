import { useQuery } from '@tanstack/react-query';
import { useCallback, useEffect, useMemo, useState } from 'react';
import { Link } from 'react-router-dom';

import { ErrorState, LoadingState } from '@/components/states/page-state';
import { buttonClasses } from '@/components/ui/button';
import { createEmptyPreset } from '@/engine/schema/create';
import type { PresetDocument } from '@/engine/schema/preset';
import { useSession } from '@/lib/session';

import { AssignedBench } from './assigned/assigned-bench';
import { openAssigned, type OpenedAssigned } from './assigned/open-assigned';
import { fetchPreset } from './dialogs/api/fetch-preset';
import { fetchShared } from './dialogs/api/fetch-shared';
import { originOf } from './dialogs/origin-of';
import { draftKey } from './drafts/draft-key';
import { DraftOffer } from './drafts/draft-offer';
import { forgetDraft, readDraft } from './drafts/draft-storage';
import { useEngineDriver } from './engine';
import { beginPanes, defaultPanes } from './panes';
import { handedOver, settleHandOver } from './state/hand-over';
import { sameDocument } from './state/same-document';
import {
  createWorkbenchStore,
  useWorkbench,
  useWorkbenchStore,
  WorkbenchContext,
  type Origin,
} from './state/store';
import { Workbench } from './workbench';

export type WorkbenchSource =
  | { readonly kind: 'new' }
  | { readonly kind: 'preset'; readonly id: string }
  | { readonly kind: 'shared'; readonly token: string }
  | { readonly kind: 'assigned'; readonly id: string };

interface Opened {
  readonly document: PresetDocument;
  readonly origin: Origin;
  readonly assigned?: OpenedAssigned;
}

async function openSource(
  source: WorkbenchSource,
  userId: string | undefined,
  signal: AbortSignal,
): Promise<Opened> {
  if (source.kind === 'new') return { document: createEmptyPreset(), origin: { kind: 'new' } };
  if (source.kind === 'shared') {
    const shared = await fetchShared(source.token, signal);
    return {
      document: shared.document,
      origin: {
        kind: 'shared',
        token: source.token,
        signedIn: userId !== undefined,
        mayCopy: shared.mayCopy,
      },
    };
  }
  if (source.kind === 'assigned') return openAssigned(source.id, userId ?? '', signal);
  const body = await fetchPreset(source.id, signal);
  return { document: body.document, origin: originOf(body) };
}

/** Engine and panes begin with the first commit, and go on while the bench is drawn in the second. */
function RunningBench({ draftKey: key }: { readonly draftKey: string | null }) {
  useEngineDriver();
  const store = useWorkbenchStore();
  useEffect(() => {
    const { document, arrangement } = store.getState();
    beginPanes(defaultPanes(document, arrangement));
  }, [store]);
  const begun = useWorkbench((state) => state.engine !== null);
  return begun ? <Workbench draftKey={key} /> : <LoadingState label="Opening the preset…" />;
}

/** The bench with what was opened on it; an earlier visit's draft is offered first. */
function OpenedBench({
  opened,
  userId,
  onReload,
}: {
  readonly opened: Opened;
  readonly userId: string | undefined;
  readonly onReload: () => void;
}) {
  const key = draftKey(opened.origin, userId);
  const store = useMemo(() => {
    const { document, origin } = opened;
    const kept = origin.kind === 'preset' ? handedOver(origin.id) : null;
    return kept ?? createWorkbenchStore(document, origin, opened.assigned?.work ?? null);
  }, [opened]);
  useEffect(settleHandOver, [store]);
  const [draft, setDraft] = useState(() => {
    const kept = key ? readDraft(key) : null;
    return kept && !sameDocument(kept.document, opened.document) ? kept : null;
  });
  const version = opened.origin.kind === 'preset' ? opened.origin.version : null;

  const handleRestore = () => {
    if (!draft) return;
    const { origin } = opened;
    if (origin.kind === 'preset' && draft.baseVersion !== null) {
      // Saving will find the newer version and ask how to keep both.
      store.getState().set({ origin: { ...origin, version: draft.baseVersion } });
    }
    store.getState().edit('Restore the draft', () => draft.document);
    setDraft(null);
  };
  const handleDiscard = () => {
    if (key) forgetDraft(key);
    setDraft(null);
  };
  return (
    <WorkbenchContext.Provider value={store}>
      {opened.assigned ? (
        <AssignedBench place={opened.assigned.place} dirty={opened.assigned.dirty} onReload={onReload}>
          <RunningBench draftKey={null} />
        </AssignedBench>
      ) : (
        <RunningBench draftKey={draft ? null : key} />
      )}
      {draft ? (
        <DraftOffer draft={draft} version={version} onRestore={handleRestore} onDiscard={handleDiscard} />
      ) : null}
    </WorkbenchContext.Provider>
  );
}

export default function WorkbenchPage({ source }: { readonly source: WorkbenchSource }) {
  const session = useSession();
  const user = session.data?.user;
  const opened = useQuery({
    queryKey: ['bench', source, user?.id ?? ''],
    queryFn: ({ signal }) => openSource(source, user?.id, signal),
    enabled: !session.isPending,
    // The bench keeps its own copy: a refetch must not replace what is being edited.
    staleTime: Infinity,
    gcTime: 0,
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
  });
  const { refetch } = opened;
  const reload = useCallback(() => void refetch(), [refetch]);
  if (opened.isError) {
    return (
      <ErrorState
        error={opened.error}
        actions={
          <Link to="/presets" className={buttonClasses('plain')}>
            To the presets
          </Link>
        }
      />
    );
  }
  if (!opened.data) return <LoadingState label="Opening the preset…" />;
  return <OpenedBench key={opened.dataUpdatedAt} opened={opened.data} userId={user?.id} onReload={reload} />;
}
