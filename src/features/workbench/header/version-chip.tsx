import { joinClasses } from '@/lib/join-classes';

import { isDirty } from '../dialogs/saving-rules';
import type { Saving } from '../state/assigned';
import { useWorkbench } from '../state/store';

const KEPT: Readonly<Record<Saving['kind'], string>> = {
  saved: 'kept',
  saving: 'keeping…',
  'no connection': 'kept here, no connection',
  conflict: 'open in two windows',
  refused: 'not kept',
};

/** Which version is on the bench, and whether all of it is saved. */
export function VersionChip() {
  const origin = useWorkbench((state) => state.origin);
  const dirty = useWorkbench(isDirty);
  const saving = useWorkbench((state) => state.assigned?.saving ?? null);
  const alarming = saving
    ? saving.kind !== 'saved' && saving.kind !== 'saving'
    : dirty && origin.kind !== 'shared';
  const words =
    origin.kind === 'shared'
      ? dirty
        ? 'shared · explored'
        : 'shared'
      : origin.kind === 'new'
        ? 'not saved yet'
        : origin.kind === 'assigned'
          ? KEPT[saving?.kind ?? 'saved']
          : `${origin.starter ? 'starter · ' : ''}version ${origin.version} · ${dirty ? 'unsaved changes' : 'saved'}`;
  return (
    <span
      role="status"
      className={joinClasses(
        'shrink-0 rounded-full border px-2 py-0.5 text-xs whitespace-nowrap',
        alarming ? 'border-caution text-caution' : 'border-hairline text-muted',
      )}
    >
      {words}
    </span>
  );
}
