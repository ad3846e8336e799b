import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';

import { FieldMessage } from '@/components/fields/field-message';
import { Button } from '@/components/ui/button';
import type { VersionSummary } from '@/contract/presets';
import { formatDayAndTime } from '@/lib/format';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbenchStore, type Origin } from '../state/store';
import { duplicatePreset } from './api/duplicate-preset';
import { fetchVersion } from './api/fetch-version';
import { restoreVersion } from './api/restore-version';
import { errorWords } from './error-words';
import { originOf } from './origin-of';
import { isDirty } from './saving-rules';

interface VersionRowProps {
  readonly origin: Extract<Origin, { kind: 'preset' }>;
  readonly version: VersionSummary;
  readonly head: number;
  readonly compared: boolean;
  readonly onCompare: () => void;
  readonly onClose: () => void;
}

/** One version with what can be done with it. */
export function VersionRow({ origin, version, head, compared, onCompare, onClose }: VersionRowProps) {
  const store = useWorkbenchStore();
  const queries = useQueryClient();
  const navigate = useNavigate();
  const say = (notice: string) => useBenchUi.getState().set({ notice });

  const open = useMutation({
    mutationFn: () => fetchVersion(origin.id, version.number),
    onSuccess: (body) => {
      store.getState().edit(`Open version ${version.number}`, () => body.document);
      say(`Version ${version.number} is on the bench, unsaved. Undo goes back.`);
      onClose();
    },
  });
  const restore = useMutation({
    mutationFn: () => restoreVersion(origin.id, version.number, { note: '', baseVersion: head }),
    onSuccess: (body) => {
      store.getState().open(body.document, originOf(body));
      void queries.invalidateQueries({ queryKey: ['versions', origin.id] });
      say(`Restored version ${version.number} as version ${body.version.number}.`);
      onClose();
    },
  });
  const duplicate = useMutation({
    mutationFn: () => duplicatePreset(origin.id, { version: version.number, title: '' }),
    onSuccess: (body) => {
      void queries.invalidateQueries({ queryKey: ['presets'] });
      onClose();
      void navigate(`/presets/${body.preset.id}`);
    },
  });
  const error = open.error ?? restore.error ?? duplicate.error;
  const name = `version ${version.number}`;
  const mayRestore = origin.rights.includes('restore');
  const dirty = isDirty(store.getState());
  return (
    <li className="grid gap-1 px-3 py-2">
      <div className="flex flex-wrap items-center gap-x-3 gap-y-1">
        <div className="min-w-48 flex-1">
          <p>
            <span className="font-semibold">Version {version.number}</span>
            {version.number === head ? <span className="text-sm text-muted"> · newest</span> : null}
            {version.number === origin.version ? (
              <span className="text-sm text-accent"> · on the bench</span>
            ) : null}
          </p>
          <p className="text-sm text-muted">
            {version.author}, {formatDayAndTime(version.savedAt)}
            {version.restoredFrom ? `, restored from version ${version.restoredFrom}` : ''}
          </p>
          {version.note ? <p className="text-sm">{version.note}</p> : null}
        </div>
        <div className="flex flex-wrap gap-1.5">
          <Button size="small" aria-pressed={compared} aria-label={`Compare ${name}`} onClick={onCompare}>
            {compared ? 'Comparing' : 'Compare'}
          </Button>
          <Button
            size="small"
            aria-label={`Open ${name}`}
            disabled={open.isPending}
            onClick={() => open.mutate()}
          >
            Open
          </Button>
          <Button
            size="small"
            aria-label={`Restore ${name}`}
            title={
              mayRestore
                ? dirty
                  ? 'Unsaved changes on the bench would be lost; save or undo them first.'
                  : undefined
                : 'You may not save versions of this preset.'
            }
            disabled={!mayRestore || dirty || version.number === head || restore.isPending}
            onClick={() => restore.mutate()}
          >
            Restore
          </Button>
          <Button
            size="small"
            aria-label={`Duplicate ${name}`}
            disabled={!origin.rights.includes('duplicate') || duplicate.isPending}
            onClick={() => duplicate.mutate()}
          >
            Duplicate
          </Button>
        </div>
      </div>
      {error ? <FieldMessage>{errorWords(error)}</FieldMessage> : null}
    </li>
  );
}
