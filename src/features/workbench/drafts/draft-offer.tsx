import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { formatDayAndTime } from '@/lib/format';

import type { Draft } from './draft-storage';

interface DraftOfferProps {
  readonly draft: Draft;
  /** Version of the preset as it is now; null for one not saved yet. */
  readonly version: number | null;
  readonly onRestore: () => void;
  readonly onDiscard: () => void;
}

/** Unsaved work of an earlier visit, to take up again or to let go. */
export function DraftOffer({ draft, version, onRestore, onDiscard }: DraftOfferProps) {
  const behind = version !== null && draft.baseVersion !== null && draft.baseVersion < version;
  const when = draft.keptAt ? ` from ${formatDayAndTime(draft.keptAt)}` : '';
  return (
    <Dialog
      open
      onOpenChange={(open) => (open ? undefined : onRestore())}
      title="Unsaved work was kept"
      description={`A draft of “${draft.document.title}”${when} is in this browser.`}
      width="narrow"
    >
      {behind ? (
        <p className="mb-3">
          It began from version {draft.baseVersion}, and version {version} has been saved since. When you
          save, you will be asked how to keep both.
        </p>
      ) : null}
      <div className="flex justify-end gap-2">
        <Button look="caution" onClick={onDiscard}>
          Discard draft
        </Button>
        <Button look="primary" onClick={onRestore}>
          Restore draft
        </Button>
      </div>
    </Dialog>
  );
}
