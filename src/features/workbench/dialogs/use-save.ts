import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';

import type { ErrorBody } from '@/contract/errors';
import type { PresetBody } from '@/contract/presets';
import type { PresetDocument } from '@/engine/schema/preset';
import { ApiError } from '@/lib/api-client';

import { useDraftKey } from '../drafts/draft-key';
import { forgetDraft } from '../drafts/draft-storage';
import { useBenchUi } from '../layout/bench-ui';
import { handOver } from '../state/hand-over';
import { useWorkbenchStore } from '../state/store';
import { createPreset } from './api/create-preset';
import { saveVersion } from './api/save-version';
import { errorWords } from './error-words';
import { originOf } from './origin-of';
import type { Placement } from './visibility-fields';

export type Head = NonNullable<ErrorBody['error']['head']>;

/** Saving as a version or as a preset of its own, with what can go wrong as values. */
export function useSave(onDone: () => void) {
  const store = useWorkbenchStore();
  const queries = useQueryClient();
  const navigate = useNavigate();
  const draftKey = useDraftKey();
  const [busy, setBusy] = useState(false);
  const [error, setError] = useState<string | null>(null);
  const [conflict, setConflict] = useState<Head | null>(null);

  const attempt = async (
    sent: PresetDocument,
    work: () => Promise<PresetBody>,
    after: (body: PresetBody) => void,
  ) => {
    setBusy(true);
    setError(null);
    try {
      const body = await work();
      // Saved means what was sent: edits made while it was under way stay unsaved.
      store.getState().set({ origin: originOf(body), saved: sent });
      if (draftKey && store.getState().document === sent) forgetDraft(draftKey);
      void queries.invalidateQueries({ queryKey: ['presets'] });
      useBenchUi.getState().set({ notice: `Saved as version ${body.version.number}.` });
      after(body);
      onDone();
    } catch (refusal) {
      if (refusal instanceof ApiError && refusal.code === 'conflict' && refusal.head)
        setConflict(refusal.head);
      else setError(errorWords(refusal));
    } finally {
      setBusy(false);
    }
  };
  return {
    busy,
    error,
    conflict,
    /** On top of `base`, by default of the version that the bench began from. */
    version(note: string, base?: number) {
      const { origin, document } = store.getState();
      if (origin.kind !== 'preset') return;
      void attempt(
        document,
        () => saveVersion(origin.id, { document, note, baseVersion: base ?? origin.version }),
        () => void queries.invalidateQueries({ queryKey: ['versions', origin.id] }),
      );
    },
    /** As a preset of one's own; the page goes there. */
    create(note: string, placement: Placement, title?: string) {
      const { document } = store.getState();
      const copy = title === undefined ? document : { ...document, title };
      void attempt(
        document,
        () => createPreset({ document: copy, note, ...placement }),
        (body) => {
          // A copy under another title is another document, with a history of its own.
          if (title === undefined) handOver(body.preset.id, store);
          void navigate(`/presets/${body.preset.id}`);
        },
      );
    },
  };
}
export type Save = ReturnType<typeof useSave>;
