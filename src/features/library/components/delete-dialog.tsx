import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { KEPT_DAYS } from '@/contract/deleted';
import type { PresetSummary } from '@/contract/presets';
import { plural } from '@/lib/format';

export function DeleteDialog({
  preset,
  onCancel,
  onConfirm,
}: {
  readonly preset: PresetSummary | null;
  readonly onCancel: () => void;
  readonly onConfirm: (id: string) => void;
}) {
  return (
    <Dialog
      open={preset !== null}
      onOpenChange={onCancel}
      width="narrow"
      title="Delete this preset?"
      description={
        preset
          ? `“${preset.title}” and its ${plural(preset.version, 'version')} leave the library, and its links stop working. All of it is kept for ${KEPT_DAYS} days and then deleted for good.`
          : ''
      }
    >
      <div className="flex justify-end gap-2">
        <Button onClick={onCancel}>Keep it</Button>
        <Button look="caution" onClick={() => preset && onConfirm(preset.id)}>
          Delete
        </Button>
      </div>
    </Dialog>
  );
}
