import { joinClasses } from '@/lib/join-classes';

import { isDirty } from '../dialogs/saving-rules';
import { useWorkbench } from '../state/store';

/** Which version is on the bench, and whether all of it is saved. */
export function VersionChip() {
  const origin = useWorkbench((state) => state.origin);
  const dirty = useWorkbench(isDirty);
  const words =
    origin.kind === 'shared'
      ? dirty
        ? 'shared · explored'
        : 'shared'
      : origin.kind === 'new'
        ? 'not saved yet'
        : `${origin.starter ? 'starter · ' : ''}version ${origin.version} · ${dirty ? 'unsaved changes' : 'saved'}`;
  return (
    <span
      role="status"
      className={joinClasses(
        'shrink-0 rounded-full border px-2 py-0.5 text-xs whitespace-nowrap',
        dirty && origin.kind !== 'shared' ? 'border-caution text-caution' : 'border-hairline text-muted',
      )}
    >
      {words}
    </span>
  );
}
