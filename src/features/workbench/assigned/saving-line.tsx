import { Button } from '@/components/ui/button';
import { formatDayAndTime } from '@/lib/format';

import type { Saving } from '../state/assigned';
import { useWorkbench } from '../state/store';

function words(saving: Saving): string {
  switch (saving.kind) {
    case 'saved':
      return saving.at ? 'All of it is saved.' : 'Nothing to save yet.';
    case 'saving':
      return 'Saving…';
    case 'no connection':
      return 'No connection. Your work is kept in this browser and sent when the connection is back.';
    case 'conflict':
      return `This sweep was also worked on in another window, saved ${formatDayAndTime(saving.savedAt)}.`;
    case 'refused':
      return `Not saved. ${saving.message}`;
  }
}

/** Whether the work is safe, and what to do where two windows disagree. */
export function SavingLine({
  onKeepMine,
  onTakeTheirs,
}: {
  readonly onKeepMine: (revision: number) => void;
  readonly onTakeTheirs: () => void;
}) {
  const saving = useWorkbench((state) => state.assigned?.saving ?? null);
  if (!saving) return null;
  const calm = saving.kind === 'saved' || saving.kind === 'saving';
  return (
    <div className="grid gap-1.5">
      <p role="status" className={calm ? 'text-sm text-muted' : 'text-sm text-caution'}>
        {words(saving)}
      </p>
      {saving.kind === 'conflict' ? (
        <div className="flex flex-wrap gap-2">
          <Button size="small" onClick={onTakeTheirs}>
            Take that one
          </Button>
          <Button size="small" onClick={() => onKeepMine(saving.revision)}>
            Go on with this one
          </Button>
        </div>
      ) : null}
    </div>
  );
}
